import type { Graph, Node } from '../program/graph.js';
import type { Meanings } from '../program/lower.js';
import type { CheckedModel } from '../scenario/model.js';
import type { Driver } from './drivers.js';

/** What the names of payoffs, incomes and bases stand for, given a node for each driver and for the clock. */
export function meaningsOfState(
  model: CheckedModel,
  graph: Graph,
  drivers: readonly Driver[],
  states: readonly Node[],
  clock: Node,
): Meanings {
  const values = new Map<string, Node>([['t', clock]]);
  const families = new Map<string, Node[]>();
  for (const { name, value } of model.constants) values.set(name, graph.constant(value));
  drivers.forEach(({ family }, index) => {
    if (!family.isFamily) values.set(family.name, states[index]!);
    else families.set(family.name, [...(families.get(family.name) ?? []), states[index]!]);
  });
  return { value: (name) => found(values, name), family: (name) => found(families, name) };
}

/** What the names in a law's parameters stand for: constants, and the member's `number`. */
export function meaningsOfMember(model: CheckedModel, graph: Graph, number: number): Meanings {
  const values = new Map<string, Node>([['number', graph.constant(number)]]);
  for (const { name, value } of model.constants) values.set(name, graph.constant(value));
  return { value: (name) => found(values, name), family: (name) => found(new Map<string, Node[]>(), name) };
}

function found<T>(map: ReadonlyMap<string, T>, name: string): T {
  const value = map.get(name);
  if (value === undefined) throw new Error(`the name ${name} passed the check but has no meaning here`);
  return value;
}
