import { z } from 'zod';

const MOST_PATHS = 1e10;
const MOST_INNER = 1e6;
const MOST_SIZES = 100;
const MOST_ROUNDS = 100;

const pathCount = z.int().min(1).max(MOST_PATHS);
const method = z.enum(['rule', 'one-step', 'andersen-broadie', 'regressed', 'two-level']);

/** The counts of a plan: positive, save that a nested bound may be left out, and small enough to be meant. */
export const planShape = z.object({
  basisSize: z.int().min(0).max(MOST_SIZES),
  round: z.int().min(1).max(MOST_ROUNDS),
  fitPathCount: pathCount,
  outerPathCount: pathCount,
  innerPointCount: z.int().min(0).max(MOST_INNER),
  nestedOuterPathCount: z.int().min(0).max(MOST_PATHS),
  nestedInnerPathCount: z.int().min(0).max(MOST_INNER),
  upper: z.enum(['one-step', 'andersen-broadie', 'regressed']),
});

/** What a replay needs of a record; the fields around it may come and go with versions. */
export const replayShape = z.looseObject({
  schemaVersion: z.literal(1),
  plan: planShape,
  // Only for a remark; a record without it is replayed all the same.
  scenario: z.looseObject({ sha256: z.string() }).optional().catch(undefined),
});

const estimate = z.looseObject({
  value: z.number(),
  standardError: z.number().nullable(),
  halfWidth95: z.number().nullable(),
});

const bound = estimate.extend({ pathCount: z.int().min(0), method });

const message = z.looseObject({ code: z.string(), what: z.string(), why: z.string(), mend: z.string() });

/** What the reports need of a record; fields that a later version adds pass through. */
export const recordShape = z.looseObject({
  schemaVersion: z.literal(1),
  status: z.enum(['complete', 'stopped']),
  scenario: z.looseObject({
    path: z.string().nullable(),
    sha256: z.string(),
    title: z.string(),
    money: z.string(),
  }),
  seed: z.string(),
  decidedBy: z.enum(['holder', 'issuer']),
  plan: planShape,
  pilot: z.looseObject({ expectedWidth: z.number(), wantedWidth: z.number().nullable() }).nullable(),
  selection: z
    .looseObject({
      outerPathCount: z.number(),
      tried: z.array(
        z.looseObject({
          basisSize: z.number(),
          columnCount: z.number(),
          fitPathCount: z.number(),
          gap: z.number(),
          expectedWidth: z.number(),
        }),
      ),
      chosenSize: z.number(),
      ended: z.enum([
        'width in reach',
        'no gain',
        'no larger size',
        'larger size too costly',
        'too few paths',
        'too little memory',
      ]),
    })
    .nullable(),
  rounds: z.array(
    z.looseObject({
      round: z.number(),
      outerPathCount: z.number(),
      innerPointCount: z.number(),
      errorProbability: z.number(),
      standardErrors: z.number(),
      low: z.number(),
      high: z.number(),
    }),
  ),
  paths: z.looseObject({
    kept: z.enum(['all', 'segments']),
    segmentDates: z.int().min(1),
    checkpointCount: z.int().min(0),
    workFactor: z.number(),
    bytes: z.number(),
  }),
  lower: bound,
  upper: bound,
  uppers: z.array(bound),
  gap: estimate,
  bracket95: z.looseObject({ low: z.number(), high: z.number() }),
  basis: z.looseObject({ columns: z.array(z.string()), martingalePolynomials: z.array(z.string()) }),
  dates: z.array(z.looseObject({ time: z.number(), exerciseShare: z.number() })),
  neverExercisedShare: z.number(),
  // Records made before ending events were built do not have it.
  endedByEventShare: z.number().nullable().optional(),
  exerciseTimeQuantiles: z.looseObject({ p05: z.number(), p50: z.number(), p95: z.number() }).nullable(),
  advice: z.array(message),
  passedChecks: z.array(z.string()),
  settings: z.array(z.looseObject({ name: z.string(), value: z.string() })),
  timing: z.looseObject({ totalSeconds: z.number() }),
  versions: z.looseObject({ tarry: z.string(), node: z.string() }),
});
