import { z } from 'zod';
import { betweenPoints, driverName, expression, matrix, oneOf, table, text, yesNo } from './grammar-leaves.js';

const startReversion = {
  start: expression.optional(),
  speed: expression.optional(),
  level: expression.optional(),
  volatility: expression.optional(),
  correlation: expression.optional(),
};

const jumps = z.strictObject(
  {
    'per clock unit': expression.optional(),
    size: oneOf('normal', 'double-exponential').optional(),
    mean: expression.optional(),
    deviation: expression.optional(),
    'share up': expression.optional(),
    'mean up': expression.optional(),
    'mean down': expression.optional(),
  },
  { error: 'a group of keys' },
);

const regimes = z.strictObject(
  {
    names: z.array(text, { error: 'a list of names' }).optional(),
    rates: matrix.optional(),
    start: text.optional(),
    observed: yesNo.optional(),
    parameters: z
      .record(z.string(), z.record(z.string(), expression, { error: 'a group of law keys' }), {
        error: 'a group of regimes',
      })
      .optional(),
  },
  { error: 'a group of keys' },
);

const shock = z.strictObject(
  {
    law: oneOf('normal', 'uniform', 'exponential', 'Poisson', 'Bernoulli', 'Student').optional(),
    mean: expression.optional(),
    deviation: expression.optional(),
    from: expression.optional(),
    to: expression.optional(),
    probability: expression.optional(),
    'degrees of freedom': expression.optional(),
  },
  { error: 'a group of keys' },
);

/**
 * A driver or family. The keys of all laws stand side by side, because which law reads which is told better by the law
 * catalogue than by a choice between two dozen forms.
 */
export const driver = z.strictObject(
  {
    count: expression.optional(),
    start: z.union([expression, z.array(expression)], { error: 'a formula, a number, or a list of them' }).optional(),
    law: z.string({ error: 'the name of a law' }),
    observed: yesNo.optional(),
    'growth of mean': expression.optional(),
    drift: expression.optional(),
    volatility: expression.optional(),
    speed: expression.optional(),
    level: expression.optional(),
    'Hurst exponent': expression.optional(),
    variance: z.strictObject(startReversion, { error: 'a group of keys' }).optional(),
    'convenience yield': z.strictObject(startReversion, { error: 'a group of keys' }).optional(),
    states: z.array(expression, { error: 'a list of numbers' }).optional(),
    transitions: z
      .union([matrix, z.array(matrix)], { error: 'a matrix, or a list of matrices, one for each date' })
      .optional(),
    change: z
      .strictObject({ drift: expression.optional(), diffusion: expression.optional() }, { error: 'a group of keys' })
      .optional(),
    scheme: oneOf('Euler', 'Milstein').optional(),
    next: expression.optional(),
    shocks: z.record(z.string(), shock, { error: 'a group of named shocks' }).optional(),
    of: driverName.optional(),
    keep: expression.optional(),
    event: expression.optional(),
    sampled: oneOf('decision dates', 'steps').optional(),
    jumps: jumps.optional(),
    regimes: regimes.optional(),
    'matched to': table.optional(),
    'between points': betweenPoints.optional(),
  },
  { error: 'a group of keys' },
);

/** One statement about correlations; which keys go together is judged with the drivers known. */
export const correlationEntry = z.strictObject(
  {
    among: driverName.optional(),
    between: z.array(driverName, { error: 'a list of two drivers' }).optional(),
    value: expression.optional(),
    of: z.array(driverName, { error: 'a list of drivers' }).optional(),
    matrix: matrix.optional(),
    factor: expression.optional(),
    blocks: z.array(z.unknown(), { error: 'a list of blocks' }).optional(),
  },
  { error: 'a group of keys' },
);
