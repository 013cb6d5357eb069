import type { Law } from './law.js';
import { lognormal } from './lognormal.js';
import { normal } from './normal.js';

/** Every law that can be simulated, by its name in the scenario. */
export const builtLaws: ReadonlyMap<string, Law> = new Map([lognormal, normal].map((law) => [law.name, law]));
