import { type LawEntry, lawCatalogue } from '../laws/catalogue.js';
import { quoted } from '../messages/printable.js';
import type { Reading } from './reading.js';
import { entriesOf, type TreeNode } from './tree.js';

const commonKeys = ['count', 'start', 'law', 'observed', 'jumps', 'regimes', 'matched to', 'between points'];

/** A law that the catalogue does not have. */
export function unknownLaw(lawName: string, node: TreeNode, reading: Reading): null {
  const built = [...lawCatalogue].filter(([, law]) => law.built).map(([name]) => name);
  reading.findings.add({
    code: 'unknown-law',
    at: node.span,
    what: `${quoted(lawName)} is not a law.`,
    why: 'The law says how a driver moves; without one no path can be drawn.',
    mend: `The laws that are built are ${built.join(' and ')}.`,
    evidence: { law: lawName.slice(0, 100), built },
    near: { word: lawName, among: lawCatalogue.keys() },
  });
  return null;
}

/** Keys of a driver that its law does not read. */
export function refuseForeignKeys(node: TreeNode, lawName: string, law: LawEntry, reading: Reading): void {
  const own = [...law.parameters.map(({ key }) => key), ...law.otherKeys];
  for (const { key, keySpan } of entriesOf(node)) {
    if (commonKeys.includes(key) || own.includes(key)) continue;
    reading.findings.add({
      code: 'key-of-another-law',
      at: keySpan,
      what: `The law ${lawName} has no ${quoted(key)}.`,
      why: 'The key belongs to another law; it would be passed over in silence.',
      mend: `The law ${lawName} reads ${own.join(', ')}. Take the key away, or change the law.`,
      evidence: { key, law: lawName, own },
    });
  }
}
