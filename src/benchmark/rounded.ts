/** A figure for a person to read: so many digits behind the point. */
export function rounded(value: number, digits: number): number {
  return Number(value.toFixed(digits));
}
