/**
 * A number for a sentence: at most twelve significant digits, so that no rounding of the last bits shows.
 *
 * @example figure(0.1 + 0.2) // '0.3'
 */
export function figure(value: number): string {
  return String(Number(value.toPrecision(12)));
}

/**
 * An amount of memory to three significant digits, in units of 1000: a GB is 1e9 bytes, here and in every message.
 *
 * @example memory(2.88e12) // '2,880 GB'
 */
export function memory(bytes: number): string {
  const units = ['bytes', 'KB', 'MB', 'GB'];
  let amount = bytes;
  let unit = 0;
  while (Number(amount.toPrecision(3)) >= 1000 && unit < units.length - 1) {
    amount /= 1000;
    unit += 1;
  }
  const shown = unit === 0 ? Math.round(amount) : Number(amount.toPrecision(3));
  return `${shown.toLocaleString('en-US')} ${units[unit]}`;
}

/**
 * An amount of memory as the command line takes it, rounded up, so that what is given is enough.
 *
 * @example memoryToGive(12_345_678) // '12.4MB'
 */
export function memoryToGive(bytes: number): string {
  const [unit, size] = bytes < 1e6 ? ['KB', 1e3] : bytes < 1e9 ? ['MB', 1e6] : ['GB', 1e9];
  const amount = bytes / size;
  const rounded = Number(amount.toPrecision(3));
  // One more in the third digit where rounding went down.
  const step = Number(`1e${Math.floor(Math.log10(amount)) - 2}`);
  return `${rounded >= amount ? rounded : Number((rounded + step).toPrecision(3))}${unit}`;
}
