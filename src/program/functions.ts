/** How a function of the language is called. */
export type FunctionShape =
  /** Takes numbers and gives a number. */
  | { readonly kind: 'numbers'; readonly least: number; readonly most: number }
  /** if(condition, number, number) */
  | { readonly kind: 'choice' }
  /** Takes a family by its bare name; with a rank behind it if `ranked`. */
  | { readonly kind: 'family'; readonly ranked: boolean };

/** Every function of the language by name. */
export const functionShapes: ReadonlyMap<string, FunctionShape> = new Map<string, FunctionShape>([
  ['if', { kind: 'choice' }],
  ['min', { kind: 'numbers', least: 2, most: Number.POSITIVE_INFINITY }],
  ['max', { kind: 'numbers', least: 2, most: Number.POSITIVE_INFINITY }],
  ...['abs', 'exp', 'log', 'sqrt', 'floor', 'normalcdf'].map((name): [string, FunctionShape] => [
    name,
    { kind: 'numbers', least: 1, most: 1 },
  ]),
  ['largest', { kind: 'family', ranked: true }],
  ['smallest', { kind: 'family', ranked: true }],
  ['sum', { kind: 'family', ranked: false }],
  ['mean', { kind: 'family', ranked: false }],
  ['product', { kind: 'family', ranked: false }],
]);

/** How a function is written, for a message. */
export const functionUses: ReadonlyMap<string, string> = new Map([
  ['if', 'if(condition, value, other value)'],
  ['min', 'min(a, b, …)'],
  ['max', 'max(a, b, …)'],
  ['abs', 'abs(x)'],
  ['exp', 'exp(x)'],
  ['log', 'log(x)'],
  ['sqrt', 'sqrt(x)'],
  ['floor', 'floor(x)'],
  ['normalcdf', 'normalcdf(x)'],
  ['largest', 'largest(family) or largest(family, rank)'],
  ['smallest', 'smallest(family) or smallest(family, rank)'],
  ['sum', 'sum(family)'],
  ['mean', 'mean(family)'],
  ['product', 'product(family)'],
]);

/** Words of the expression language that nobody may give to a constant or a driver. */
export const reservedWords: ReadonlySet<string> = new Set([
  ...functionShapes.keys(),
  ...['and', 'or', 'not', 't', 'number', 'previous', 'auto', 'lapse', 'forced', 'yes', 'no', 'true', 'false'],
]);
