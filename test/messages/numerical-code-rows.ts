import type { CodeRow } from './scenario-code-rows.js';

/** The codes of the numerical stages, and `defect`. */
export const numericalCodeRows: readonly CodeRow[] = [];
