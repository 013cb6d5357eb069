import { type LawEntry, lawCatalogue } from '../laws/catalogue.js';
import type { LawParameter } from '../laws/parameters.js';
import { quoted } from '../messages/printable.js';
import type { PlacedExpression } from '../program/expression.js';
import { refuseForeignKeys, unknownLaw } from './law-keys.js';
import { finite, judge, memberValues, notNegative, positive } from './member-values.js';
import type { DriverFamily, LawName } from './model.js';
import { readYesNo } from './names.js';
import { computed, defaultExpression, echo, readExpression } from './read-expression.js';
import { memberScope, type Reading } from './reading.js';
import { type Entry, entriesOf, itemsOf, type TreeNode, under } from './tree.js';

/**
 * Reads drivers and families with their laws; those with a mistake, or with a law that is not built yet, are left out.
 *
 * @fails adds `unknown-law`, `key-of-another-law`, `missing-key`, `start-count`, `value-out-of-range`,
 * `not-finite-value` and the mistakes of expressions
 */
export function readDrivers(reading: Reading): DriverFamily[] {
  return entriesOf(under(reading.root, 'drivers')).flatMap((entry) => {
    const family = readDriver(entry, reading);
    return family === null ? [] : [family];
  });
}

function readDriver(entry: Entry, reading: Reading): DriverFamily | null {
  const { key: name, keySpan, value: node } = entry;
  const lawNode = under(node, 'law')!;
  const lawName = lawNode.kind === 'scalar' ? lawNode.text : '';
  const law = lawCatalogue.get(lawName);
  if (law === undefined) return unknownLaw(lawName, lawNode, reading);
  refuseForeignKeys(node, lawName, law, reading);
  const symbol = reading.symbols.get(name);
  if (!law.built || (symbol?.kind !== 'family' && symbol?.kind !== 'driver')) return null;
  const isFamily = symbol.kind === 'family';
  const count = symbol.kind === 'family' ? symbol.count : 1;
  const { settings } = reading;
  if (isFamily && count !== null) settings.fromText(`drivers.${name}.count`, String(count), under(node, 'count')!);
  settings.fromText(`drivers.${name}.law`, lawName, lawNode);
  const start = readStart(entry, law, count, reading);
  const parameters: Record<string, PlacedExpression> = {};
  let isComplete = start !== null && count !== null;
  for (const parameter of law.parameters) {
    const expression = readParameter(entry, lawName, parameter, count, reading);
    if (expression === null) isComplete = false;
    else parameters[parameter.key] = expression;
  }
  const observedNode = under(node, 'observed');
  const observed = readYesNo(observedNode, true);
  if (observedNode === undefined) settings.byDefault(`drivers.${name}.observed`, 'yes');
  else settings.fromText(`drivers.${name}.observed`, observed ? 'yes' : 'no', observedNode);
  if (!isComplete) return null;
  const line = reading.source.lineOf(keySpan.start);
  return { name, isFamily, count: count!, law: lawName as LawName, start: start!, parameters, observed, line };
}

function readParameter(
  { key: name, keySpan, value }: Entry,
  lawName: string,
  parameter: LawParameter,
  count: number | null,
  reading: Reading,
) {
  const { key, meaning } = parameter;
  const node = under(value, key);
  const setting = `drivers.${name}.${key}`;
  if (node !== undefined) {
    const expression = readExpression(
      node,
      memberScope(reading, `${quoted(key)} of ${quoted(name)}`, count ?? 1),
      reading,
    );
    if (expression === null) return null;
    const range = parameter.range === 'finite' ? finite : notNegative;
    const values = memberValues(expression, `${quoted(key)} of ${quoted(name)}`, node, count, range, reading);
    reading.settings.fromText(setting, echo(expression, values?.length === 1 ? values[0]! : null), node);
    return values === null ? null : expression;
  }
  if (parameter.default === null) {
    reading.findings.add({
      code: 'missing-key',
      at: keySpan,
      what: `The driver ${quoted(name)} has no ${quoted(key)}.`,
      why: `The law ${lawName} needs ${meaning}; there is no value of it that would be safe to assume.`,
      mend: `Add the key ${quoted(key)}.`,
      evidence: { key, law: lawName },
    });
    return null;
  }
  reading.settings.byDefault(setting, String(parameter.default));
  return defaultExpression(parameter.default);
}

/** One expression for all members, or a list with one for each. */
function readStart(
  { key: name, keySpan, value }: Entry,
  law: LawEntry,
  count: number | null,
  reading: Reading,
): PlacedExpression[] | null {
  const node = under(value, 'start');
  const label = `The start of ${quoted(name)}`;
  const range = law.startRange === 'positive' ? positive : finite;
  if (node === undefined) {
    reading.findings.add({
      code: 'missing-key',
      at: keySpan,
      what: `The driver ${quoted(name)} has no \`start\`.`,
      why: 'Every path begins with the value that is observed today.',
      mend: 'Add the key `start`.',
      evidence: { key: 'start' },
    });
    return null;
  }
  const scope = memberScope(reading, `the start of ${quoted(name)}`, count ?? 1);
  if (node.kind === 'scalar') {
    const expression = readExpression(node, scope, reading);
    if (expression === null) return null;
    const values = memberValues(expression, label, node, count, range, reading);
    reading.settings.fromText(
      `drivers.${name}.start`,
      echo(expression, values?.length === 1 ? values[0]! : null),
      node,
    );
    return values === null ? null : [expression];
  }
  const items = itemsOf(node);
  if (count !== null && items.length !== count) return wrongStartCount(name, items.length, count, node, reading);
  const expressions = items.map((item, index) => {
    const expression = readExpression(item, scope, reading);
    if (expression === null) return null;
    const value = computed(expression.tree, reading, index + 1);
    return value !== null && judge(`${label}, item ${index + 1},`, value, range, item, reading) ? expression : null;
  });
  reading.settings.fromText(`drivers.${name}.start`, shortList(items), node);
  return expressions.includes(null) ? null : (expressions as PlacedExpression[]);
}

function shortList(items: readonly TreeNode[]): string {
  const shown = items.slice(0, 6).map((item) => (item.kind === 'scalar' ? item.text : '…'));
  return `[${shown.join(', ')}${items.length > 6 ? ', …' : ''}]`;
}

function wrongStartCount(name: string, found: number, count: number, node: TreeNode, reading: Reading): null {
  reading.findings.add({
    code: 'start-count',
    at: { start: node.span.start, end: node.span.start + 1 },
    what: `${quoted(name)} has ${found} starting ${found === 1 ? 'value' : 'values'} for ${count} ${count === 1 ? 'driver' : 'members'}.`,
    why: 'Each member begins with its own value, and one list item belongs to each.',
    mend:
      count === 1 ? 'Write one value without a list.' : `Write ${count} values, or one value that all of them share.`,
    evidence: { found, count },
  });
  return null;
}
