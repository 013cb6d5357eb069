import type { Plan } from '#built/result/record.js';

/** Counts for a run of a moment. */
export const smallPlan: Plan = {
  basisSize: 0,
  round: 1,
  fitPathCount: 3000,
  outerPathCount: 512,
  innerPointCount: 8,
  nestedOuterPathCount: 0,
  nestedInnerPathCount: 0,
  upper: 'one-step',
};
