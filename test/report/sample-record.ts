import type { Message } from '#built/messages/message.js';
import type { RunRecord } from '#built/result/record.js';

/** An invented advice with its place in an invented file. */
export const sampleAdvice: Message = {
  code: 'wide-gap',
  severity: 'advice',
  place: { file: 'orchard.yaml', line: 17, column: 3, length: 5 },
  sourceLine: '  basis: auto',
  what: 'The gap is 2.1% of the value.',
  why: 'A better rule may earn more than this one.',
  mend: 'Write a richer list under `basis`.',
  evidence: { gap: 0.34, value: 16.2 },
};

const dates = Array.from({ length: 30 }, (_, index) => ({
  time: (index + 1) / 10,
  exerciseShare: index === 29 ? 0.31 : 0.01,
  endedShare: null,
  keptColumnCount: index === 29 ? 0 : index === 0 ? 9 : 10,
  droppedColumns: index === 0 ? ['smallest(grove)'] : [],
  explainedShare: index === 29 ? null : 0.4 + 0.018 * index,
  continuationMean: 16.1,
}));

/** A run of an invented scenario: the right to fell one of three groves at thirty dates. */
export const sampleRecord: RunRecord = {
  schemaVersion: 1,
  status: 'complete',
  scenario: {
    path: 'orchard.yaml',
    sha256: 'ab'.repeat(32),
    title: 'Right to fell one of three groves',
    money: 'crowns',
  },
  seed: 'barn door',
  decidedBy: 'holder',
  plan: {
    basisSize: 1,
    round: 1,
    fitPathCount: 40000,
    outerPathCount: 61440,
    innerPointCount: 16,
    nestedOuterPathCount: 1024,
    nestedInnerPathCount: 256,
    upper: 'one-step',
  },
  selection: {
    outerPathCount: 1024,
    innerPointCount: 32,
    tried: [
      {
        basisSize: 0,
        columnCount: 7,
        fitPathCount: 32768,
        lowerStandardDeviation: 0.81,
        upperStandardDeviation: 0.42,
        gap: 0.021,
        expectedWidth: 0.0305,
        fitOperations: 3.1e9,
        boundsOperations: 4.4e10,
      },
      {
        basisSize: 1,
        columnCount: 10,
        fitPathCount: 40000,
        lowerStandardDeviation: 0.64,
        upperStandardDeviation: 0.31,
        gap: 0.012,
        expectedWidth: 0.0223,
        fitOperations: 6.2e9,
        boundsOperations: 1.1e10,
      },
    ],
    chosenSize: 1,
    ended: 'no larger size',
  },
  pilot: {
    outerPathCount: 2048,
    innerPointCount: 8,
    lowerStandardDeviation: 0.64,
    upperStandardDeviation: 0.31,
    gap: 0.012,
    expectedWidth: 0.0241,
    wantedWidth: 0.0262,
  },
  rounds: [
    {
      round: 1,
      outerPathCount: 61440,
      innerPointCount: 16,
      errorProbability: 0.05,
      standardErrors: 1.96,
      low: 16.150205,
      high: 16.168945,
    },
  ],
  paths: { kept: 'all', segmentDates: 30, checkpointCount: 0, workFactor: 1, bytes: 29_203_200 },
  lower: { value: 16.154321, standardError: 0.0021, halfWidth95: 0.004116, pathCount: 61440, method: 'rule' },
  upper: { value: 16.166789, standardError: 0.0011, halfWidth95: 0.002156, pathCount: 61440, method: 'one-step' },
  uppers: [
    { value: 16.166789, standardError: 0.0011, halfWidth95: 0.002156, pathCount: 61440, method: 'one-step' },
    { value: 16.1712, standardError: 0.0061, halfWidth95: 0.011956, pathCount: 1024, method: 'andersen-broadie' },
  ],
  gap: { value: 0.012468, standardError: 0.0006, halfWidth95: 0.001176 },
  bracket95: { low: 16.150205, high: 16.168945 },
  crossChecks: {
    plainLower: { value: 16.21, standardError: 0.21, halfWidth95: 0.41 },
    nestedContinuationToday: null,
  },
  stepBias: null,
  exact: null,
  basis: {
    columns: Array.from({ length: 10 }, (_, index) => `column ${index + 1}`),
    martingalePolynomials: ['a', 'b', 'c'],
  },
  dates,
  neverExercisedShare: 0.4,
  endedByEventShare: null,
  exerciseTimeQuantiles: { p05: 0.3, p50: 2.6, p95: 3 },
  advice: [],
  passedChecks: ['The bounds do not cross.', 'Every regression kept enough paths for each column.'],
  settings: [
    { name: 'clock', value: 'years', origin: { kind: 'default' } },
    { name: 'constants.spread', value: '0.25', origin: { kind: 'command line' } },
    { name: 'contract.payoff', value: 'max(0, largest(grove) - 100)', origin: { kind: 'line', line: 14 } },
  ],
  interpreter: 'wasm',
  timing: { totalSeconds: 12.34, fitSeconds: 3.2, pilotSeconds: 1.1, boundsSeconds: 7.9 },
  versions: { tarry: '0.1.0', node: '20.19.0' },
};

/** The same right with the issuer deciding: the rule gives the upper bound, martingales the lower ones. */
export const issuerRecord: RunRecord = {
  ...sampleRecord,
  decidedBy: 'issuer',
  lower: { ...sampleRecord.upper, value: 16.142532 },
  upper: { ...sampleRecord.lower, value: 16.155 },
  uppers: sampleRecord.uppers.map((bound, index) => ({ ...bound, value: index === 0 ? 16.142532 : 16.13 })),
  bracket95: { low: 16.140376, high: 16.159116 },
};
