import type { EndingEvent } from '../clauses/contract.js';
import { defaultExpression, echo, readExpression } from './read-expression.js';
import { type Reading, stateScope } from './reading.js';
import { entryOf, type MapNode, under } from './tree.js';

const watchedMend =
  'Add `watched: decision dates`: the event is then looked at on each decision date, before anybody decides.';

/**
 * Reads the clause `ends when`; null after a mistake, and for what is not built yet, which has its own message.
 *
 * How the event is watched must be stated: a price that crosses a level between two dates and comes back ends one
 * contract and not another.
 *
 * @fails adds `missing-key` and the mistakes of the expressions
 */
export function readEndingEvent(contract: MapNode, reading: Reading): EndingEvent | null {
  const { keySpan, value: clause } = entryOf(contract, 'ends when')!;
  if (clause.kind !== 'map') return null;
  const { settings, findings } = reading;
  const missing = (key: string, why: string, mend: string) =>
    findings.add({
      code: 'missing-key',
      at: keySpan,
      what: `\`contract / ends when\` has no \`${key}\`.`,
      why,
      mend,
      evidence: { key },
    });

  const eventNode = under(clause, 'event');
  if (eventNode === undefined) {
    const mend = 'Add `event:` with a condition, as `event: largest(lot) >= 170`.';
    missing('event', 'It is the condition that ends the contract.', mend);
  }
  const event = readExpression(eventNode, stateScope(reading, 'the ending event'), reading, 'condition');
  if (event !== null) settings.fromText('contract.ends when.event', echo(event, null), eventNode!);

  const watchedNode = under(clause, 'watched');
  if (watchedNode === undefined) {
    const why = 'When somebody looks decides which paths end, and so the value; nothing that could be assumed is safe.';
    missing('watched', why, watchedMend);
  } else if (watchedNode.kind === 'scalar') {
    settings.fromText('contract.ends when.watched', watchedNode.text, watchedNode);
  }

  const paysNode = under(clause, 'pays');
  if (paysNode === undefined) settings.byDefault('contract.ends when.pays', '0');
  const pays =
    paysNode === undefined
      ? defaultExpression(0)
      : readExpression(paysNode, stateScope(reading, 'what the ending event pays'), reading);
  if (pays !== null && paysNode !== undefined) settings.fromText('contract.ends when.pays', echo(pays, null), paysNode);
  return event === null || pays === null || watchedNode === undefined ? null : { event, pays };
}
