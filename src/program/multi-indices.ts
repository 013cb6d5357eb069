/** All exponent vectors of a length with total degree from 1 to `degree`, lower degrees first. */
export function multiIndices(length: number, degree: number): number[][] {
  const ofDegree = (size: number, total: number): number[][] => {
    if (size === 0) return total === 0 ? [[]] : [];
    const found: number[][] = [];
    for (let first = total; first >= 0; first--) {
      for (const rest of ofDegree(size - 1, total - first)) found.push([first, ...rest]);
    }
    return found;
  };
  return Array.from({ length: degree }, (_, index) => ofDegree(length, index + 1)).flat();
}
