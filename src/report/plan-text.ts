import { printable } from '../messages/printable.js';
import type { RunRecord } from '../result/record.js';
import { methodWords } from './bracket-text.js';
import { counted, decimalsFor, duration, fixed, grouped, isWithoutNoise, percent } from './numbers.js';
import { pathsSentence } from './paths-text.js';
import { paragraph } from './prose.js';

/** The counts the run was made with, and what the pilot expected of them. */
export function planText(record: RunRecord, width: number): string {
  const { plan, pilot } = record;
  const sentences = [
    `${counted(plan.fitPathCount, 'path')} fit the rule.`,
    plan.innerPointCount === 0
      ? `${counted(plan.outerPathCount, 'fresh path')} carry the bounds, without inner draws.`
      : `${counted(plan.outerPathCount, 'fresh path')} carry the bounds, with ${counted(plan.innerPointCount, 'point')} of one step at every path and date.`,
  ];
  if (plan.nestedOuterPathCount > 0) {
    sentences.push(
      `${counted(plan.nestedOuterPathCount, 'path')} of their own carry the Andersen-Broadie bound, with ${counted(plan.nestedInnerPathCount, 'inner path')} each time one is needed.`,
    );
  }
  if (record.status === 'stopped') {
    const ruled = record.decidedBy === 'holder' ? record.lower : record.upper;
    sentences.push(`The run was stopped when ${grouped(ruled.pathCount)} of them were finished.`);
  }
  const bracketBound = record.decidedBy === 'holder' ? 'upper' : 'lower';
  const beside =
    plan.upper === 'regressed' && plan.innerPointCount > 0 ? '; the points serve the rule and the bound beside it' : '';
  sentences.push(`The bracket's ${bracketBound} end comes from: ${methodWords(plan.upper)}${beside}.`);
  if (pilot === null) {
    sentences.push('There was no pilot: the outer and inner counts were given.');
  } else if (isWithoutNoise(pilot.expectedWidth, record.lower.value)) {
    sentences.push(`The pilot (${counted(pilot.outerPathCount, 'path')}) found no sampling error.`);
  } else {
    const decimals = decimalsFor(Math.min(pilot.expectedWidth, pilot.wantedWidth ?? pilot.expectedWidth));
    const money = printable(record.scenario.money);
    const wanted = pilot.wantedWidth === null ? '' : ` where ${fixed(pilot.wantedWidth, decimals)} was wanted`;
    const reached = record.bracket95.high - record.bracket95.low;
    sentences.push(
      `The pilot (${counted(pilot.outerPathCount, 'path')}) expected a bracket ${fixed(pilot.expectedWidth, decimals)} ${money} wide${wanted}; it became ${fixed(reached, decimals)}.`,
    );
  }
  sentences.push(pathsSentence(record.paths));
  return paragraph(sentences.join(' '), width);
}

/** The regression behind the rule: how many columns there were, stayed, and how much they explain. */
export function basisText(record: RunRecord, width: number): string {
  const columnCount = record.basis.columns.length;
  const sentences = [
    `${counted(columnCount, 'column')} in the regression, ${counted(record.basis.martingalePolynomials.length, 'polynomial')} in the martingale.`,
  ];
  // The last date has no continuation and so no fit.
  const fits = record.dates.filter((date) => date.keptColumnCount > 0);
  const kept = fits.map((date) => date.keptColumnCount);
  if (kept.length > 0) {
    const fewest = Math.min(...kept);
    const most = Math.max(...kept);
    sentences.push(
      fewest === most
        ? `Kept at every date: ${grouped(most)}.`
        : `Kept: ${grouped(fewest)} to ${grouped(most)}, by date.`,
    );
  }
  const explained = fits.flatMap((date) => (date.explainedShare === null ? [] : [date.explainedShare]));
  if (explained.length > 0) {
    sentences.push(
      `The columns explain ${percent(Math.min(...explained))} to ${percent(Math.max(...explained))} of the variance, by date.`,
    );
  }
  return paragraph(sentences.join(' '), width);
}

/** Where the wall time went. */
export function timingText(record: RunRecord, width: number): string {
  const { totalSeconds, fitSeconds, pilotSeconds, boundsSeconds } = record.timing;
  return paragraph(
    `${duration(totalSeconds)} in all: fit ${duration(fitSeconds)}, pilot ${duration(pilotSeconds)}, bounds ${duration(boundsSeconds)}.`,
    width,
  );
}
