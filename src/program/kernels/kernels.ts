/** What the compiled module offers; `../wasm-interpreter.ts` is the other side. */
export { runInstructions } from './instructions';
export { drawNormals, drawUniformColumns, latticeNormals } from './stream';
export { addProducts, areBetween, combine, sumColumn, sumProducts, sumSquares } from './sums';

/** The first free byte after the module's own data. */
export const dataEnd: usize = __heap_base;
