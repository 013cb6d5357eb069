import seedrandom from 'seedrandom';
import type { StreamKey } from '../program/stream.js';

/**
 * What a set of draws is for. Paths of one purpose never serve another: a rule valued on the paths that made it would
 * look better than it is.
 */
export type Purpose = 'fit' | 'select' | 'select inner' | 'pilot' | 'pilot inner' | FinalPurpose;

type FinalStage = 'outer' | 'inner' | 'nested outer' | 'nested inner';

/** Draws that make a bracket; each round has its own. */
export type FinalPurpose = FinalStage | `${FinalStage} ${number}`;

/** The draws of a stage in a round, the first being round 1. */
export function purposeInRound(stage: FinalStage, round: number): FinalPurpose {
  return round === 1 ? stage : `${stage} ${round}`;
}

/**
 * The key of the stream for one purpose and one innovation.
 *
 * The innovation's name and not its number is part of the key, so that adding a driver shifts no other draw.
 *
 * @source the ARC4 generator of the seedrandom package, keyed with the whole text
 */
export function streamKey(seed: string, purpose: Purpose, innovationName: string): StreamKey {
  const generator = seedrandom(asciiText([seed, purpose, innovationName]));
  return { low: generator.int32() >>> 0, high: generator.int32() >>> 0 };
}

/** The keys of several innovations. @shape innovations × 2: low half, high half */
export function streamKeys(seed: string, purpose: Purpose, innovationNames: readonly string[]): Int32Array {
  return Int32Array.from(
    innovationNames.flatMap((name) => {
      const { low, high } = streamKey(seed, purpose, name);
      return [low, high];
    }),
  );
}

/** JSON in ASCII alone: the package looks at the low byte of each character only, so others must be spelled out. */
function asciiText(parts: readonly string[]): string {
  return JSON.stringify(parts).replace(/[^ -~]/g, (character) => `\\u${character.charCodeAt(0).toString(16)}`);
}
