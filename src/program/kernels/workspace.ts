/** Bytes from one column of the workspace to the next: `columnStride` of `../program.ts`, a test holds them together. */
export const columnBytes: usize = 520 * 8;
