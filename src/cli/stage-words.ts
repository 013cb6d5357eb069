import type { Progress } from '../run/options.js';

const STAGE_WORDS: Readonly<Record<Progress['stage'], string>> = {
  fit: 'fitting the rule',
  select: 'trying the basis',
  pilot: 'pilot',
  bounds: 'both bounds',
  nested: 'Andersen-Broadie bound',
};

/** Room for the longest words, so that the bar does not move between stages. */
export const stageWordsWidth = 'Andersen-Broadie bound, round 2'.length;

/** What a run is doing, in words: the columns while sizes of the basis are compared, the round from the second on. */
export function stageWords({ stage, round = 1, columnCount }: Progress): string {
  const words = STAGE_WORDS[stage];
  if (stage === 'fit' || stage === 'select') {
    const columns = columnCount === 1 ? '1 column' : `${columnCount} columns`;
    return columnCount === undefined ? words : `${words}, ${columns}`;
  }
  return stage !== 'pilot' && round > 1 ? `${words}, round ${round}` : words;
}
