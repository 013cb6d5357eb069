import type { AtExpiry, Contract } from '../clauses/contract.js';
import { nearest } from '../messages/nearest.js';
import { listed, quoted } from '../messages/printable.js';
import { functionShapes } from '../program/functions.js';
import { readDecisionDates } from './decision-dates.js';
import { readEndingEvent } from './ending-event.js';
import { echo, readExpression, readNumber } from './read-expression.js';
import { type Reading, stateScope } from './reading.js';
import { entryOf, type ScalarNode, type TreeNode, under } from './tree.js';

const atExpiryWords = ['lapse', 'forced'];

/**
 * Reads the contract. Clauses that are not built yet are passed over here; they have their own message.
 *
 * @fails adds `missing-key` for an issuer's `at expiry`, and the mistakes of dates and expressions
 */
export function readContract(reading: Reading): Contract | null {
  const node = under(reading.root, 'contract')!;
  const { settings } = reading;
  const decidedByNode = under(node, 'decided by');
  const decidedBy = decidedByNode?.kind === 'scalar' ? decidedByNode.text : 'holder';
  if (decidedByNode === undefined) settings.byDefault('contract.decided by', 'holder');
  else settings.fromText('contract.decided by', decidedBy, decidedByNode);
  const decisionDates = readDecisionDates(reading);
  const payoffNode = under(node, 'payoff');
  const payoff = readExpression(payoffNode, stateScope(reading, 'the payoff'), reading);
  if (payoff !== null) settings.fromText('contract.payoff', echo(payoff, null), payoffNode!);
  const atExpiry = readAtExpiry(node, decidedBy, reading);
  const mayEnd = node.kind === 'map' && node.entries.has('ends when');
  const endingEvent = mayEnd ? readEndingEvent(node, reading) : null;
  const discountNode = under(node, 'discount');
  const discount = readNumber(discountNode, 'the discount rate', reading);
  if (discount !== null)
    settings.fromText('contract.discount', echo(discount.expression, discount.value), discountNode!);
  if (decisionDates === null || payoff === null || atExpiry === null || discount === null) return null;
  if (decidedBy !== 'holder' && decidedBy !== 'issuer') return null;
  if (mayEnd && endingEvent === null) return null;
  return { decidedBy, decisionDates, payoff, atExpiry, endingEvent, discount: discount.expression };
}

/** A word alone that names nothing: not an amount, but a choice that was misspelt. */
function isWord({ value, text }: ScalarNode, reading: Reading): boolean {
  return typeof value === 'string' && /^[A-Za-z_]\w*(?: [A-Za-z_]\w*)*$/.test(text) && !/\b(?:and|or|not)\b/.test(text)
    ? text.includes(' ') || !(reading.symbols.has(text) || functionShapes.has(text))
    : false;
}

function notAtExpiry(node: ScalarNode, reading: Reading): null {
  const near = nearest(node.text, [...atExpiryWords, ...reading.symbols.keys()]);
  // Whoever says no to anything left at the end means that the right lapses.
  const says = /^(?:no|none|nothing|never)$/i.test(node.text) ? ['lapse'] : near;
  const names = [...says, ...atExpiryWords.filter((word) => node.text.toLowerCase().startsWith(word.slice(0, 4)))];
  const unique = [...new Set(names)];
  reading.findings.add({
    code: 'wrong-choice',
    at: node.span,
    what: `\`at expiry\` is ${quoted(node.text)}, which is neither \`lapse\` nor \`forced\` nor an amount.`,
    why: 'It decides what is paid if nothing was done by the last date.',
    mend: `Write \`lapse\` (nothing is paid), \`forced\` (the payoff is), or an amount.${unique.length === 0 ? '' : ` Near ${unique.length === 1 ? 'name' : 'names'}: ${listed(unique, 'and')}.`}`,
    evidence: { text: node.text.slice(0, 100), near: unique },
  });
  return null;
}

function readAtExpiry(contract: TreeNode, decidedBy: string, reading: Reading): AtExpiry | null {
  const node = under(contract, 'at expiry');
  const { settings, findings } = reading;
  if (node?.kind === 'scalar') {
    settings.fromText('contract.at expiry', node.text, node);
    if (node.value === 'lapse' || node.value === 'forced') return { kind: node.value };
    if (isWord(node, reading)) return notAtExpiry(node, reading);
    const amount = readExpression(node, stateScope(reading, 'the amount at expiry'), reading);
    return amount === null ? null : { kind: 'pays', amount };
  }
  if (decidedBy === 'holder') {
    settings.byDefault('contract.at expiry', 'lapse');
    return { kind: 'lapse' };
  }
  findings.add({
    code: 'missing-key',
    at: entryOf(contract, 'decided by')!.keySpan,
    what: 'The contract has no `at expiry`.',
    why: 'What an issuer owes if nothing was done by the last date differs from contract to contract, and decides the value.',
    mend: 'Add `at expiry: lapse` if nothing is owed then, `at expiry: forced` if the payoff is, or an amount.',
    evidence: { key: 'at expiry' },
  });
  return null;
}
