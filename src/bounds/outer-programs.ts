import { compile, type Output } from '../program/compile.js';
import { Graph } from '../program/graph.js';
import type { Program } from '../program/program.js';
import { singleStageColumnCount } from '../rule/layout.js';
import type { Programs } from '../rule/programs.js';
import { buildChoose } from './outer-choice.js';

/** Columns of the stages in which outer paths keep what they carry along. */
export interface OuterColumns {
  /** The regressed martingale, and its increment over the step. */
  readonly regressed: number;
  readonly regressedStep: number;
  /** The one-step martingale, and the one made with the first half of the inner points. */
  readonly martingale: number;
  readonly halfMartingale: number;
  /** Sums of the fitted value over the inner points, over all and over the first half. */
  readonly innerSum: number;
  readonly innerHalfSum: number;
  /** Shifts of the inner points' lattice at the step in work, one column for each innovation. */
  readonly shifts: number;
  /** What the rule brings, with the martingale taken off and without. */
  readonly lower: number;
  readonly plain: number;
  /** Largest payoff less martingale so far, with each of the three martingales. */
  readonly upper: number;
  readonly halfUpper: number;
  readonly regressedUpper: number;
  /** 1 while the rule has not exercised and the contract has not ended. */
  readonly running: number;
  /** 1 where the rule exercises at the date in work, and where it ends without having used the right. */
  readonly exercised: number;
  readonly unused: number;
  /** 1 until the ending event has held, and where it ends a running path at the date in work. */
  readonly alive: number;
  readonly ended: number;
}

/** Which martingale is taken off: the one-step one needs inner points. */
export type OuterKind = 'one-step' | 'regressed';

/** What outer paths do at a date, lane by lane. */
export interface OuterPrograms {
  readonly columns: OuterColumns;
  /** Adds the fitted value of one inner point to `innerSum`. */
  readonly addInner: Program;
  /** Moves the martingales of a kind by one step; uniforms as `moveUniforms` says. */
  readonly move: Readonly<Record<OuterKind, Program>>;
  /** Lets the rule choose and hindsight note what the date would have brought. */
  readonly choose: Readonly<Record<OuterKind, Program>>;
  readonly chooseLast: Readonly<Record<OuterKind, Program>>;
  /** Takes what the rule brings off the maxima, at the very end. */
  readonly gaps: Readonly<Record<OuterKind, Program>>;
}

/** Uniform inputs of the one-step `move`: 1 / inner points, 1 / half of them. */
export const moveUniforms = { inversePoints: 0, inverseHalfPoints: 1, count: 2 } as const;

/** Writes the programs of the outer paths for a model. */
export function buildOuterPrograms(programs: Programs): OuterPrograms {
  const { stage } = programs.layout;
  const columns: OuterColumns = {
    regressed: stage,
    regressedStep: stage + 1,
    martingale: stage + 2,
    halfMartingale: stage + 3,
    innerSum: stage + 4,
    innerHalfSum: stage + 5,
    lower: stage + 6,
    plain: stage + 7,
    upper: stage + 8,
    halfUpper: stage + 9,
    regressedUpper: stage + 10,
    running: stage + 11,
    exercised: stage + 12,
    unused: stage + 13,
    alive: stage + 14,
    ended: stage + 15,
    shifts: stage + singleStageColumnCount,
  };
  return {
    columns,
    addInner: buildAddInner(programs, columns),
    move: {
      'one-step': buildMove(programs, columns, 'one-step'),
      regressed: buildMove(programs, columns, 'regressed'),
    },
    choose: {
      'one-step': buildChoose(programs, columns, 'one-step', false),
      regressed: buildChoose(programs, columns, 'regressed', false),
    },
    chooseLast: {
      'one-step': buildChoose(programs, columns, 'one-step', true),
      regressed: buildChoose(programs, columns, 'regressed', true),
    },
    gaps: {
      'one-step': buildGaps(programs, columns, 'one-step'),
      regressed: buildGaps(programs, columns, 'regressed'),
    },
  };
}

/** All programs, for the block that is to run them. */
export function outerProgramList({ addInner, move, choose, chooseLast, gaps }: OuterPrograms): Program[] {
  return [addInner, ...[move, choose, chooseLast, gaps].flatMap((byKind) => Object.values(byKind))];
}

function buildAddInner({ layout }: Programs, { innerSum }: OuterColumns): Program {
  const graph = new Graph();
  const sum = graph.add(graph.column(innerSum), graph.column(layout.value));
  return compile(graph, [{ node: sum, column: innerSum }], 0, layout.scratch, 'sum of inner points');
}

function buildMove({ layout }: Programs, columns: OuterColumns, kind: OuterKind): Program {
  const graph = new Graph();
  const column = (index: number) => graph.column(index);
  const outputs: Output[] = [
    { node: graph.add(column(columns.regressed), column(columns.regressedStep)), column: columns.regressed },
  ];
  if (kind === 'one-step') {
    const moved = (martingale: number, innerSum: number, uniform: number) => {
      const mean = graph.multiply(column(innerSum), graph.uniform(uniform));
      const increment = graph.subtract(column(layout.value), mean);
      outputs.push({ node: graph.add(column(martingale), increment), column: martingale });
    };
    moved(columns.martingale, columns.innerSum, moveUniforms.inversePoints);
    moved(columns.halfMartingale, columns.innerHalfSum, moveUniforms.inverseHalfPoints);
  }
  return compile(graph, outputs, moveUniforms.count, layout.scratch, 'move of martingales');
}

function buildGaps({ layout }: Programs, columns: OuterColumns, kind: OuterKind): Program {
  const graph = new Graph();
  const lower = graph.column(columns.lower);
  const maxima = kind === 'one-step' ? [columns.upper, columns.regressedUpper] : [columns.regressedUpper];
  const outputs = maxima.map((column) => ({ node: graph.subtract(graph.column(column), lower), column }));
  return compile(graph, outputs, 0, layout.scratch, 'gaps');
}
