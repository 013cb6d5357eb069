import { distance } from 'fastest-levenshtein';

const longestWord = 60;
const mostCandidates = 2000;
const mostNames = 3;

/**
 * At most three names that somebody who wrote `word` may have meant, the nearest first.
 *
 * A name is plausible if it needs few edits for its length (one in three characters), or if it differs only in capital
 * letters, spaces, hyphens and underscores. Long words and long lists are cut, because both may come from a hostile text.
 *
 * @cost proportional to the number of candidates of a similar length, at most 2000 of them
 * @example nearest('volatilty', ['volatility', 'drift']) // ['volatility']
 */
export function nearest(word: string, candidates: Iterable<string>): string[] {
  if (word.length === 0 || word.length > longestWord) return [];
  const wanted = bare(word);
  const found: { name: string; edits: number }[] = [];
  let count = 0;
  for (const name of candidates) {
    if (name === word || Math.abs(name.length - word.length) > 1 + word.length / 3) continue;
    count += 1;
    if (count > mostCandidates) break;
    const edits = bare(name) === wanted ? 0 : editsBetween(name.toLowerCase(), word.toLowerCase());
    if (edits <= allowedEdits(Math.max(word.length, name.length))) found.push({ name, edits });
  }
  found.sort((a, b) => a.edits - b.edits);
  return found.slice(0, mostNames).map(({ name }) => name);
}

/** Single letters added, dropped or changed; two neighbours that changed places count once. */
function editsBetween(name: string, word: string): number {
  const edits = distance(name, word);
  const isSwap = edits === 2 && name.length === word.length && [...name].sort().join('') === [...word].sort().join('');
  return isSwap ? 1 : edits;
}

/** One edit in a word of up to five characters, then one more for every three. */
function allowedEdits(length: number): number {
  return length <= 2 ? 0 : Math.max(1, Math.floor(length / 3));
}

function bare(name: string): string {
  return name.toLowerCase().replace(/[\s_-]+/g, '');
}
