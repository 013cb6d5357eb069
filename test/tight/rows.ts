import { readFileSync } from 'node:fs';
import { type LotsChange, lots } from '../scenario-texts.js';

/** An interval that others published for a contract. */
export interface Published {
  readonly low: number;
  readonly high: number;
}

/** How a bracket has to lie to what is known: around the exact value, touching each published interval, or inside it. */
export type Relation = 'contains' | 'overlaps' | 'lies within';

/** A contract with the bracket that a run of it must reach. */
export interface TightRow {
  readonly name: string;
  readonly text: string;
  /** What `--width` would say; null leaves it to the scenario or the default. */
  readonly width: string | null;
  /** Largest width that the median run may have; the worst may have 1.3 times as much. Money, or a share of the value. */
  readonly limit: { readonly money: number } | { readonly relative: number };
  /** Printed beside what was measured, never asserted. */
  readonly allowedSeconds: number;
  readonly relation: Relation;
  /** What quadrature says; null where nothing exact is known. */
  readonly exact: number | null;
  readonly published: readonly Published[];
}

const shipped = (name: string) => readFileSync(new URL(`../../scenarios/${name}.yaml`, import.meta.url), 'utf8');

interface LotsRow {
  readonly name: string;
  readonly change: LotsChange;
  readonly money: number;
  readonly allowedSeconds: number;
  readonly published: readonly Published[];
}

/** A best-of right whose value others enclosed. */
function lotsRow({ name, change, money, allowedSeconds, published }: LotsRow): TightRow {
  return {
    name,
    text: lots(change),
    width: String(money),
    limit: { money },
    allowedSeconds,
    relation: 'overlaps',
    exact: null,
    published,
  };
}

/**
 * The contracts with published or exact values, and how narrow their brackets must be.
 *
 * @source where not said otherwise, published intervals: Becker, Cheridito & Jentzen (2019), J. Machine Learning Research
 *   20(74), table 1; from memory
 */
export const tightRows: readonly TightRow[] = [
  {
    ...lotsRow({
      name: 'two lots, start 100',
      change: { count: 2 },
      money: 0.01,
      allowedSeconds: 15,
      published: [{ low: 13.88, high: 13.91 }],
    }),
    relation: 'contains',
    // Independent quadrature on aligned logarithmic grids, error at most 0.0001.
    exact: 13.9018,
  },
  lotsRow({
    name: 'five lots, start 90',
    change: { count: 5, start: 90 },
    money: 0.01,
    allowedSeconds: 30,
    published: [{ low: 16.633, high: 16.648 }],
  }),
  lotsRow({
    name: 'five lots, start 100',
    change: { count: 5 },
    money: 0.02,
    allowedSeconds: 30,
    published: [{ low: 26.138, high: 26.174 }],
  }),
  lotsRow({
    name: 'five lots, start 110',
    change: { count: 5, start: 110 },
    money: 0.025,
    allowedSeconds: 30,
    published: [{ low: 36.745, high: 36.789 }],
  }),
  lotsRow({
    name: 'ten lots, start 100',
    change: { count: 10 },
    money: 0.04,
    allowedSeconds: 60,
    published: [
      { low: 38.3, high: 38.367 },
      // Becker, Cheridito & Jentzen (2020), J. Risk Financial Manag. 13(7), 158, table 1; from memory.
      { low: 38.335, high: 38.399 },
    ],
  }),
  lotsRow({
    name: 'fifty lots, start 100',
    change: { count: 50 },
    money: 0.2,
    allowedSeconds: 120,
    published: [{ low: 69.56, high: 69.945 }],
  }),
  {
    name: 'hundred lots, start 100',
    text: shipped('04-hundred-lots'),
    width: null,
    limit: { money: 0.25 },
    allowedSeconds: 180,
    relation: 'overlaps',
    exact: null,
    published: [{ low: 83.357, high: 83.862 }],
  },
  {
    name: 'capped lots',
    text: shipped('05-capped-lots'),
    width: null,
    limit: { relative: 0.005 },
    allowedSeconds: 180,
    relation: 'lies within',
    exact: null,
    // Desai, Farias & Moallemi (2012), Management Science 58(12), 2292-2308: the best lower bound there and the lowest of
    // the upper bounds, each with its own error; from memory.
    published: [{ low: 50.252, high: 51.814 }],
  },
  {
    name: 'floor price',
    text: shipped('03-floor-price'),
    width: null,
    limit: { relative: 0.002 },
    allowedSeconds: 30,
    relation: 'contains',
    // Independent convolution on 32,768 points, error below 0.0001.
    exact: 2.3141,
    published: [],
  },
];
