import { printable } from '../messages/printable.js';
import type { RoundFinding } from '../result/record.js';
import { decimalsFor, fixed, grouped } from './numbers.js';
import { paragraph } from './prose.js';
import type { Style } from './style.js';
import { layOut } from './table.js';

/** A probability as a percentage with as many digits as it needs: 5%, 2.5%, 1.25%. */
function probability(share: number): string {
  return `${Number((100 * share).toPrecision(3))}%`;
}

/** The rounds of final draws, and what it means that there was more than one. */
export function roundsText(rounds: readonly RoundFinding[], money: string, width: number, style: Style): string {
  const widths = rounds.map(({ low, high }) => high - low);
  const decimals = decimalsFor(widths.reduce((least, found) => Math.min(least, Math.abs(found))));
  const table = layOut(
    {
      heads: ['round', 'paths', 'inner points', 'width', 'standard errors', 'may miss'],
      rows: rounds.map(({ round, outerPathCount, innerPointCount, standardErrors, errorProbability }, index) => [
        String(round),
        grouped(outerPathCount),
        grouped(innerPointCount),
        fixed(widths[index]!, decimals),
        standardErrors.toFixed(2),
        probability(errorProbability),
      ]),
      rightColumns: [0, 1, 2, 3, 4, 5],
    },
    style,
  );
  const all = rounds.reduce((sum, { errorProbability }) => sum + errorProbability, 0);
  const meaning = `Noise left the first bracket wider than wanted, so the bounds were drawn again on fresh paths that serve nothing else. The bracket above is that of the last round. Widths are in ${printable(money)}; standard errors lie between each bound and its end of the bracket. A round may miss the value with the probability beside it at most, all of them together with ${probability(all)}.`;
  return `${table}\n\n${paragraph(meaning, width)}`;
}
