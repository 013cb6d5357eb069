import type { Node } from '../program/graph.js';

/** One function of the regression. */
export interface Column {
  readonly name: string;
  readonly node: Node;
  /** Line of the scenario that states it, if one does. */
  readonly line?: number | null;
}

/** Columns of a regression, those first that the integrands of the martingale use. */
export interface Basis {
  readonly columns: readonly Column[];
  /** The integrands are fitted on this many columns from the first on. */
  readonly integrandColumnCount: number;
}
