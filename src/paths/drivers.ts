import { builtLaws } from '../laws/built-laws.js';
import type { Law } from '../laws/law.js';
import { evaluateConstant } from '../program/evaluate.js';
import type { CheckedModel, DriverFamily } from '../scenario/model.js';

/** One driver of the model: a single one or one member of a family. */
export interface Driver {
  /** As a reader would write it: `fuel`, `lot[2]`. */
  readonly name: string;
  readonly family: DriverFamily;
  /** 1-based position in its family. */
  readonly number: number;
  readonly law: Law;
  readonly start: number;
}

/** All drivers in the order of the correlation matrix: members in order, families in file order. */
export function listDrivers(model: CheckedModel): Driver[] {
  const constants = new Map(model.constants.map(({ name, value }) => [name, value]));
  return model.families.flatMap((family) =>
    Array.from({ length: family.count }, (_, position) => {
      const number = position + 1;
      const expression = family.start.length === 1 ? family.start[0]! : family.start[position]!;
      return {
        name: family.isFamily ? `${family.name}[${number}]` : family.name,
        family,
        number,
        law: builtLaws.get(family.law)!,
        start: evaluateConstant(expression.tree, (name) => (name === 'number' ? number : constants.get(name)!)),
      };
    }),
  );
}
