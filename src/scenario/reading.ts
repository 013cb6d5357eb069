import type { Scope, ScopeSymbol, SymbolKind } from '../program/scope.js';
import type { Findings } from './findings.js';
import type { ScenarioOverrides } from './overrides.js';
import type { Settings } from './settings.js';
import type { SourceText } from './source-text.js';
import type { MapNode } from './tree.js';

/** What the steps of reading a scenario share: the tree, the names known so far, and where findings go. */
export interface Reading {
  readonly source: SourceText;
  readonly root: MapNode;
  readonly overrides: ScenarioOverrides;
  readonly findings: Findings;
  readonly settings: Settings;
  /** Constants, drivers and families in file order, and the words `t` and `number`. */
  readonly symbols: Map<string, ScopeSymbol>;
  /** Names of two things, or of what was set aside: told as a mistake once, and nothing that uses them is judged further. */
  readonly unclear: Set<string>;
  /** Constants whose value could be computed. */
  readonly constantValues: Map<string, number>;
}

const ofConstants: ReadonlySet<SymbolKind> = new Set<SymbolKind>(['constant']);
const ofMembers: ReadonlySet<SymbolKind> = new Set<SymbolKind>(['constant', 'number']);
const ofStates: ReadonlySet<SymbolKind> = new Set<SymbolKind>(['constant', 'driver', 'family', 'clock']);

/** The names that an expression may use where nothing but constants is known. */
export function constantScope(reading: Reading, subject: string): Scope {
  return scope(reading, subject, ofConstants, 'constants');
}

/** The names that a law's own formulas may use: constants, and a member's position in its family. */
export function memberScope(reading: Reading, subject: string, memberCount: number): Scope {
  return { ...scope(reading, subject, ofMembers, 'constants and `number`'), memberCount };
}

/** The names that payoffs and bases may use: what is known and observed at a date. */
export function stateScope(reading: Reading, subject: string): Scope {
  return { ...scope(reading, subject, ofStates, 'constants, observed drivers and the clock `t`'), observedOnly: true };
}

function scope(reading: Reading, subject: string, allowed: ReadonlySet<SymbolKind>, allowedWords: string): Scope {
  return {
    symbols: reading.symbols,
    allowed,
    subject,
    allowedWords,
    observedOnly: false,
    unclear: reading.unclear,
    valueOf: (name) => reading.constantValues.get(name) ?? null,
    memberCount: 1,
  };
}
