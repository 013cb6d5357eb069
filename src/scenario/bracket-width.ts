import { quoted } from '../messages/printable.js';
import type { Method } from './model.js';
import type { Reading } from './reading.js';
import { entriesOf, entryOf, type TreeNode, under } from './tree.js';

type Width = Method['bracketWidth'];

const defaultWidth: Width = { relative: 0.002 };
const amount = /^(\d+(?:\.\d*)?|\.\d+)(?:[eE]([-+]?\d+))?\s*(%?)$/;

/**
 * Reads the width that the bracket should have: from outside if given there, else from the file, else the default of a fifth of a percent.
 *
 * @fails adds `bad-override`, `mixed-forms`, `missing-key`, `value-out-of-range` and `width-and-counts`
 */
export function readBracketWidth(method: TreeNode | undefined, reading: Reading): Width | null {
  const { overrides, settings } = reading;
  const stated = readStated(method, reading);
  if (overrides.budgetSeconds !== undefined) refuseBudget(method, reading);
  const given = overrides.width;
  if (given !== undefined) {
    const width = parseWidth(String(given));
    if (width === null) return badWidth(String(given), reading);
    refuseCounts(method, '`--width`', reading, { override: '--width' });
    settings.fromCommandLine('method.bracket width', words(width));
    return width;
  }
  const entry = entryOf(method, 'bracket width');
  if (entry === undefined) {
    const counts = under(method, 'counts');
    const isFixed = under(counts, 'outer') !== undefined && under(counts, 'inner') !== undefined;
    if (!isFixed) settings.byDefault('method.bracket width', words(defaultWidth));
    return defaultWidth;
  }
  refuseCounts(method, '`bracket width`', reading);
  if (stated !== null) settings.fromText('method.bracket width', words(stated), entry.value);
  return stated;
}

/** `"0.1%"` or `"0.02"`; null for anything else, zero and infinity among it. */
export function parseWidth(text: string): Width | null {
  const found = amount.exec(text.trim());
  if (found === null) return null;
  const isShare = found[3] === '%';
  const value = Number(text.trim().replace(/\s*%$/, '')) / (isShare ? 100 : 1);
  if (!(value > 0) || !Number.isFinite(value) || (isShare && value > 1)) return null;
  return isShare ? { relative: value } : { money: value };
}

/** A width in words for the echo. */
function words(width: Width): string {
  return 'money' in width
    ? `${width.money} in money`
    : `${Number((width.relative * 100).toPrecision(12))}% of the value`;
}

function readStated(method: TreeNode | undefined, reading: Reading): Width | null {
  const entry = entryOf(method, 'bracket width');
  if (entry === undefined) return null;
  const [first, second] = entriesOf(entry.value);
  if (first === undefined || second !== undefined) {
    reading.findings.add({
      code: first === undefined ? 'missing-key' : 'mixed-forms',
      at: second?.keySpan ?? entry.keySpan,
      what: `The bracket width has ${first === undefined ? 'neither' : 'both'} \`relative\` ${first === undefined ? 'nor' : 'and'} \`money\`.`,
      why: 'It is either a share of the value or an amount of money.',
      mend: 'Write { relative: 0.1% } or { money: 0.02 }.',
    });
    return null;
  }
  const node = first.value;
  const text = node.kind === 'scalar' ? node.text.trim() : '';
  const isShare = first.key === 'relative';
  const width = isShare && !text.endsWith('%') ? asShare(parseWidth(text)) : parseWidth(text);
  if (width !== null && (isShare || 'money' in width)) return width;
  reading.findings.add({
    code: 'value-out-of-range',
    at: node.span,
    what: `The bracket width ${quoted(text)} is not ${isShare ? 'a share of the value above 0% and up to 100%' : 'an amount of money greater than 0'}.`,
    why: 'No effort makes a bracket of no width, and a wider one says nothing.',
    mend: isShare ? 'Write a share such as 0.1% or 0.001.' : 'Write a number such as 0.02.',
    evidence: { text: text.slice(0, 100) },
  });
  return null;
}

function asShare(width: Width | null): Width | null {
  return width !== null && 'money' in width && width.money <= 1 ? { relative: width.money } : null;
}

/** A width is reached by choosing the counts of outer paths and inner points, so it cannot stand beside them. */
function refuseCounts(
  method: TreeNode | undefined,
  wanted: string,
  reading: Reading,
  evidence: Readonly<Record<string, string>> = {},
): void {
  for (const key of ['outer', 'inner']) {
    const entry = entryOf(under(method, 'counts'), key);
    if (entry === undefined || isNoInnerPoints(key, entry.value)) continue;
    reading.findings.add({
      code: 'width-and-counts',
      at: entry.keySpan,
      what: `\`${key}\` is fixed here, which contradicts ${wanted}.`,
      why: 'A width is reached by choosing these counts; with both stated one of them would be passed over.',
      mend: `Take \`${key}\` away, or the width.`,
      evidence: { key, ...evidence },
    });
  }
}

/** `inner: 0` is a choice of method, not an effort: the outer paths still reach a width. */
function isNoInnerPoints(key: string, value: TreeNode): boolean {
  return key === 'inner' && value.kind === 'scalar' && Number(value.text) === 0;
}

/** A budget is spent on the counts that are left free; with none left it would be passed over. */
function refuseBudget(method: TreeNode | undefined, reading: Reading): void {
  const entries = ['outer', 'inner'].map((key) => entryOf(under(method, 'counts'), key));
  if (entries.includes(undefined)) return;
  reading.findings.add({
    code: 'bad-override',
    at: entries[0]!.keySpan,
    what: '`outer` and `inner` are fixed here, which contradicts `--budget`.',
    why: 'A time is kept by choosing these counts; with both stated the budget would be passed over.',
    mend: 'Take `outer` away, or leave `--budget` out.',
    evidence: { override: '--budget' },
  });
}

function badWidth(text: string, reading: Reading): null {
  reading.findings.add({
    code: 'bad-override',
    at: null,
    what: `The width asked for, ${quoted(text)}, is no width.`,
    why: 'A bracket is as wide as a positive number says.',
    mend: 'Give a share of the value such as 0.1%, or an amount of money such as 0.02.',
    evidence: { text: text.slice(0, 100), override: '--width' },
  });
  return null;
}
