import { readFileSync } from 'node:fs';

/** One argument list with its exact value. */
export interface Reference {
  arguments: number[];
  result: number;
  /** Exact value minus result, in units of the result's last place. */
  rest: number;
}

const view = new DataView(new ArrayBuffer(8));

function fromHex(digits: string): number {
  view.setBigUint64(0, BigInt(`0x${digits}`));
  return view.getFloat64(0);
}

function fromBits(bits: bigint): number {
  view.setBigUint64(0, bits);
  return view.getFloat64(0);
}

/** The distance between neighbouring doubles in the binade of a value. */
export function lastPlace(value: number): number {
  view.setFloat64(0, value);
  const binade = view.getBigUint64(0) & 0x7ff0000000000000n;
  return fromBits(binade + 1n) - fromBits(binade);
}

/** Reference values by the name of the function. */
export const oracle = new Map<string, Reference[]>(
  Object.entries(
    JSON.parse(readFileSync(new URL('elementary-oracle.json', import.meta.url), 'utf8')) as Record<string, string[]>,
  ).map(([name, lines]) => [
    name,
    lines.map((line) => {
      const parts = line.split(' ');
      const doubles = parts.slice(0, -1).map(fromHex);
      return { arguments: doubles.slice(0, -1), result: doubles.at(-1)!, rest: Number(parts.at(-1)) };
    }),
  ]),
);

/** Error in units of the last place; NaN, infinities and overflow must be met exactly. */
export function errorOf(got: number, { result, rest }: Reference): number {
  if (Object.is(got, result)) return Math.abs(rest);
  if (!Number.isFinite(got) || !Number.isFinite(result)) return Infinity;
  return Math.abs((got - result) / lastPlace(result) - rest);
}
