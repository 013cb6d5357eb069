import { z } from 'zod';

// The text of `error` in each schema completes "… must be" in the message for a value of the wrong kind.

/** A formula, or a number alone. */
export const expression = z.union([z.string(), z.number()], { error: 'a formula or a number' });

/** Any single value, taken as the text that it is. */
export const text = z.union([z.string(), z.number(), z.boolean()], { error: 'a text' });

/** In YAML 1.2 `yes` and `no` are texts; the words that are not are taken too. */
export const yesNo = z.union([z.enum(['yes', 'no']), z.boolean()], { error: 'yes or no' });

/** The name of a driver, a family, or a member such as `lot[2]`. */
export const driverName = z.string({ error: 'the name of a driver' });

/** A closed choice of words. */
export function oneOf<const T extends readonly [string, ...string[]]>(...words: T) {
  const list = words.length === 1 ? words[0] : `${words.slice(0, -1).join(', ')} or ${words.at(-1)}`;
  return z.enum(words, { error: list });
}

/** Rows of two: a time, and the value that holds there. */
export const table = z.array(z.array(expression, { error: 'a pair of a time and a value' }), {
  error: 'a list of pairs of a time and a value',
});

/** How a table is read between its rows. */
export const betweenPoints = oneOf('linear', 'step', 'log-linear');

/** A square of formulas, row by row. */
export const matrix = z.array(z.array(expression, { error: 'a row of formulas or numbers' }), {
  error: 'a list of rows',
});
