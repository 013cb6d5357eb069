import { excerpt } from './excerpt.js';
import type { Message } from './message.js';
import { printable } from './printable.js';
import { wrapWords } from './wrap-words.js';

/** Dresses a piece of text for its role: `place`, `mistake`, `advice`, `code`, `source`, `caret`, `label`, `mend`. */
export type MessageStyle = (role: string, text: string) => string;

const bare: MessageStyle = (_role, text) => text;

/**
 * Messages as text for people, in the order given, a blank line between two.
 *
 * @param width to which sentences are wrapped; source lines are cut by their own rule
 * @example
 * // lots.yaml:12:18  mistake  unknown-name
 * //   `strik` is not a name of this scenario.
 * //
 * //     payoff: max(0, strik - price)
 * //                    ^^^^^
 * //   Why:  …
 * //   Mend: …
 */
export function renderMessages(
  messages: readonly Message[],
  style: MessageStyle = bare,
  width = Number.POSITIVE_INFINITY,
): string {
  return messages.map((message) => renderMessage(message, style, width)).join('\n');
}

function renderMessage(message: Message, style: MessageStyle, width: number): string {
  const { code, severity, place, what, why, mend } = message;
  const position = place === null ? [] : [style('place', `${printable(place.file)}:${place.line}:${place.column}`)];
  const lines = [
    [...position, style(severity, severity), style('code', code)].join('  '),
    `  ${block(what, 2, width)}`,
    ...source(message, style),
    `  ${style('label', 'Why: ')} ${block(why, 8, width)}`,
    `  ${style('label', 'Mend:')} ${style('mend', block(mend, 8, width))}`,
  ];
  return `${lines.join('\n')}\n`;
}

/** Texts of ours may have several lines (a piece of a scenario to copy); texts from outside never keep theirs. */
function block(text: string, indent: number, width: number): string {
  return text
    .split('\n')
    .map((line) => wrapWords(printable(line), Math.max(20, width - indent)).replaceAll('\n', `\n${' '.repeat(indent)}`))
    .join(`\n${' '.repeat(indent)}`);
}

function source({ place, sourceLine }: Message, style: MessageStyle): string[] {
  if (place === null || sourceLine === null || sourceLine.trim() === '') return [];
  const { text, underline } = excerpt(sourceLine, place.column, place.length);
  const indent = text.length - text.trimStart().length;
  const spare = Math.min(indent, underline.length - underline.trimStart().length);
  return ['', `    ${style('source', text.slice(spare))}`, `    ${style('caret', underline.slice(spare))}`];
}
