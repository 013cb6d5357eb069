import type { Message } from '../messages/message.js';
import type { Forecast, SizesEnded } from '../result/record.js';
import { fitOperations } from '../rule/operations.js';
import { type PathKeeping, workFactor } from '../rule/path-keeping.js';
import { buildPrograms, type Programs } from '../rule/programs.js';
import type { CheckedModel } from '../scenario/model.js';
import { countsBeforePilot } from './counts.js';
import { defaultOperationLimit } from './effort.js';
import type { Environment } from './environment.js';
import { decideKeeping } from './fit-memory.js';
import { type ForecastCounts, forecastOf } from './forecast.js';
import { judgeBasisSize, judgeCounts } from './judge-counts.js';
import type { ValueOptions } from './options.js';

/** One size of the basis with everything that a fit of it needs. */
export interface Candidate {
  readonly programs: Programs;
  readonly counts: ForecastCounts;
  readonly keeping: PathKeeping;
  readonly forecast: Forecast;
  /** Operations that its fit takes. */
  readonly operations: number;
}

/** The sizes that a run may try, from small to large; or why there is none. */
export type CandidatesOutcome =
  | {
      readonly kind: 'open';
      readonly candidates: readonly Candidate[];
      /** Why there is no larger one; null where nothing is left to choose. */
      readonly ended: SizesEnded | null;
    }
  | { readonly kind: 'refused'; readonly messages: readonly Message[] };

/** Paths of the fit for each column, below which a size is not tried when the scenario fixes the paths. */
const fewestPathsPerColumn = 250;
/** Workers for which a larger size must find memory, however many there are: the choice must not depend on them. */
const judgedWorkerCount = 8;
/** The size that is taken where no paths are drawn to choose one. */
const sizeWithoutChoice = 1;

/**
 * Which sizes of the basis a run may try.
 *
 * One alone where the basis is stated, where a plan is replayed, and where all counts are fixed so that nothing is left
 * to choose by. Else all that the paths of the fit, the memory and the limit of work allow; the smallest in any case.
 */
export function openCandidates(
  model: CheckedModel,
  smallest: Programs,
  options: CandidateOptions,
  environment: Environment,
  workerCount: number,
): CandidatesOutcome {
  const { plan } = options;
  const { method } = model;
  const candidateOf = (programs: Programs) => describe(programs, model, options, environment, workerCount);
  if (plan !== undefined) {
    const messages = judgeBasisSize(plan, smallest);
    if (messages.length > 0) return { kind: 'refused', messages };
    return only(candidateOf(buildPrograms(model, plan.basisSize)));
  }
  const first = candidateOf(smallest);
  if (first.kind === 'refused') return first;
  const candidates = [first.candidate];
  let ended: SizesEnded = 'no larger size';
  for (let size = 1; size < smallest.basisSizeCount; size++) {
    const next = candidateOf(buildPrograms(model, size));
    const obstacle =
      next.kind === 'refused' || !findsMemory(next.candidate, environment)
        ? 'too little memory'
        : obstacleTo(next.candidate, method.fitPathCount, options);
    if (next.kind === 'refused' || obstacle !== null) {
      ended = obstacle!;
      break;
    }
    candidates.push(next.candidate);
  }
  if (method.basis !== 'auto') return { kind: 'open', candidates, ended: null };
  if (method.outerPathCount === null || method.innerPointCount === null) return { kind: 'open', candidates, ended };
  const size = method.fitPathCount === null ? sizeWithoutChoice : candidates.length - 1;
  return { kind: 'open', candidates: [candidates[Math.min(size, candidates.length - 1)]!], ended: null };
}

function findsMemory({ programs, counts, keeping }: Candidate, { memoryBytes }: Environment): boolean {
  const { peakMemoryBytes } = forecastOf(programs, counts, keeping, judgedWorkerCount, memoryBytes);
  return memoryBytes === null || peakMemoryBytes <= memoryBytes;
}

/** What keeps a size from being tried; null if nothing does. */
function obstacleTo(
  { programs, counts, operations }: Candidate,
  fixedFitPathCount: number | null,
  { budgetSeconds }: CandidateOptions,
): SizesEnded | null {
  const isThin = counts.fitPathCount < fewestPathsPerColumn * programs.columns.length;
  if (fixedFitPathCount !== null && isThin) return 'too few paths';
  return budgetSeconds === undefined && operations > defaultOperationLimit ? 'larger size too costly' : null;
}

type CandidateOptions = Pick<ValueOptions, 'plan' | 'fitMemoryBytes' | 'budgetSeconds'>;

type Described =
  | { readonly kind: 'open'; readonly candidate: Candidate }
  | { readonly kind: 'refused'; readonly messages: readonly Message[] };

function only(described: Described): CandidatesOutcome {
  return described.kind === 'refused' ? described : { kind: 'open', candidates: [described.candidate], ended: null };
}

function describe(
  programs: Programs,
  { method }: CheckedModel,
  options: CandidateOptions,
  environment: Environment,
  workerCount: number,
): Described {
  const counts = options.plan ?? countsBeforePilot(programs, method);
  const kept = decideKeeping(programs, counts.fitPathCount, options.fitMemoryBytes);
  if (kept.kind === 'refused') return kept;
  const { keeping } = kept;
  const forecast = forecastOf(programs, counts, keeping, workerCount, environment.memoryBytes);
  const messages = judgeCounts(programs, counts, forecast);
  if (messages.length > 0) return { kind: 'refused', messages };
  const operations = fitOperations(programs, counts.fitPathCount, workFactor(keeping));
  return { kind: 'open', candidate: { programs, counts, keeping, forecast, operations } };
}
