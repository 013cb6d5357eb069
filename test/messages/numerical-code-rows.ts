import { defectMessage } from '#built/cli/defect-message.js';
import { value } from '#built/index.js';
import type { Message } from '#built/messages/message.js';
import { judge } from '#built/result/advice.js';
import { checkScenario } from '#built/run/check.js';
import type { ValueOptions } from '#built/run/options.js';
import { thisMachine } from '#built/workers/machine.js';
import { recordOf } from '../run-value.js';
import { lots } from '../scenario-texts.js';
import { smallPlan } from '../small-plan.js';
import type { CodeRow } from './scenario-code-rows.js';

const small = 'counts: { fit: 3000, outer: 512, inner: 8 }';
const adviceOf = async (method: string[]): Promise<readonly Message[]> => (await recordOf(lots({ method }))).advice;

async function refusal(text: string, changed: ValueOptions = {}): Promise<readonly Message[]> {
  const outcome = await value(text, { workers: 0, ...changed });
  return outcome.kind === 'refused' ? outcome.messages : [];
}

/** No run crosses its bounds, so the judge is asked directly. */
function crossed(): readonly Message[] {
  const bound = (mean: number) => ({ value: mean, standardError: 0.01, halfWidth95: 0.0196, pathCount: 1000 });
  return judge({
    plan: smallPlan,
    columnCount: 10,
    basisIsAutomatic: true,
    sizesEnded: null,
    innerIsFixed: false,
    isComplete: true,
    dates: [],
    lower: { ...bound(14), method: 'rule' },
    upper: { ...bound(13.9), method: 'andersen-broadie' },
    uppers: [{ ...bound(13.9), method: 'andersen-broadie' }],
    gap: { value: -0.1, standardError: 0.014, halfWidth95: 0.0277 },
    bracketWidth: 0,
    wantedWidth: null,
    decidedBy: 'holder',
    exercisedPathCount: 500,
    endedPathCount: null,
  }).advice;
}

/** A machine of a few megabytes. */
async function tooSmall(): Promise<readonly Message[]> {
  const outcome = checkScenario(lots(), {}, { ...thisMachine(), memoryBytes: 5e6 });
  return outcome.kind === 'refused' ? outcome.messages : [];
}

/** The codes of the numerical stages, and `defect`. */
export const numericalCodeRows: readonly CodeRow[] = [
  ['not-finite', () => refusal(lots({ payoff: 'max(0, log(largest(lot) - 100))', method: [small] }))],
  ['memory-beyond-machine', tooSmall],
  ['fit-memory-too-small', () => refusal(lots({ method: [small] }), { fitMemoryBytes: 1000 })],
  ['fewer-paths-than-columns', () => refusal(lots({ method: ['counts: { fit: 10 }'] }))],
  ['plan-does-not-fit', () => refusal(lots(), { plan: { ...smallPlan, outerPathCount: 0.5 } })],
  ['defect', () => [defectMessage(new Error('a column has no meaning'))]],
  ['thin-fit', () => adviceOf(['counts: { fit: 1000, outer: 512, inner: 8 }'])],
  ['rank-loss', () => adviceOf([small, 'basis: [largest(lot), 2 * largest(lot)]'])],
  ['wide-gap', () => adviceOf([small, 'basis: [largest(lot)]'])],
  ['crossed-bounds', async () => crossed()],
  ['effort-too-small', () => adviceOf(['counts: { fit: 3000, outer: 100, inner: 8 }'])],
  [
    'width-missed',
    () => adviceOf(['basis: [largest(lot)]', 'bracket width: { relative: 0.1% }', 'counts: { fit: 3000 }']),
  ],
];
