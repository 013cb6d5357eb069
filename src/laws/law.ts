import type { Graph, Node } from '../program/graph.js';
import type { Innovation } from './innovation.js';
import type { LawParameter } from './parameters.js';

/** What a step of one driver may use. */
export interface StepInputs {
  /** The driver's value before the step. */
  readonly state: Node;
  /** The driver's correlated innovation: standard, but no longer independent of the other drivers'. */
  readonly shock: Node;
  /** Length of the step in clock units; the same for all lanes. */
  readonly duration: Node;
  /** A parameter of the law by its key in the scenario. */
  parameter(key: string): Node;
}

/** How a driver moves from one date to the next. */
export interface Law {
  readonly name: string;
  readonly parameters: readonly LawParameter[];
  readonly startRange: 'positive' | 'finite';
  readonly innovation: Innovation;
  /** A positive driver is put into the regression through its logarithm. */
  readonly isPositive: boolean;
  /** Writes the driver's value after the step. */
  step(graph: Graph, inputs: StepInputs): Node;
}
