import { decisionSign } from './amounts.js';
import type { Contract } from './contract.js';
import { type KnownSigns, provedSign } from './proved-sign.js';

/**
 * A proved lower bound on what holding is worth to the party who decides, or null if there is none.
 *
 * A right that may lapse can always be left unused, which brings 0; nothing is proved once holding may cost, as it does
 * where an ending event may make the party who decides pay.
 */
export function continuationFloor(contract: Contract, known: KnownSigns): 0 | null {
  const { atExpiry, endingEvent } = contract;
  if (atExpiry.kind !== 'lapse') return null;
  if (endingEvent === null) return 0;
  const { neverNegative, neverPositive } = provedSign(endingEvent.pays.tree, known);
  return (decisionSign(contract) === 1 ? neverNegative : neverPositive) ? 0 : null;
}
