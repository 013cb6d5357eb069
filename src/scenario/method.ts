import { figure } from '../messages/figures.js';
import type { PlacedExpression } from '../program/expression.js';
import { readBracketWidth } from './bracket-width.js';
import type { Method, UpperMethod } from './model.js';
import { echo, readExpression, readNumber } from './read-expression.js';
import { type Reading, stateScope } from './reading.js';
import { entryOf, itemsOf, type TreeNode, under } from './tree.js';
import { upperMethods } from './upper-methods.js';

const mostPaths = 100_000_000;
/** One path has no standard error. */
const fewestOuterPaths = 2;
const mostInnerPoints = 65_536;

/**
 * Reads how the bracket is to be made.
 *
 * @fails adds `value-out-of-range`, `width-and-counts`, `count-without-use`, `bad-override` and the mistakes of the basis
 */
export function readMethod(reading: Reading): Method | null {
  const node = under(reading.root, 'method');
  const before = reading.findings.count;
  const basis = readBasis(node, reading);
  const counts = under(node, 'counts');
  const bracketWidth = readBracketWidth(node, reading);
  const count = (group: TreeNode | undefined, key: string, name: string, most: number, least = 1) =>
    readCount(group, key, name, { least, most }, reading);
  const fitPathCount = count(counts, 'fit', 'method.counts.fit', mostPaths);
  const outerPathCount = count(counts, 'outer', 'method.counts.outer', mostPaths, fewestOuterPaths);
  const innerPointCount = count(counts, 'inner', 'method.counts.inner', mostInnerPoints, 0);
  const upper = readUpper(node, reading);
  if (innerPointCount === 0 && upper === 'one-step') refuseNoInnerPoints(node, reading);
  const nested = under(node, 'upper');
  const nestedOuterPathCount = count(nested, 'outer', 'method.upper.outer', mostPaths, fewestOuterPaths);
  const nestedInnerPathCount = count(nested, 'inner', 'method.upper.inner', mostInnerPoints);
  if (reading.findings.count > before || bracketWidth === null || upper === null || basis === null) return null;
  return {
    basis,
    bracketWidth,
    fitPathCount,
    outerPathCount,
    innerPointCount,
    upper,
    nestedOuterPathCount,
    nestedInnerPathCount,
  };
}

function readBasis(method: TreeNode | undefined, reading: Reading): Method['basis'] | null {
  const node = under(method, 'basis');
  if (node === undefined) reading.settings.byDefault('method.basis', 'auto');
  if (node?.kind === 'scalar') reading.settings.fromText('method.basis', 'auto', node);
  if (node?.kind !== 'list') return 'auto';
  if (node.items.length === 0) {
    reading.findings.add({
      code: 'value-out-of-range',
      at: node.span,
      what: 'The basis is an empty list.',
      why: 'A regression needs at least one column beside the constant.',
      mend: 'Write `basis: auto`, or a list of formulas.',
    });
    return null;
  }
  const columns = itemsOf(node).map((item, index) => {
    const column = readExpression(item, stateScope(reading, 'the basis'), reading);
    if (column !== null) reading.settings.fromText(`method.basis.${index + 1}`, echo(column, null), item);
    return column;
  });
  return columns.includes(null) ? null : (columns as PlacedExpression[]);
}

function readCount(
  group: TreeNode | undefined,
  key: string,
  setting: string,
  { least, most }: { readonly least: number; readonly most: number },
  reading: Reading,
): number | null {
  const node = under(group, key);
  const found = readNumber(node, `\`${key}\``, reading);
  if (node === undefined || found === null) return null;
  const { value } = found;
  if (Number.isInteger(value) && value >= least && value <= most) {
    reading.settings.fromText(setting, String(value), node);
    return value;
  }
  reading.findings.add({
    code: 'value-out-of-range',
    at: node.span,
    what: `\`${key}\` is ${figure(value)}; it must be a whole number from ${least} to ${most}.`,
    why:
      value === 0
        ? 'Without any paths there is no estimate.'
        : least > 1
          ? 'Paths are counted, and the error of one path alone is unknown.'
          : 'Paths and points are counted.',
    mend: `Write a whole number from ${least} to ${most}, or take the key away and leave the count to the pilot.`,
    evidence: { key, value, least, most },
  });
  return null;
}

function readUpper(method: TreeNode | undefined, reading: Reading): UpperMethod | null {
  const { overrides, settings } = reading;
  const node = under(method, 'upper');
  const methodNode = node?.kind === 'map' ? under(node, 'method') : node;
  const stated = methodNode?.kind === 'scalar' ? (methodNode.text as UpperMethod) : null;
  refuseIdleCounts(node, stated ?? 'one-step', reading);
  if (overrides.upper !== undefined) {
    if (!upperMethods.includes(overrides.upper)) return badUpper(String(overrides.upper), reading);
    settings.fromCommandLine('method.upper', overrides.upper);
    return overrides.upper;
  }
  if (stated === null) settings.byDefault('method.upper', 'one-step');
  else settings.fromText('method.upper', stated, methodNode!);
  return stated ?? 'one-step';
}

/** Only the nested bound has counts of its own; the others share the outer paths of the bracket. */
function refuseIdleCounts(node: TreeNode | undefined, stated: UpperMethod, reading: Reading): void {
  if (stated === 'andersen-broadie') return;
  for (const key of ['outer', 'inner']) {
    const entry = entryOf(node, key);
    if (entry === undefined) continue;
    reading.findings.add({
      code: 'count-without-use',
      at: entry.keySpan,
      what: `The upper bound ${stated} has no \`${key}\` of its own.`,
      why: 'It is computed on the outer paths of the bracket; a count here would change nothing.',
      mend: `Write \`${key}\` under \`counts\`, or \`method: andersen-broadie\`.`,
      evidence: { key, method: stated },
    });
  }
}

/** The one-step bound is a mean over inner points. */
function refuseNoInnerPoints(method: TreeNode | undefined, { findings, overrides }: Reading): void {
  const isOverride = overrides.upper !== undefined;
  const origin = isOverride ? ', from `--upper`,' : under(method, 'upper') === undefined ? ', the default,' : '';
  findings.add({
    code: isOverride ? 'bad-override' : 'value-out-of-range',
    at: under(under(method, 'counts'), 'inner')!.span,
    what: `\`inner\` is 0, but the upper bound \`one-step\`${origin} is made with inner points.`,
    why: 'Without them the bracket can be made by the regressed martingale or by the nested bound only.',
    mend: isOverride
      ? 'Leave `--upper` out, or write an `inner` from 1 up.'
      : 'Write `upper: regressed` (or `andersen-broadie`) under method, or an `inner` from 1 up.',
    evidence: { inner: 0, upper: 'one-step', ...(isOverride ? { override: '--upper' } : {}) },
  });
}

function badUpper(upper: string, reading: Reading): null {
  reading.findings.add({
    code: 'bad-override',
    at: null,
    what: `The upper bound asked for, \`${upper.slice(0, 60)}\`, does not exist.`,
    why: 'Another bound than the one meant would be reported.',
    mend: `Choose one of ${upperMethods.join(', ')}.`,
    evidence: { upper: upper.slice(0, 60), override: '--upper' },
    near: { word: upper, among: upperMethods },
  });
  return null;
}
