import { printable } from '../messages/printable.js';
import type { SelectionFinding, SizesEnded } from '../result/record.js';
import { decimalsFor, fixed, grouped } from './numbers.js';
import { paragraph } from './prose.js';
import type { Style } from './style.js';
import { layOut } from './table.js';

const WHY_ENDED: Readonly<Record<SizesEnded, string>> = {
  'width in reach':
    'No larger size was tried: the wanted width is in reach, for no more work than the next fit would take.',
  'no gain': 'No larger size was tried: the last ones brought nothing worth their work.',
  'no larger size': 'There is no larger size for this scenario.',
  'larger size too costly': 'No larger size was tried: it would cost more than the run may take.',
  'too few paths': 'No larger size was tried: the paths of the fit that the scenario fixes are too few for it.',
  'too little memory': 'No larger size was tried: it does not fit into the memory.',
};

/** Which sizes of the automatic basis were fitted and tried, which was kept, and why the search ended there. */
export function selectionText(selection: SelectionFinding, money: string, width: number, style: Style): string {
  const { tried, chosenSize, ended, outerPathCount } = selection;
  const narrowest = tried.reduce(
    (least, { expectedWidth }) => Math.min(least, expectedWidth),
    Number.POSITIVE_INFINITY,
  );
  const decimals = decimalsFor(narrowest);
  const table = layOut(
    {
      heads: ['columns', 'paths', 'gap', 'width', ''],
      rows: tried.map(({ basisSize, columnCount, fitPathCount, gap, expectedWidth }) => [
        grouped(columnCount),
        grouped(fitPathCount),
        fixed(gap, decimals),
        fixed(expectedWidth, decimals),
        basisSize === chosenSize ? style('good', 'kept') : '',
      ]),
      rightColumns: [0, 1, 2, 3],
    },
    style,
  );
  const meaning = `Each size was tried on paths that serve nothing else, the kept one on ${grouped(outerPathCount)}. Paths are those of the fit; the width is that of the bracket, in ${printable(money)}, that a run with it is expected to bring. ${WHY_ENDED[ended]}`;
  return `${table}\n\n${paragraph(meaning, width)}`;
}
