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

/** What other languages call a function, and how it is written here. */
export const foreignFunctions: ReadonlyMap<string, string> = new Map([
  ['ln', 'The natural logarithm is log(x).'],
  ['log10', '`log` is the natural logarithm; to base 10 write log(x) / log(10).'],
  ['log2', '`log` is the natural logarithm; to base 2 write log(x) / log(2).'],
  ['log1p', 'Write log(1 + x).'],
  ['expm1', 'Write exp(x) - 1.'],
  ['pow', 'Write a power as a ^ b.'],
  ['power', 'Write a power as a ^ b.'],
  ['sqr', 'Write a square as x ^ 2.'],
  ['square', 'Write a square as x ^ 2.'],
  ['cbrt', 'Write a cube root as x ^ (1 / 3).'],
  ['avg', 'The mean of a family is mean(family); of single numbers, (a + b) / 2.'],
  ['average', 'The mean of a family is mean(family); of single numbers, (a + b) / 2.'],
  ['total', 'The total of a family is sum(family); of single numbers, a + b.'],
  ['prod', 'The product of a family is product(family); of single numbers, a * b.'],
  ['maximum', 'Of single numbers write max(a, b); of a family largest(family).'],
  ['minimum', 'Of single numbers write min(a, b); of a family smallest(family).'],
  ['median', 'The median of a family of three is largest(family, 2).'],
  ['round', 'Write floor(x + 0.5).'],
  ['ceil', 'Write -floor(-x).'],
  ['ceiling', 'Write -floor(-x).'],
  ['int', 'Write floor(x).'],
  ['trunc', 'Write floor(x).'],
  ['mod', 'The rest of a / b is a - b * floor(a / b).'],
  ['sign', 'Write if(x > 0, 1, if(x < 0, -1, 0)).'],
  ['where', 'A choice is if(condition, value, other value).'],
  ['choose', 'A choice is if(condition, value, other value).'],
  ['ifelse', 'A choice is if(condition, value, other value).'],
  ['iif', 'A choice is if(condition, value, other value).'],
  ['cdf', 'The normal distribution function is normalcdf(x).'],
  ['normcdf', 'The normal distribution function is normalcdf(x).'],
  ['phi', 'The normal distribution function is normalcdf(x).'],
  ['erf', 'Write 2 * normalcdf(x * sqrt(2)) - 1.'],
]);

/** Words of the expression language that nobody may give to a constant or a driver. */
export const reservedWords: ReadonlySet<string> = new Set([
  ...functionShapes.keys(),
  ...['and', 'or', 'not', 't', 'number', 'previous', 'auto', 'lapse', 'forced', 'yes', 'no', 'true', 'false'],
]);
