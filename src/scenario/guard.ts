import { type CST, Lexer, Parser } from 'yaml';
import { refuseCharacters } from './characters.js';
import type { Findings } from './findings.js';

/** The largest text that is read, in UTF-16 units. */
export const mostTextLength = 1_000_000;

/** The most pieces (values, marks, line ends) that a text may have: they cost more time than plain length. */
export const mostPieces = 200_000;

/** How deep groups and lists may stand in one another. */
export const mostDepth = 30;

/**
 * Splits a text into the pieces of its YAML, and stops at the first sign that it is too large or too deep.
 *
 * The splitting itself uses no recursion; everything that comes after it does, and may rely on the limits kept here.
 *
 * @fails adds `scenario-too-large`, `scenario-too-deep` or, for characters, `not-yaml`, and gives null
 * @cost linear, at most about a second
 */
export function splitWithinLimits(text: string, findings: Findings): CST.Token[] | null {
  if (text.length > mostTextLength) {
    tooLarge(`The text has ${text.length} characters; at most ${mostTextLength} are read.`, findings);
    return null;
  }
  if (refuseCharacters(text, findings)) return null;
  const parser = new Parser();
  const tokens: CST.Token[] = [];
  let pieceCount = 0;
  for (const lexeme of new Lexer().lex(text)) {
    pieceCount += 1;
    if (pieceCount > mostPieces) {
      tooLarge(`The text has more than ${mostPieces} values, marks and line ends.`, findings);
      return null;
    }
    for (const token of parser.next(lexeme)) tokens.push(token);
    if (depthOf(parser.stack) > mostDepth) {
      tooDeep(parser.stack.at(-1)!.offset, findings);
      return null;
    }
  }
  for (const token of parser.end()) tokens.push(token);
  return tokens;
}

/** How many groups and lists are open: all that the reader keeps but the document itself and a value being read. */
function depthOf(stack: readonly CST.Token[]): number {
  const isValue = stack.at(-1)?.type.endsWith('scalar') === true;
  return stack.length - (isValue ? 2 : 1);
}

function tooLarge(what: string, findings: Findings): void {
  findings.add({
    code: 'scenario-too-large',
    at: null,
    what,
    why: 'A contract with its drivers takes a page or two; a text of this size is something else.',
    mend: 'Check that it is the file you mean; state families with `count` and regular dates with `every`.',
    evidence: { mostTextLength, mostPieces },
  });
}

function tooDeep(offset: number, findings: Findings): void {
  findings.add({
    code: 'scenario-too-deep',
    at: { start: offset, end: offset + 1 },
    what: `Groups and lists stand more than ${mostDepth} deep in one another here.`,
    why: 'The language needs fewer than ten levels; deeper texts could exhaust the memory of the program.',
    mend: 'Close what is left open above this place, or check that it is the file you mean.',
    evidence: { mostDepth },
  });
}
