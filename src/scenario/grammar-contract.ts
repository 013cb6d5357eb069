import { z } from 'zod';
import { betweenPoints, expression, oneOf, table, text, yesNo } from './grammar-leaves.js';
import { upperMethods } from './upper-methods.js';

const group = { error: 'a group of keys' };

const decisionDates = z.union(
  [
    z.array(expression),
    z.strictObject({
      count: expression.optional(),
      first: expression.optional(),
      last: expression.optional(),
      every: expression.optional(),
      today: yesNo.optional(),
    }),
  ],
  { error: '{ count, last }, { first, last, every }, or a list of times' },
);

const window = z.strictObject({ from: expression.optional(), to: expression.optional() }, group);

const windows = z.array(window, { error: 'a list of { from, to }' });

const amountByDate = z.strictObject(
  { from: expression.optional(), to: expression.optional(), pays: expression.optional() },
  group,
);

const payoff = z.union(
  [expression, z.strictObject({ holder: expression.optional(), issuer: expression.optional() }), z.array(amountByDate)],
  { error: 'a formula, { holder, issuer }, or a list of { from, to, pays }' },
);

const discount = z.union(
  [
    expression,
    z.strictObject({
      'zero rates': table.optional(),
      'discount factors': table.optional(),
      'between points': betweenPoints.optional(),
    }),
  ],
  { error: 'a formula, or a curve { zero rates } or { discount factors }' },
);

const income = z.strictObject({ receive: expression.optional(), when: oneOf('arrears', 'advance').optional() }, group);

const endingEvent = z.strictObject(
  {
    event: expression.optional(),
    watched: oneOf('decision dates', 'steps').optional(),
    pays: expression.optional(),
  },
  group,
);

const rights = z.strictObject(
  {
    count: expression.optional(),
    wait: expression.optional(),
    'at least': expression.optional(),
    total: expression.optional(),
    unused: expression.optional(),
  },
  group,
);

const mode = z.strictObject(
  {
    receive: expression.optional(),
    when: oneOf('arrears', 'advance').optional(),
    'may become': z
      .record(z.string(), expression, { error: 'a group of modes with the cost to reach them' })
      .optional(),
    ends: yesNo.optional(),
  },
  group,
);

const storedQuantity = z.strictObject(
  {
    start: expression.optional(),
    least: expression.optional(),
    most: expression.optional(),
    levels: expression.optional(),
    'inject at most': expression.optional(),
    'withdraw at most': expression.optional(),
    'cost to inject': expression.optional(),
    'cost to withdraw': expression.optional(),
    loss: expression.optional(),
    'at the end': expression.optional(),
  },
  group,
);

/** The whole contract, the clauses that are still to come among them. */
export const contract = z.strictObject(
  {
    'decided by': oneOf('holder', 'issuer', 'both').optional(),
    'decision dates': decisionDates,
    windows: windows.optional(),
    blackout: windows.optional(),
    notice: expression.optional(),
    payoff,
    'at expiry': z.union([z.string(), z.number()], { error: 'lapse, forced, or an amount' }).optional(),
    discount,
    'while held': z.union([income, z.array(income)], { error: '{ receive, when }, or a list of them' }).optional(),
    'ends when': z
      .union([endingEvent, z.array(endingEvent)], { error: '{ event, watched, pays }, or a list of them' })
      .optional(),
    rights: rights.optional(),
    modes: z.record(z.string(), mode, { error: 'a group of named modes' }).optional(),
    'starting mode': text.optional(),
    'if both act on one date': expression.optional(),
    'stored quantity': storedQuantity.optional(),
  },
  group,
);

/** How the bracket is made. */
export const method = z.strictObject(
  {
    basis: z.union([z.enum(['auto']), z.array(expression)], { error: '`auto` or a list of formulas' }).optional(),
    'bracket width': z
      .strictObject(
        { relative: text.optional(), money: text.optional() },
        { error: '{ relative: 0.1% } or { money: 0.02 }' },
      )
      .optional(),
    counts: z
      .strictObject(
        { fit: expression.optional(), outer: expression.optional(), inner: expression.optional() },
        { error: '{ fit, outer, inner }' },
      )
      .optional(),
    upper: z
      .union(
        [
          oneOf(...upperMethods),
          z.strictObject({
            method: oneOf(...upperMethods).optional(),
            outer: expression.optional(),
            inner: expression.optional(),
          }),
        ],
        { error: 'one-step, andersen-broadie, regressed, or { method, outer, inner }' },
      )
      .optional(),
    'steps between dates': expression.optional(),
  },
  group,
);
