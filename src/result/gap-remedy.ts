import { type Measures, paths } from './measures.js';
import type { SizesEnded } from './record.js';

/** Inner points beyond which more of them narrowed no gap that was measured. */
const enoughInnerPoints = 256;

/** What would narrow the gap between the bounds, given how the run was made. */
export function remedyForGap(measures: Measures): string {
  const { plan, basisIsAutomatic, innerIsFixed, sizesEnded } = measures;
  if (plan.upper === 'regressed') return takeOneStep(plan.innerPointCount);
  if (plan.upper === 'andersen-broadie')
    return `Raise \`inner\` in \`upper: { method: andersen-broadie, inner: … }\` under method above ${plan.nestedInnerPathCount}, or try \`upper: one-step\`.`;
  if (innerIsFixed && plan.innerPointCount < enoughInnerPoints)
    return `Raise \`inner\` in \`counts\` under method above ${plan.innerPointCount} or leave it out; noise of the inner points is part of the gap.`;
  if (!basisIsAutomatic) return 'Use `basis: auto`, or add columns that tell when holding is worth more.';
  const fitPaths = paths(plan.fitPathCount);
  if (sizesEnded !== null) return remedies[sizesEnded](fitPaths);
  return `Leave out \`counts\` under method and \`--plan\`, so that the size of the basis is chosen; or ${fitMore(fitPaths)}`;
}

const fitMore = (fitPaths: string) =>
  `raise \`counts: { fit: … }\` under method above ${fitPaths}, or state columns in \`basis\` that tell when holding is worth more.`;

const remedies: Readonly<Record<SizesEnded, (fitPaths: string) => string>> = {
  'no larger size': (fitPaths) => `No larger basis is built in: ${fitMore(fitPaths)}`,
  'no gain': (fitPaths) => `Larger sizes of the basis brought nothing: ${fitMore(fitPaths)}`,
  'larger size too costly': () =>
    'Give a `--budget` longer than this run took, so that larger sizes of the basis are tried, or state columns in `basis`, which cost is not held against.',
  'width in reach': () =>
    'Ask for a narrower `bracket width`: larger sizes of the basis were not tried, since the width seemed in reach.',
  'too few paths': (fitPaths) =>
    `Raise \`counts: { fit: … }\` under method above ${fitPaths} or leave it out; larger sizes of the basis need more paths.`,
  'too little memory': () =>
    'Larger sizes of the basis did not fit into the memory: give the paths of the fit more with `--fit-memory`, or use a machine with more.',
};

/** What closes the gap of a bracket that the regressed martingale makes. */
function takeOneStep(innerPointCount: number): string {
  const lines = innerPointCount === 0 ? '`upper: regressed` and `inner: 0`' : '`upper: regressed`';
  return `Take ${lines} out of method, so that the one-step martingale makes the bound.`;
}
