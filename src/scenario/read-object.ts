import { stringify } from 'yaml';
import { mistake } from '../messages/build.js';
import { quoted } from '../messages/printable.js';
import { mostDepth } from './guard.js';
import type { ScenarioOverrides } from './overrides.js';
import { type ReadScenario, readScenario } from './read-scenario.js';

const mostValues = 100_000;

/** What keeps an object from being plain data; the way to it is told in keys. */
class NotPlain {
  constructor(
    readonly path: readonly string[],
    readonly reason: string,
  ) {}
}

/**
 * Reads a scenario from a plain object, by writing it as text and reading that: there is one way in, one set of checks,
 * and the text can be stored with the record.
 *
 * @fails gives `object-not-plain` for anything but plain groups, lists, texts, numbers and yes or no
 * @example readScenarioObject({ drivers: { price: { start: 100, law: 'normal', volatility: 5 } }, contract: { … } })
 */
export function readScenarioObject(object: unknown, overrides: ScenarioOverrides = {}): ReadScenario {
  const text = scenarioText(object);
  if (typeof text === 'string') return readScenario(text, overrides);
  const where = text.path.length === 0 ? 'The scenario object' : text.path.map(quoted).join(' / ');
  const message = mistake('object-not-plain', {
    what: `${where} ${text.reason}.`,
    why: 'A scenario is plain data that can be written down as text, stored and read again.',
    mend: 'Use plain objects, arrays, texts, finite numbers, true and false only.',
    evidence: { path: text.path },
  });
  return { scenario: null, messages: [message] };
}

/** The text of a scenario object as it is read and stored, or what keeps it from being written. */
export function scenarioText(object: unknown): string | { readonly path: readonly string[]; readonly reason: string } {
  const budget = { left: mostValues };
  const copy = plainCopy(object, [], budget);
  if (copy instanceof NotPlain) return { path: copy.path, reason: copy.reason };
  return stringify(copy, { version: '1.2', schema: 'core', lineWidth: 0, aliasDuplicateObjects: false });
}

/** A copy without prototypes, getters, shared parts or circles; each property is read once. */
function plainCopy(value: unknown, path: readonly string[], budget: { left: number }): unknown {
  budget.left -= 1;
  if (budget.left < 0) return new NotPlain(path, `belongs to an object with more than ${mostValues} values`);
  if (path.length > mostDepth) return new NotPlain(path.slice(0, 3), 'is nested too deep, or contains itself');
  if (value === null || typeof value === 'string' || typeof value === 'number' || typeof value === 'boolean')
    return value;
  if (typeof value !== 'object') return new NotPlain(path, `is a ${typeof value}`);
  try {
    return Array.isArray(value) ? copyList(value, path, budget) : copyGroup(value, path, budget);
  } catch {
    // A getter or proxy of the caller's own threw: whatever it said, the object is no plain data.
    return new NotPlain(path, 'cannot be read');
  }
}

function copyList(list: readonly unknown[], path: readonly string[], budget: { left: number }): unknown {
  if (list.length > budget.left) return new NotPlain(path, `has more than ${mostValues} items`);
  const copies: unknown[] = [];
  for (let index = 0; index < list.length; index += 1) {
    const copy = plainCopy(list[index], [...path, `item ${index + 1}`], budget);
    if (copy instanceof NotPlain) return copy;
    copies.push(copy);
  }
  return copies;
}

function copyGroup(group: object, path: readonly string[], budget: { left: number }): unknown {
  const prototype = Object.getPrototypeOf(group);
  const isPlain = prototype === null || Object.getPrototypeOf(prototype) === null;
  if (!isPlain) return new NotPlain(path, 'is not a plain object');
  const copies = new Map<string, unknown>();
  for (const key of Object.keys(group)) {
    const value = (group as Record<string, unknown>)[key];
    if (value === undefined) continue;
    const copy = plainCopy(value, [...path, key], budget);
    if (copy instanceof NotPlain) return copy;
    copies.set(key, copy);
  }
  return copies;
}
