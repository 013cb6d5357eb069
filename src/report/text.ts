import { printable } from '../messages/printable.js';
import { renderMessages } from '../messages/render.js';
import type { RunRecord } from '../result/record.js';
import { boundsText, bracketText } from './bracket-text.js';
import { exerciseText } from './exercise-text.js';
import { basisText, planText, timingText } from './plan-text.js';
import { paragraph, wrapWords } from './prose.js';
import { changedText, reproduceText } from './reproduce-text.js';
import { roundsText } from './rounds-text.js';
import { selectionText } from './selection-text.js';
import { plainStyle, type Style } from './style.js';

/** Said once, plainly, where a reader decides; the README has it in full. */
export const CAUTION =
  'These numbers depend on the stated model and constants; they are no advice to trade and no accounting opinion. Have them reviewed (README, "Care").';

/** How a text is dressed and how wide it may be. */
export interface TextLayout {
  readonly style?: Style;
  /** @unit characters */
  readonly width?: number;
}

/** Where this run's record is kept, for the line that tells how to reproduce it. */
export interface RunTextLayout extends TextLayout {
  readonly recordPath?: string | null;
}

/** A part of a report under its heading. */
export function section(heading: string, body: string, style: Style): string {
  return `${style('title', heading)}\n${body}`;
}

/** Advice as the message renderer words it, under a heading that counts it. */
export function adviceText(advice: RunRecord['advice'], width: number, style: Style): string {
  if (advice.length === 0) return section('Advice', '  None.', style);
  return section(`Advice (${advice.length})`, renderMessages(advice, style, width).trimEnd(), style);
}

/**
 * A finished run as text for a terminal: the bracket first, then what stands behind it, then how to get it again.
 *
 * @example textReport(record, { width: 100 })
 */
export function textReport(record: RunRecord, layout: RunTextLayout = {}): string {
  const style = layout.style ?? plainStyle;
  const width = layout.width ?? 100;
  const changed = changedText(record, width);
  const head = [style('title', wrapWords(printable(record.scenario.title), width)), bracketText(record, width, style)];
  if (record.status === 'stopped') {
    head.push(
      style(
        'doubt',
        wrapWords(
          'Stopped early: only the paths counted below were finished, so the bracket is wider than planned.',
          width,
        ),
      ),
    );
  }
  if (changed !== null) head.push(changed.replace(/^ {2}/gm, ''));
  const { selection, rounds } = record;
  const checks = record.passedChecks.map((check) => paragraph(`${style('good', '✓')} ${printable(check)}`, width));
  const parts = [
    head.join('\n'),
    boundsText(record, width, style),
    section('Exercise', exerciseText(record, width, style), style),
    ...(selection === null
      ? []
      : [section('Choice of the basis', selectionText(selection, record.scenario.money, width, style), style)]),
    section('Plan', planText(record, width), style),
    ...(rounds.length < 2 ? [] : [section('Rounds', roundsText(rounds, record.scenario.money, width, style), style)]),
    section('Basis', basisText(record, width), style),
    adviceText(record.advice, width, style),
    ...(checks.length > 0 ? [section('Checks passed', checks.join('\n'), style)] : []),
    section('Time', timingText(record, width), style),
    section('To get the same digits again', reproduceText(record, layout.recordPath ?? null, width), style),
    style('quiet', paragraph(CAUTION, width).replace(/^ {2}/gm, '')),
  ];
  return `${parts.join('\n\n')}\n`;
}
