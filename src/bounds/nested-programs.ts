import { compile } from '../program/compile.js';
import { Graph } from '../program/graph.js';
import type { Program } from '../program/program.js';
import { singleStageColumnCount } from '../rule/layout.js';
import type { Programs } from '../rule/programs.js';

/** Columns of the stages in which nested paths keep what they carry along. */
export interface NestedColumns {
  /** The martingale of the rule's value, and the largest payoff less it so far. */
  readonly martingale: number;
  readonly upper: number;
  /** What exercising brings at the date in work, and 1 where the rule exercises. */
  readonly amount: number;
  readonly exercises: number;
  /** Worth of continuing with the rule: at the date before, and at the date in work (before: its sum over inner paths). */
  readonly continuationBefore: number;
  readonly continuation: number;
  /** 1 while the inner path runs, and its regressed martingale so far. */
  readonly running: number;
  readonly increments: number;
  /** First of the columns that keep the drivers of the outer path. */
  readonly drivers: number;
}

/** What nested paths do, lane by lane. */
export interface NestedPrograms {
  readonly columns: NestedColumns;
  /** 1 to `exercises` where the payoff beats holding. */
  readonly decide: Program;
  /** Adds what the running inner paths that the rule exercises bring, and ends them; on the last date, all of them. */
  readonly endInner: Program;
  readonly endInnerLast: Program;
  /** Turns the sum over inner paths into their mean; uniform: 1 / inner paths. */
  readonly average: Program;
  /** Moves the martingale by the step that led here. */
  readonly move: Program;
  /** Lets hindsight note what the date would have brought. */
  readonly note: Program;
}

/** Writes the programs of the nested paths for a model. */
export function buildNestedPrograms({ layout }: Programs): NestedPrograms {
  const { stage, payoff, terminal, hold, scratch } = layout;
  const columns: NestedColumns = {
    martingale: stage,
    upper: stage + 1,
    amount: stage + 2,
    exercises: stage + 3,
    continuationBefore: stage + 4,
    continuation: stage + 5,
    running: stage + 6,
    increments: stage + 7,
    drivers: stage + singleStageColumnCount,
  };
  const endInner = (isLast: boolean): Program => {
    const graph = new Graph();
    const running = graph.column(columns.running);
    const brings = graph.column(isLast ? terminal : payoff);
    const ends = isLast ? running : graph.multiply(running, graph.apply('less', graph.column(hold), brings));
    const net = graph.subtract(brings, graph.column(columns.increments));
    const added = graph.apply('select', ends, net, graph.constant(0));
    return compile(
      graph,
      [
        { node: graph.add(graph.column(columns.continuation), added), column: columns.continuation },
        { node: graph.subtract(running, ends), column: columns.running },
      ],
      0,
      scratch,
      'end of inner paths',
    );
  };
  return {
    columns,
    decide: write(scratch, columns.exercises, (graph) =>
      graph.apply('less', graph.column(hold), graph.column(columns.amount)),
    ),
    endInner: endInner(false),
    endInnerLast: endInner(true),
    average: write(scratch, columns.continuation, (graph) =>
      graph.multiply(graph.column(columns.continuation), graph.uniform(0)),
    ),
    move: write(scratch, columns.martingale, (graph) => {
      const continuation = graph.column(columns.continuation);
      const worth = graph.apply('select', graph.column(columns.exercises), graph.column(columns.amount), continuation);
      return graph.add(
        graph.column(columns.martingale),
        graph.subtract(worth, graph.column(columns.continuationBefore)),
      );
    }),
    note: write(scratch, columns.upper, (graph) => {
      const net = graph.subtract(graph.column(columns.amount), graph.column(columns.martingale));
      return graph.apply('maximum', graph.column(columns.upper), net);
    }),
  };
}

/** All programs, for the block that is to run them. */
export function nestedProgramList(nested: NestedPrograms): Program[] {
  const { decide, endInner, endInnerLast, average, move, note } = nested;
  return [decide, endInner, endInnerLast, average, move, note];
}

function write(scratch: number, column: number, node: (graph: Graph) => number): Program {
  const graph = new Graph();
  return compile(graph, [{ node: node(graph), column }], 1, scratch, 'nested martingale');
}
