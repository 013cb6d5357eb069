import type { Driver } from '../paths/drivers.js';
import { evaluateConstant } from '../program/evaluate.js';
import type { Expression } from '../program/expression.js';
import type { CheckedModel } from '../scenario/model.js';
import type { DriverGroup } from './variables.js';

/**
 * Finds the families whose members may change places without changing the problem: same start, same constants, equal
 * correlations among themselves and with every other driver, and a contract that names no single member.
 */
export function groupDrivers(model: CheckedModel, drivers: readonly Driver[]): DriverGroup[] {
  let first = 0;
  return model.families.map((family) => {
    const members = Array.from({ length: family.count }, (_, position) => first + position);
    first += family.count;
    const exchangeable =
      family.count > 1 &&
      hasEqualMembers(model, drivers, members) &&
      hasEqualCorrelations(model, members) &&
      !contractExpressions(model).some((tree) => namesMember(tree, family.name));
    return { name: family.name, exchangeable, members };
  });
}

function contractExpressions({ contract }: CheckedModel): Expression[] {
  const { payoff, atExpiry, endingEvent } = contract;
  return [
    payoff.tree,
    ...(atExpiry.kind === 'pays' ? [atExpiry.amount.tree] : []),
    ...(endingEvent === null ? [] : [endingEvent.event.tree, endingEvent.pays.tree]),
  ];
}

function hasEqualMembers(model: CheckedModel, drivers: readonly Driver[], members: readonly number[]): boolean {
  const constants = new Map(model.constants.map(({ name, value }) => [name, value]));
  const describe = (index: number) => {
    const { start, number, family } = drivers[index]!;
    const constantOf = (name: string) => (name === 'number' ? number : constants.get(name)!);
    return [
      start,
      ...Object.values(family.parameters).map((parameter) => evaluateConstant(parameter.tree, constantOf)),
    ].join(' ');
  };
  return members.every((index) => describe(index) === describe(members[0]!));
}

function hasEqualCorrelations({ correlation }: CheckedModel, members: readonly number[]): boolean {
  const inside = new Set(members);
  const [a, b] = members as [number, number];
  return members.every((i) =>
    correlation[i]!.every((value, k) =>
      k === i ? true : inside.has(k) ? value === correlation[a]![b] : value === correlation[a]![k],
    ),
  );
}

/** Whether an expression names a single member of the family, as `lot[2]` does. */
function namesMember(tree: Expression, family: string): boolean {
  switch (tree.kind) {
    case 'number':
    case 'name':
      return false;
    case 'member':
      return tree.family === family;
    case 'unary':
      return namesMember(tree.operand, family);
    case 'binary':
      return namesMember(tree.left, family) || namesMember(tree.right, family);
    case 'call':
      return tree.arguments.some((argument) => namesMember(argument, family));
  }
}
