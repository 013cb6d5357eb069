import { lawCatalogue } from '../laws/catalogue.js';
import { quoted } from '../messages/printable.js';
import { calendarDay } from './decision-dates.js';
import { readYesNo } from './names.js';
import type { Reading } from './reading.js';
import type { TextSpan } from './source-text.js';
import { entriesOf, itemsOf, type MapNode, type TreeNode } from './tree.js';

interface ClauseToCome {
  /** Keys from the top; `*` is any name or list item. */
  readonly path: readonly string[];
  /** The clause as the subject of a sentence, with its verb; `{value}` is what stands under the key. */
  readonly what: string;
  /** What to write until it is built. */
  readonly instead: string;
  /** Which values of the key are meant; all if absent. */
  readonly when?: (node: TreeNode) => boolean;
}

const leaveOut = 'Take the clause out to value the contract without it; that is then the value of another contract.';

const clauses: readonly ClauseToCome[] = [
  {
    path: ['calendar'],
    what: 'A calendar with day counts and holidays is',
    instead: 'Take it out, and write times in clock units from today.',
  },
  {
    path: ['constants', '*', 'table'],
    what: 'A constant that varies in time is',
    instead: 'Write one value that holds throughout.',
  },
  {
    path: ['drivers', '*', 'law'],
    what: 'The law {value} is',
    instead: 'Use lognormal or normal, whose steps are exact.',
    when: (node) => node.kind === 'scalar' && lawCatalogue.get(node.text)?.built === false,
  },
  {
    path: ['drivers', '*', 'observed'],
    what: 'A driver that nobody observes is',
    instead: 'Take the driver out, or write `observed: yes` to value the right of somebody who sees it.',
    when: (node) => !readYesNo(node, true),
  },
  {
    path: ['drivers', '*', 'jumps'],
    what: 'Jumps are',
    instead: 'Take them out; a higher volatility can stand in for their variance, not for their suddenness.',
  },
  {
    path: ['drivers', '*', 'regimes'],
    what: 'Regimes are',
    instead: 'Take them out, and run the scenario once for each regime.',
  },
  {
    path: ['drivers', '*', 'matched to'],
    what: 'A forward curve is',
    instead: 'Take it out, and choose one growth of the mean.',
  },
  {
    path: ['correlation', '*', 'factor'],
    what: 'Correlation by factors is',
    instead: 'Write { among: family, value } with one correlation for all pairs.',
  },
  {
    path: ['correlation', '*', 'blocks'],
    what: 'Correlation by blocks is',
    instead: 'Write { of: […], matrix: […] }.',
  },
  {
    path: ['contract', 'decided by'],
    what: 'A contract in which both sides may act is',
    instead: 'Write `holder` or `issuer`; each gives the value when the other side never acts.',
    when: (node) => node.kind === 'scalar' && node.text === 'both',
  },
  ...['decision dates'].map((key) => ({
    path: ['contract', key, '*'],
    what: 'A date of the calendar is',
    instead: 'Write times in clock units from today: half a year is 0.5 if the clock runs in years.',
    when: (node: TreeNode) => node.kind === 'scalar' && calendarDay.test(node.text),
  })),
  {
    path: ['contract', 'windows'],
    what: 'Exercise windows are',
    instead: 'Write the list of decision dates that lie in them.',
  },
  {
    path: ['contract', 'blackout'],
    what: 'Blackout dates are',
    instead: 'Leave these dates out of the list of decision dates.',
  },
  { path: ['contract', 'notice'], what: 'A notice period is', instead: leaveOut },
  {
    path: ['contract', 'payoff'],
    what: 'A payoff for each side is',
    instead: 'Write the one formula of the side that decides.',
    when: (node) => node.kind === 'map',
  },
  {
    path: ['contract', 'payoff'],
    what: 'A list of payoffs by date is',
    instead: 'Write one formula that uses the clock, as if(t <= 1, one, other).',
    when: (node) => node.kind === 'list',
  },
  {
    path: ['contract', 'discount'],
    what: 'A discount curve is',
    instead: 'Write one rate, a formula of constants.',
    when: (node) => node.kind === 'map',
  },
  { path: ['contract', 'while held'], what: 'Income while the contract is held is', instead: leaveOut },
  {
    path: ['contract', 'ends when'],
    what: 'A list of ending events is',
    instead:
      'Write one event that joins them with `or`, and what each pays as if(first event, its amount, other amount).',
    when: (node) => node.kind === 'list',
  },
  {
    path: ['contract', 'ends when', 'watched'],
    what: 'An ending event that is watched at every step is',
    instead:
      'Write `watched: decision dates`; that is then the value of another contract, which goes on where a path crosses between two dates and comes back.',
    when: (node) => node.kind === 'scalar' && node.text === 'steps',
  },
  {
    path: ['contract', 'rights'],
    what: 'Several rights are',
    instead: 'Take the clause out to value one right; n rights are worth at most n times that.',
  },
  { path: ['contract', 'modes'], what: 'Operating modes are', instead: leaveOut },
  { path: ['contract', 'starting mode'], what: 'A starting mode is', instead: leaveOut },
  {
    path: ['contract', 'if both act on one date'],
    what: 'A rule for both sides acting on one date is',
    instead: 'Take it out, and write `decided by: holder` or `issuer`.',
  },
  { path: ['contract', 'stored quantity'], what: 'A stored quantity is', instead: leaveOut },
  {
    path: ['method', 'steps between dates'],
    what: 'A finer step between dates is',
    instead: 'Take it out: the laws that are built step exactly from date to date.',
  },
  {
    path: ['what if'],
    what: 'A list of what-if cases is',
    instead: 'Take it out, and run each case with changed constants from outside.',
  },
];

/**
 * Names every clause and law in the scenario that the language understands and this version cannot value yet.
 *
 * Each is refused and never passed over: a value without the clause would be the value of another contract.
 *
 * @fails adds `not-built-yet`
 */
export function refuseUnbuilt(reading: Reading): void {
  for (const clause of clauses) visit(reading.root, clause.path, [], clause, reading);
}

function visit(
  node: TreeNode,
  path: readonly string[],
  names: readonly string[],
  clause: ClauseToCome,
  reading: Reading,
  at?: TextSpan,
): void {
  const [step, ...rest] = path;
  if (step === undefined) {
    if (clause.when?.(node) ?? true) refuse(names, clause, node, at ?? node.span, reading);
    return;
  }
  for (const { name, value, span } of children(node, step)) visit(value, rest, [...names, name], clause, reading, span);
}

function children(node: TreeNode, step: string): { name: string; value: TreeNode; span: TextSpan }[] {
  if (step === '*' && node.kind === 'list') {
    return itemsOf(node).map((value, index) => ({ name: `item ${index + 1}`, value, span: value.span }));
  }
  const entries = step === '*' ? entriesOf(node) : one(node, step);
  return entries.map(({ key, value, keySpan }) => ({ name: key, value, span: keySpan }));
}

function one(node: TreeNode, key: string) {
  const entry = (node as MapNode).entries?.get(key);
  return entry === undefined ? [] : [entry];
}

function refuse(
  names: readonly string[],
  { what, instead }: ClauseToCome,
  node: TreeNode,
  at: TextSpan,
  reading: Reading,
): void {
  const value = node.kind === 'scalar' ? quoted(node.text) : '';
  reading.findings.add({
    code: 'not-built-yet',
    at,
    what: `${what.replace('{value}', value)} understood, but not built yet.`,
    why: 'A value that leaves it out would be the value of something else, so nothing is computed.',
    mend: instead,
    evidence: { clause: names.map((name) => quoted(name)).join(' / ') },
  });
}
