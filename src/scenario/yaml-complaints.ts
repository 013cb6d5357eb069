import type { CST, YAMLParseError } from 'yaml';
import { foreignWhiteSpace } from '../messages/white-space.js';
import type { Findings } from './findings.js';
import type { SourceText, TextSpan } from './source-text.js';
import { yamlWords } from './yaml-errors.js';

type Complaint = Pick<YAMLParseError, 'code' | 'pos' | 'message'>;

const why = 'A scenario is read as YAML; what breaks its rules has no certain meaning.';

/**
 * Tells what the YAML reader complains about, in our words.
 *
 * A quote that is never closed, a tab as indentation and a space that only looks like one are each told alone and where
 * they stand: what the reader says about the lines behind them follows from them.
 *
 * @fails adds `not-yaml`
 */
export function tellComplaints(
  complaints: readonly Complaint[],
  tokens: readonly CST.Token[],
  source: SourceText,
  findings: Findings,
): void {
  const told = complaints.filter(({ code }) => code !== 'TAG_RESOLVE_FAILED');
  if (told.length === 0) return;
  const quote = openQuote(told, tokens);
  if (quote !== null) {
    const what = 'This quote is not closed before the next line with a key.';
    tell('MISSING_CHAR', quote, what, 'Write the closing quote at the end of the value.', findings);
    return;
  }
  let seen = -1;
  for (const { code, pos } of told) {
    // A line is looked at once, however many complaints it holds.
    if (pos[0] < seen) continue;
    const { start, text } = lineAround(pos[0], source.text);
    seen = start + text.length;
    const tab = /^ *\t/.exec(text);
    if (tab !== null || code === 'TAB_AS_INDENT') {
      const at =
        tab === null
          ? { start: pos[0], end: pos[1] }
          : { start: start + tab[0].length - 1, end: start + tab[0].length };
      const { what, mend } = yamlWords('TAB_AS_INDENT');
      tell('TAB_AS_INDENT', at, what, mend, findings);
      return;
    }
    const space = foreignWhiteSpace(text);
    if (space !== null) {
      const at = { start: start + space.offset, end: start + space.offset + 1 };
      const what = `There is ${space.name} here, which is not read as a space.`;
      tell(code, at, what, 'Write an ordinary space in its place.', findings);
      return;
    }
  }
  for (const { code, pos } of told) {
    if (findings.isFull) return;
    const { what, mend } = yamlWords(code);
    tell(code, { start: pos[0], end: pos[1] }, what, mend, findings);
  }
}

function tell(reader: Complaint['code'], at: TextSpan, what: string, mend: string, findings: Findings): void {
  findings.add({ code: 'not-yaml', at, what, why, mend, evidence: { reader } });
}

/** The quote that the first complaint comes from: one without an end, or one that ran over lines with keys of their own. */
function openQuote(complaints: readonly Complaint[], tokens: readonly CST.Token[]): TextSpan | null {
  const unclosed = complaints.find(({ message }) => message.startsWith('Missing closing'));
  const first = unclosed ?? complaints.reduce((least, next) => (next.pos[0] < least.pos[0] ? next : least));
  let last: { offset: number; source: string } | null = null;
  for (const token of quotesIn(tokens)) {
    if (token.offset <= first.pos[0] && (last === null || token.offset > last.offset)) last = token;
  }
  if (last === null || (unclosed === undefined && !/\n *[A-Za-z_][\w ]*:(?:\s|$)/.test(last.source))) return null;
  return { start: last.offset, end: last.offset + 1 };
}

/** Every quoted value and key, in no order; by a list of what is to be looked at, for a hostile text may be deep. */
function quotesIn(tokens: readonly CST.Token[]): { offset: number; source: string }[] {
  const found: { offset: number; source: string }[] = [];
  const waiting: (CST.Token | null | undefined)[] = tokens.slice();
  while (waiting.length > 0) {
    const token = waiting.pop();
    if (token === null || token === undefined) continue;
    if (token.type === 'double-quoted-scalar' || token.type === 'single-quoted-scalar') found.push(token);
    else if (token.type === 'document') waiting.push(token.value);
    else if ('items' in token) {
      for (const { key, value } of token.items as { key?: CST.Token | null; value?: CST.Token }[]) {
        waiting.push(key, value);
      }
    }
  }
  return found;
}

function lineAround(offset: number, text: string): { readonly start: number; readonly text: string } {
  const start = offset === 0 ? 0 : text.lastIndexOf('\n', offset - 1) + 1;
  const end = text.indexOf('\n', start);
  return { start, text: text.slice(start, end < 0 ? text.length : end) };
}
