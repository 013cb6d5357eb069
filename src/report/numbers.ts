export { memory } from '../messages/figures.js';

/**
 * Decimals that show an estimate to two significant digits of its half-width, because further digits are noise.
 *
 * @example decimalsFor(0.0042) // 4
 */
export function decimalsFor(halfWidth: number | null): number {
  if (halfWidth === null || !Number.isFinite(halfWidth) || halfWidth <= 0) return 6;
  // Rounding to two digits first: 0.00996 is 0.010 and needs three decimals, not four.
  const exponent = Number(halfWidth.toExponential(1).split('e')[1]);
  return Math.min(12, Math.max(0, 1 - exponent));
}

/** A number with a fixed count of decimals and no minus sign before a zero. */
export function fixed(value: number, decimals: number): string {
  const text = value.toFixed(decimals);
  return /^-[0.]*$/.test(text) ? text.slice(1) : text;
}

/** A number rounded away from the inside of an interval, so that a printed interval never is narrower than the real one. */
export function fixedOutward(value: number, decimals: number, side: 'low' | 'high'): string {
  const rounded = Number(value.toFixed(decimals));
  const isInside = side === 'low' ? rounded > value : rounded < value;
  if (!isInside) return fixed(rounded, decimals);
  return fixed(rounded + (side === 'low' ? -1 : 1) * 10 ** -decimals, decimals);
}

/** A count with its thousands parted. */
export function grouped(count: number): string {
  return String(Math.round(count)).replace(/\B(?=(\d{3})+$)/g, ',');
}

/** A noun after its count. */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${grouped(count)} ${count === 1 ? one : many}`;
}

/** A large count in words, for work that is only known roughly. */
export function roughCount(count: number): string {
  if (count < 1e4) return grouped(count);
  if (count < 1e6) return `${Number((count / 1e3).toPrecision(2))} thousand`;
  if (count < 1e9) return `${Number((count / 1e6).toPrecision(2))} million`;
  return `${grouped(Number((count / 1e9).toPrecision(2)))} billion`;
}

/** A share between 0 and 1 as a percentage with one decimal. */
export function percent(share: number): string {
  if (share > 0 && share < 0.0005) return '<0.1%';
  return `${fixed(100 * share, 1)}%`;
}

/**
 * A factor with two decimals, or three digits where it is large.
 *
 * @example factor(1.948) // '1.95'
 */
export function factor(value: number): string {
  return value < 10 ? value.toFixed(2) : grouped(Number(value.toPrecision(3)));
}

/** A relative width as a percentage with two significant digits. */
export function relativePercent(share: number): string {
  return `${fixed(100 * share, decimalsFor(Math.abs(100 * share)))}%`;
}

/** A time on the scenario's clock, to four significant digits. */
export function clockTime(time: number): string {
  return String(Number(time.toPrecision(4)));
}

/** A span of wall time. */
export function duration(seconds: number): string {
  if (seconds < 59.95) return `${fixed(seconds, 1)} s`;
  const whole = Math.round(seconds);
  const minutes = Math.floor(whole / 60);
  if (minutes < 60) return `${minutes} min ${whole % 60} s`;
  return `${Math.floor(minutes / 60)} h ${minutes % 60} min`;
}

/** A number that carries no noise: at most ten significant digits. */
export function exactFigure(value: number): string {
  return String(Number(value.toPrecision(10)));
}

/** Whether a width is nothing but rounding beside the value that it belongs to: below 1e-9 of it. */
export function isWithoutNoise(width: number, value: number): boolean {
  return Math.abs(width) <= 1e-9 * Math.abs(value);
}
