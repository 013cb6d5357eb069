import type { Expression } from './expression.js';
import { partsOf } from './parse.js';
import type { Scope } from './scope.js';

/** Which names of its scope an expression uses; names that the scope does not know are left out. */
export interface UsedSymbols {
  readonly constants: ReadonlySet<string>;
  /** Single drivers and families. */
  readonly drivers: ReadonlySet<string>;
  readonly usesClock: boolean;
  readonly usesNumber: boolean;
}

/** Gathers the names that an expression uses. */
export function usedSymbols(tree: Expression, scope: Pick<Scope, 'symbols'>): UsedSymbols {
  const constants = new Set<string>();
  const drivers = new Set<string>();
  let usesClock = false;
  let usesNumber = false;
  const waiting: Expression[] = [tree];
  for (let part = waiting.pop(); part !== undefined; part = waiting.pop()) {
    waiting.push(...partsOf(part));
    const name = part.kind === 'name' ? part.name : part.kind === 'member' ? part.family : null;
    const kind = name === null ? undefined : scope.symbols.get(name)?.kind;
    if (kind === 'constant') constants.add(name!);
    else if (kind === 'driver' || kind === 'family') drivers.add(name!);
    else if (kind === 'clock') usesClock = true;
    else if (kind === 'number') usesNumber = true;
  }
  return { constants, drivers, usesClock, usesNumber };
}
