import { compile } from '../program/compile.js';
import { Graph, type Node } from '../program/graph.js';
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
  /** 1 where the ending event holds at the date in work, and 1 until it has held. */
  readonly ended: number;
  readonly alive: number;
  /** 1 while the inner path runs, and its regressed martingale so far. */
  readonly running: number;
  readonly increments: number;
  /** First of the columns that keep the drivers of the outer path. */
  readonly drivers: number;
}

/** What nested paths do, lane by lane. */
export interface NestedPrograms {
  readonly columns: NestedColumns;
  /** 1 to `exercises` where the payoff beats holding, or the contract ends. */
  readonly decide: Program;
  /** Adds what the running inner paths bring that the rule exercises or the event ends, and stops them; on the last date, all of them. */
  readonly endInner: Program;
  readonly endInnerLast: Program;
  /** Turns the sum over inner paths into their mean; uniform: 1 / inner paths. */
  readonly average: Program;
  /** Moves the martingale by the step that led here. */
  readonly move: Program;
  /** Lets hindsight note what the date would have brought. */
  readonly note: Program;
  /** Ends the paths on which the event holds; for a contract that has one. */
  readonly end: Program;
}

/** Writes the programs of the nested paths for a model. */
export function buildNestedPrograms({ layout }: Programs): NestedPrograms {
  const { stage, payoff, terminal, hold, scratch } = layout;
  const hasEvent = layout.ended !== null;
  /** Whether a path stops at a date that is not the last: the rule exercises, or the event ends the contract. */
  const stops = (graph: Graph, amount: number): Node => {
    const exercises = graph.apply('less', graph.column(hold), graph.column(amount));
    return layout.ended === null ? exercises : graph.apply('maximum', exercises, graph.column(layout.ended));
  };
  const columns: NestedColumns = {
    martingale: stage,
    upper: stage + 1,
    amount: stage + 2,
    exercises: stage + 3,
    continuationBefore: stage + 4,
    continuation: stage + 5,
    running: stage + 6,
    increments: stage + 7,
    ended: stage + 8,
    alive: stage + 9,
    drivers: stage + singleStageColumnCount,
  };
  const endInner = (isLast: boolean): Program => {
    const graph = new Graph();
    const running = graph.column(columns.running);
    const brings = graph.column(isLast ? terminal : payoff);
    const ends = isLast ? running : graph.multiply(running, stops(graph, payoff));
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
    decide: write(scratch, columns.exercises, (graph) => stops(graph, columns.amount)),
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
      const upper = graph.column(columns.upper);
      const net = graph.subtract(graph.column(columns.amount), graph.column(columns.martingale));
      const larger = graph.apply('maximum', upper, net);
      return hasEvent ? graph.apply('select', graph.column(columns.alive), larger, upper) : larger;
    }),
    end: write(scratch, columns.alive, (graph) => {
      const goesOn = graph.subtract(graph.constant(1), graph.column(columns.ended));
      return graph.multiply(graph.column(columns.alive), goesOn);
    }),
  };
}

/** All programs, for the block that is to run them. */
export function nestedProgramList(nested: NestedPrograms): Program[] {
  const { decide, endInner, endInnerLast, average, move, note, end } = nested;
  return [decide, endInner, endInnerLast, average, move, note, end];
}

function write(scratch: number, column: number, node: (graph: Graph) => number): Program {
  const graph = new Graph();
  return compile(graph, [{ node: node(graph), column }], 1, scratch, 'nested martingale');
}
