import type { Graph, Node } from '../program/graph.js';
import { lower, type Meanings } from '../program/lower.js';
import type { Contract } from './contract.js';

/**
 * The contract's amounts at one date as the party who decides sees them: an issuer's signs are turned round. Where the
 * ending event holds, both amounts are what it pays: nothing else can be had there.
 */
export interface Amounts {
  /** What exercising brings, in money of today. */
  readonly payoff: Node;
  /** What the last decision date brings when the best is made of it. */
  readonly terminal: Node;
  /** 1 where the contract ends by its event; null where it has none. */
  readonly ended: Node | null;
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

/**
 * Writes payoff and terminal amount, discounted to today, into a graph.
 *
 * @param isDecisionDate 1 where the ending event is looked at, 0 today if nobody may decide today
 */
export function writeAmounts(
  graph: Graph,
  contract: Contract,
  meanings: Meanings,
  discountFactor: Node,
  isDecisionDate: Node,
): Amounts {
  const scale = (node: Node) => writeScaled(graph, contract, node, discountFactor);
  const payoff = scale(lower(contract.payoff.tree, graph, meanings));
  const terminal = writeTerminal(graph, contract, meanings, payoff, scale);
  const { endingEvent } = contract;
  if (endingEvent === null) return { payoff, terminal, ended: null };
  const event = lower(endingEvent.event.tree, graph, meanings);
  const ended = graph.apply('select', isDecisionDate, event, graph.constant(0));
  const pays = scale(lower(endingEvent.pays.tree, graph, meanings));
  const unlessEnded = (amount: Node) => graph.apply('select', ended, pays, amount);
  return { payoff: unlessEnded(payoff), terminal: unlessEnded(terminal), ended };
}

function writeTerminal(
  graph: Graph,
  { atExpiry }: Contract,
  meanings: Meanings,
  payoff: Node,
  scale: (node: Node) => Node,
): Node {
  if (atExpiry.kind === 'forced') return payoff;
  const unused = atExpiry.kind === 'lapse' ? graph.constant(0) : scale(lower(atExpiry.amount.tree, graph, meanings));
  return graph.apply('maximum', payoff, unused);
}
