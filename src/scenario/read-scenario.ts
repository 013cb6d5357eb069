import type { Message } from '../messages/message.js';
import type { ScopeSymbol } from '../program/scope.js';
import { limitConstants, readConstants } from './constants.js';
import { readContract } from './contract.js';
import { readCorrelation } from './correlation.js';
import { readCounts } from './driver-counts.js';
import { readDrivers } from './drivers.js';
import { Findings } from './findings.js';
import { readGeneral } from './general.js';
import { readMethod } from './method.js';
import type { CheckedScenario } from './model.js';
import { declareNames } from './names.js';
import { refuseUnbuilt } from './not-built.js';
import type { ScenarioOverrides } from './overrides.js';
import { readTree } from './read-tree.js';
import type { Reading } from './reading.js';
import { setFaultsAside } from './set-aside.js';
import { Settings } from './settings.js';
import { SourceText } from './source-text.js';
import { checkStructure } from './structure.js';

/** A scenario that can be run, or the mistakes that keep it from being one. */
export interface ReadScenario {
  readonly scenario: CheckedScenario | null;
  /** In file order; empty exactly when there is a scenario. */
  readonly messages: readonly Message[];
}

/** Faults of structure beyond which the rest of a text is not worth reading before they are mended. */
const mostSetAside = 20;

/**
 * Reads a scenario in three phases: text to tree, structure, meaning. Every mistake of a phase is given at once; what
 * breaks the structure is set aside, so that the mistakes of meaning in the rest are given with it.
 *
 * The text may come from anybody: it cannot crash the reader, hold it up, or reach anything by a name.
 *
 * @cost linear in the text up to its limit of a million characters, about a second there
 * @fails never throws for what stands in the text
 * @example readScenario(text, { path: 'lots.yaml', with: { spread: '0.25' } })
 */
export function readScenario(text: string, overrides: ScenarioOverrides = {}): ReadScenario {
  const source = new SourceText(overrides.path ?? 'scenario', text);
  const findings = new Findings(source);
  const refused = () => ({ scenario: null, messages: findings.messages() });
  const root = readTree(source, findings);
  if (root === null) return refused();
  checkStructure(root, findings);
  limitConstants(root, findings);
  if (findings.count > mostSetAside) return refused();
  const remainder = findings.count > 0 ? setFaultsAside(root) : { root, names: new Set<string>() };
  if (remainder === null) return refused();
  const symbols = new Map<string, ScopeSymbol>();
  const settings = new Settings(source);
  const reading: Reading = {
    source,
    root: remainder.root,
    overrides,
    findings,
    settings,
    symbols,
    unclear: new Set(remainder.names),
    constantValues: new Map(),
  };
  const model = readModel(reading);
  if (findings.count > 0 || model === null) return refused();
  return { scenario: { model, settings: settings.all() }, messages: [] };
}

function readModel(reading: Reading): CheckedScenario['model'] | null {
  declareNames(reading);
  refuseUnbuilt(reading);
  const general = readGeneral(reading);
  const constants = readConstants(reading);
  readCounts(reading);
  const families = readDrivers(reading);
  const correlation = readCorrelation(reading);
  const contract = readContract(reading);
  const method = readMethod(reading);
  if (correlation === null || contract === null || method === null) return null;
  return { ...general, constants, families, correlation, contract, method };
}
