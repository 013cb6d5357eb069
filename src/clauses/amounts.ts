import type { Graph, Node } from '../program/graph.js';
import { lower, type Meanings } from '../program/lower.js';
import type { Contract } from './contract.js';

/** The contract's amounts at one date as the party who decides sees them: an issuer's signs are turned round. */
export interface Amounts {
  /** What exercising brings, in money of today. */
  readonly payoff: Node;
  /** What the last decision date brings when the best is made of it. */
  readonly terminal: Node;
}

/** +1 for the holder, who wants much; -1 for the issuer, who pays it: inside, somebody always maximises. */
export function decisionSign(contract: Contract): 1 | -1 {
  return contract.decidedBy === 'holder' ? 1 : -1;
}

/** Turns an amount as the holder receives it into money of today as the party who decides sees it. */
export function writeScaled(graph: Graph, contract: Contract, amount: Node, discountFactor: Node): Node {
  const discounted = graph.multiply(amount, discountFactor);
  return decisionSign(contract) === 1 ? discounted : graph.apply('negate', discounted);
}

/** Writes payoff and terminal amount, discounted to today, into a graph. */
export function writeAmounts(graph: Graph, contract: Contract, meanings: Meanings, discountFactor: Node): Amounts {
  const scale = (node: Node) => writeScaled(graph, contract, node, discountFactor);
  const payoff = scale(lower(contract.payoff.tree, graph, meanings));
  const { atExpiry } = contract;
  if (atExpiry.kind === 'forced') return { payoff, terminal: payoff };
  const unused = atExpiry.kind === 'lapse' ? graph.constant(0) : scale(lower(atExpiry.amount.tree, graph, meanings));
  return { payoff, terminal: graph.apply('maximum', payoff, unused) };
}

/**
 * A proved lower bound on what holding is worth to the party who decides, or null if there is none.
 *
 * A right that may lapse can always be left unused, which brings 0; nothing is proved once holding may cost.
 */
export function continuationFloor(contract: Contract): 0 | null {
  return contract.atExpiry.kind === 'lapse' ? 0 : null;
}
