import { z } from 'zod';
import { contract, method } from './grammar-contract.js';
import { correlationEntry, driver } from './grammar-drivers.js';
import { betweenPoints, expression, oneOf, table, text } from './grammar-leaves.js';

const constant = z.union(
  [
    expression,
    z.strictObject({
      value: expression.optional(),
      plausible: expression.optional(),
      'measured under': oneOf('pricing', 'history').optional(),
      table: table.optional(),
      'between points': betweenPoints.optional(),
    }),
  ],
  { error: 'a formula, a number, or { value, plausible, measured under }' },
);

const calendar = z.strictObject(
  {
    'day count': oneOf('actual/365', 'actual/360', 'actual/actual', '30/360', 'business/252').optional(),
    holidays: z.array(text, { error: 'a list of days' }).optional(),
  },
  { error: 'a group of keys' },
);

/**
 * The structure of a scenario: every key of the language, those of clauses and laws that are still to come among them.
 *
 * Only structure is judged here. What values mean (ranges, names, which keys go together) is judged afterwards, when
 * constants and drivers are known. Editors can complete and check a file from its JSON Schema.
 *
 * @example z.toJSONSchema(scenarioGrammar)
 */
export const scenarioGrammar = z.strictObject({
  title: text.optional(),
  'as of': text.optional(),
  calendar: calendar.optional(),
  money: text.optional(),
  clock: text.optional(),
  seed: text.optional(),
  constants: z.record(z.string(), constant, { error: 'a group of names with their values' }).optional(),
  drivers: z.record(z.string(), driver, { error: 'a group of drivers' }),
  correlation: z.array(correlationEntry, { error: 'a list, one line for each statement' }).optional(),
  contract,
  method: method.optional(),
  'what if': z
    .record(z.string(), z.record(z.string(), z.unknown(), { error: 'a group of changes' }), {
      error: 'a group of named cases',
    })
    .optional(),
});
