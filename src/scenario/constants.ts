import { figure } from '../messages/figures.js';
import { listed, quoted } from '../messages/printable.js';
import { checkExpression, usedSymbols } from '../program/check-expression.js';
import type { PlacedExpression } from '../program/expression.js';
import { parseExpression } from '../program/parse.js';
import { constantCycle, dependencyOrder } from './dependency-order.js';
import type { Findings } from './findings.js';
import type { Constant } from './model.js';
import { computed, echo, readExpression, readNumber } from './read-expression.js';
import { constantScope, type Reading } from './reading.js';
import { notFinite } from './structure.js';
import { type Entry, entriesOf, type TreeNode, under } from './tree.js';

/** The most constants that a scenario may have. */
export const mostConstants = 2000;

/** How many constants a message lists. */
const mostListed = 10;

/**
 * Holds the number of constants to its limit.
 *
 * @fails adds `too-many-constants`, placed at the first one beyond
 */
export function limitConstants(root: TreeNode, findings: Findings): void {
  const entries = entriesOf(under(root, 'constants'));
  if (entries.length <= mostConstants) return;
  findings.add({
    code: 'too-many-constants',
    at: entries[mostConstants]!.keySpan,
    what: `The scenario has ${entries.length} constants; at most ${mostConstants} are taken.`,
    why: 'Every one of them is checked, echoed and kept with the record; no reader could check so many.',
    mend: 'State what belongs to the members of a family as a list under its own keys, as `start: [ … ]`.',
    evidence: { count: entries.length, mostConstants },
  });
}

interface Statement {
  readonly entry: Entry;
  readonly expression: PlacedExpression;
  /** Where the value stands; null if it came from the command line. */
  readonly node: TreeNode | null;
  /** How an override is called in a message. */
  readonly label: string | null;
}

/**
 * Reads the constants, which may be stated through one another in any order, and computes them.
 *
 * @fails adds mistakes of expressions, `constant-cycle`, `not-finite-value`, `value-out-of-range` and, for overrides,
 * `unknown-name` and `bad-override`
 */
export function readConstants(reading: Reading): Constant[] {
  const overrides = readOverrides(reading);
  const statements = new Map<string, Statement>();
  for (const entry of entriesOf(under(reading.root, 'constants'))) {
    if (reading.symbols.get(entry.key)?.kind !== 'constant') continue;
    const statement = readStatement(entry, overrides.get(entry.key), reading);
    if (statement !== null) statements.set(entry.key, statement);
  }
  const dependencies = new Map<string, string[]>();
  for (const [name, { expression }] of statements) {
    dependencies.set(
      name,
      [...usedSymbols(expression.tree, reading).constants].filter((other) => statements.has(other)),
    );
  }
  const { order, cycles } = dependencyOrder(dependencies);
  for (const cycle of cycles) {
    const isOverridden = cycle.some((name) => statements.get(name)!.node === null);
    constantCycle(cycle, statements.get(cycle[0]!)!.entry.keySpan, isOverridden, reading.findings);
  }
  for (const name of order) compute(name, statements.get(name)!, reading);
  return [...statements.values()].flatMap((statement) => finish(statement, reading));
}

/** The expression of a constant: from the command line if given there, else from the file. */
function readStatement(entry: Entry, override: Override | undefined, reading: Reading): Statement | null {
  const { key, keySpan } = entry;
  const node = entry.value.kind === 'map' ? under(entry.value, 'value') : entry.value;
  const hasTable = under(entry.value, 'table') !== undefined;
  if (node !== undefined && hasTable) twoForms(entry, reading);
  if (node === undefined && !hasTable) {
    reading.findings.add({
      code: 'missing-key',
      at: keySpan,
      what: `The constant ${quoted(key)} has no \`value\`.`,
      why: 'A constant without a value cannot be computed with.',
      mend: 'Add the key `value`.',
      evidence: { key: 'value' },
    });
  }
  if (node === undefined) return null;
  const expression = readExpression(node, constantScope(reading, `the constant ${quoted(key)}`), reading);
  if (override !== undefined) return { entry, ...override, node: null };
  return expression === null ? null : { entry, expression, node, label: null };
}

function twoForms({ key, keySpan }: Entry, reading: Reading): void {
  reading.findings.add({
    code: 'mixed-forms',
    at: keySpan,
    what: `The constant ${quoted(key)} has both a \`value\` and a \`table\`.`,
    why: 'Only one of them can hold.',
    mend: 'Take one of the two away.',
  });
}

function compute(name: string, { expression, node, label }: Statement, reading: Reading): void {
  const value = computed(expression.tree, reading);
  if (value === null) return;
  if (Number.isFinite(value)) reading.constantValues.set(name, value);
  else if (label !== null) overrideNotFinite(label, reading);
  else notFinite(`The constant ${quoted(name)}`, node?.span ?? null, reading.findings);
}

function overrideNotFinite(label: string, { findings }: Reading): void {
  findings.add({
    code: 'not-finite-value',
    at: null,
    what: `${label}: the expression gives no finite number.`,
    why: 'Everything computed from it would be without meaning.',
    mend: 'Give an expression with a finite value.',
    evidence: { override: '--with' },
  });
}

/** The constant with its remaining keys, and its echo; nothing if it has no value. */
function finish({ entry, expression, node }: Statement, reading: Reading): Constant[] {
  const { key: name, keySpan } = entry;
  const plausible = readPlausible(entry, reading);
  const value = reading.constantValues.get(name);
  if (value === undefined) return [];
  const underNode = under(entry.value, 'measured under');
  const measuredUnder = underNode?.kind === 'scalar' ? (underNode.value as 'pricing' | 'history') : null;
  const { settings } = reading;
  if (node === null) settings.fromCommandLine(`constants.${name}`, echo(expression, value));
  else settings.fromText(`constants.${name}`, echo(expression, value), node);
  const plausibleNode = under(entry.value, 'plausible');
  if (plausible !== null) settings.fromText(`constants.${name}.plausible`, String(plausible), plausibleNode!);
  if (measuredUnder !== null) settings.fromText(`constants.${name}.measured under`, measuredUnder, underNode!);
  return [{ name, value, plausible, measuredUnder, line: reading.source.lineOf(keySpan.start) }];
}

function readPlausible(entry: Entry, reading: Reading): number | null {
  const node = under(entry.value, 'plausible');
  const found = readNumber(node, `the plausible change of ${quoted(entry.key)}`, reading);
  if (found === null) return null;
  if (found.value >= 0) return found.value;
  reading.findings.add({
    code: 'value-out-of-range',
    at: node!.span,
    what: `The plausible change of ${quoted(entry.key)} is ${figure(found.value)}.`,
    why: 'It is the size of a change and has no sign.',
    mend: 'Write a number that is not negative.',
    evidence: { value: found.value },
  });
  return null;
}

interface Override {
  readonly expression: PlacedExpression;
  readonly label: string;
}

/** Names in a row, and how many more there are. */
function some(names: readonly string[]): string {
  if (names.length <= mostListed) return listed(names, 'or');
  return `${names.slice(0, mostListed).map(quoted).join(', ')} or one of ${names.length - mostListed} more`;
}

/** The constants stated from outside, by name. */
function readOverrides(reading: Reading): Map<string, Override> {
  const { overrides, findings } = reading;
  const found = new Map<string, Override>();
  const constants = [...reading.symbols].filter(([, { kind }]) => kind === 'constant').map(([name]) => name);
  for (const [name, text] of Object.entries(overrides.with ?? {})) {
    const label = `The override ${quoted(`${name} = ${String(text)}`)}`;
    if (reading.unclear.has(name)) continue;
    if (reading.symbols.get(name)?.kind !== 'constant') {
      findings.add({
        code: 'unknown-name',
        at: null,
        what: `${label} names no constant of this scenario.`,
        why: 'An override replaces the value of a constant that the scenario states; a misspelt one would change nothing.',
        mend:
          constants.length === 0
            ? 'State constants in the scenario first.'
            : `Name a constant of the scenario: ${some(constants)}.`,
        evidence: { name, override: '--with' },
        near: { word: name, among: constants },
      });
      continue;
    }
    const expression = readOverride(String(text), label, name, reading);
    if (expression !== null) found.set(name, { expression, label });
  }
  return found;
}

function readOverride(text: string, label: string, name: string, reading: Reading): PlacedExpression | null {
  const parsed = parseExpression(text);
  const scope = constantScope(reading, `the constant ${quoted(name)}`);
  const problems = 'problem' in parsed ? [parsed.problem] : checkExpression(parsed.tree, scope);
  for (const { code, span, what, why, mend, evidence } of problems) {
    const at = `at character ${span.start + 1}`;
    reading.findings.add({
      code,
      at: null,
      what: `${label}, ${at}: ${what}`,
      why,
      mend,
      evidence: { ...evidence, name, text, ...span, override: '--with' },
    });
  }
  if ('problem' in parsed || problems.length > 0) return null;
  return { text, tree: parsed.tree, line: null, column: null };
}
