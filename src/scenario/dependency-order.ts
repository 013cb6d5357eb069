import { listed } from '../messages/printable.js';
import type { Findings } from './findings.js';
import type { TextSpan } from './source-text.js';

/** An order in which each name comes after those that it depends on, and the circles that keep others from having one. */
export interface DependencyOrder {
  readonly order: readonly string[];
  /** In each, a name depends on the next, the last on the first. At most twenty. */
  readonly cycles: readonly (readonly string[])[];
}

const mostCycles = 20;

/**
 * Orders names by what they depend on. Names in a circle, and those that depend on them, are left out of the order.
 *
 * It counts and does not recurse, because a file can chain a hundred thousand constants.
 *
 * @source Kahn (1962), Communications of the ACM 5, 558-562
 */
export function dependencyOrder(dependencies: ReadonlyMap<string, readonly string[]>): DependencyOrder {
  const waitingFor = new Map<string, number>();
  const users = new Map<string, string[]>();
  for (const [name, needed] of dependencies) {
    waitingFor.set(name, needed.length);
    for (const other of needed) {
      const list = users.get(other);
      if (list === undefined) users.set(other, [name]);
      else list.push(name);
    }
  }
  const free = (names: string[]): string[] => {
    for (const name of names) {
      waitingFor.delete(name);
      for (const user of users.get(name) ?? []) {
        const left = (waitingFor.get(user) ?? 0) - 1;
        if (waitingFor.has(user)) waitingFor.set(user, left);
        if (left === 0) names.push(user);
      }
    }
    return names;
  };
  const order = free([...dependencies.keys()].filter((name) => waitingFor.get(name) === 0));
  const cycles: string[][] = [];
  while (waitingFor.size > 0 && cycles.length < mostCycles) {
    const circle = circleAmong(waitingFor, dependencies);
    cycles.push(circle);
    free([...circle]);
  }
  return { order, cycles };
}

/** Every name left over depends on another one left over: following them must come back. */
function circleAmong(
  left: ReadonlyMap<string, number>,
  dependencies: ReadonlyMap<string, readonly string[]>,
): string[] {
  const position = new Map<string, number>();
  const trail: string[] = [];
  let name: string = left.keys().next().value!;
  while (!position.has(name)) {
    position.set(name, trail.length);
    trail.push(name);
    name = dependencies.get(name)!.find((other) => left.has(other))!;
  }
  return trail.slice(position.get(name)!);
}

/** Constants that are stated through one another. */
export function constantCycle(cycle: readonly string[], at: TextSpan, isOverridden: boolean, findings: Findings): void {
  const shown = cycle.length > 8 ? [...cycle.slice(0, 8), '…'] : cycle;
  findings.add({
    code: 'constant-cycle',
    at,
    what:
      cycle.length === 1
        ? `The constant ${listed(cycle, 'and')} is stated through itself.`
        : `The constants ${listed(shown, 'and')} are stated through one another in a circle.`,
    why: 'None of them can be computed before the others.',
    mend: 'State one of them as a number.',
    evidence: { cycle: shown, ...(isOverridden ? { override: '--with' } : {}) },
  });
}
