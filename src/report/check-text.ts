import { printable } from '../messages/printable.js';
import type { Forecast, RunRecord } from '../result/record.js';
import { counted, memory, roughCount } from './numbers.js';
import { pathsSentence } from './paths-text.js';
import { paragraph, wrapWords } from './prose.js';
import { plainStyle, type Style } from './style.js';
import { layOut } from './table.js';
import { adviceText, section, type TextLayout } from './text.js';

/** What a check found, as plain data. */
export interface CheckFindings {
  readonly title: string;
  readonly settings: RunRecord['settings'];
  readonly forecast: Forecast;
  readonly advice: RunRecord['advice'];
}

type Origin = RunRecord['settings'][number]['origin'];

/** Where a setting was made, in words. */
export function originWords(origin: Origin): string {
  return origin.kind === 'line' ? `line ${origin.line}` : origin.kind;
}

/** Every setting with its value and where it came from; defaults stand back, changes from outside stand out. */
function settingsText(settings: RunRecord['settings'], width: number, style: Style): string {
  const nameWidth = Math.max(7, ...settings.map((setting) => setting.name.length));
  const valueWidth = Math.max(20, width - nameWidth - 22);
  const roles: Readonly<Record<Origin['kind'], string>> = { line: 'plain', 'command line': 'strong', default: 'quiet' };
  return layOut(
    {
      heads: ['setting', 'value', 'from'],
      rows: settings.map((setting) => [
        printable(setting.name),
        wrapWords(printable(setting.value), valueWidth),
        style(roles[setting.origin.kind], originWords(setting.origin)),
      ]),
    },
    style,
  );
}

function workWords(work: number | null): string {
  return work === null ? 'set by the pilot' : `about ${roughCount(work)} path-dates`;
}

/** What a run of this scenario will need, before it is started. */
function forecastText(forecast: Forecast, width: number, style: Style): string {
  const machine =
    forecast.machineMemoryBytes === null ? '' : ` of the machine's ${memory(forecast.machineMemoryBytes)}`;
  const { sizeCount, work } = forecast;
  const { fit, bounds, nested } = work;
  const most = sizeCount > 1 ? 'at most ' : '';
  const table = layOut(
    {
      heads: ['', 'forecast'],
      rows: [
        ['memory at the peak', `${most}about ${memory(forecast.peakMemoryBytes)}${machine}`],
        [
          'regression',
          `${most}${counted(forecast.columnCount, 'column')}, ${counted(forecast.polynomialCount, 'martingale polynomial')}`,
        ],
        ['work to fit the rule', `${most}${workWords(fit)}`],
        ['work for the bounds', workWords(bounds)],
        ...(nested === 0 ? [] : [['work for the Andersen-Broadie bound', workWords(nested)]]),
      ],
    },
    style,
  );
  const choice =
    sizeCount > 1
      ? `Up to ${sizeCount} sizes of the automatic basis are fitted in turn, from small to large, and one is kept: this is what the largest needs, beside the others. `
      : '';
  const meaning = `${choice}A path-date is one path moved by one date, with its regression columns.`;
  return `${table}\n\n${paragraph(pathsSentence(forecast.paths), width)}\n${style('quiet', paragraph(meaning, width))}`;
}

/** A scenario without mistakes as text: every setting with its origin, what a run will need, and advice. */
export function checkReport(findings: CheckFindings, layout: TextLayout = {}): string {
  const style = layout.style ?? plainStyle;
  const width = layout.width ?? 100;
  const { settings } = findings;
  const defaults = settings.filter((setting) => setting.origin.kind === 'default').length;
  const changed = settings.filter((setting) => setting.origin.kind === 'command line').length;
  const count = `No mistakes. ${counted(settings.length, 'setting')}: ${settings.length - defaults - changed} from the file, ${changed} from the command line, ${defaults} by default.`;
  const parts = [
    `${style('title', wrapWords(printable(findings.title), width))}\n${wrapWords(count, width)}`,
    settingsText(settings, width, style),
    section('What a run will need', forecastText(findings.forecast, width, style), style),
    adviceText(findings.advice, width, style),
  ];
  return `${parts.join('\n\n')}\n`;
}
