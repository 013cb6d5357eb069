import type { Expression } from '#built/program/expression.js';

/** Writes a tree as text with every bracket that its shape needs. */
export function printed(tree: Expression): string {
  switch (tree.kind) {
    case 'number':
      return String(tree.value);
    case 'name':
      return tree.name;
    case 'member':
      return `${tree.family}[${printed(tree.index)}]`;
    case 'unary':
      return `${tree.operator === 'not' ? 'not ' : '-'}${bracketed(tree.operand)}`;
    case 'binary':
      return `${bracketed(tree.left)} ${tree.operator} ${bracketed(tree.right)}`;
    case 'call':
      return `${tree.function}(${tree.arguments.map(printed).join(', ')})`;
  }
}

function bracketed(tree: Expression): string {
  return tree.kind === 'unary' || tree.kind === 'binary' ? `(${printed(tree)})` : printed(tree);
}

const levels: readonly (readonly string[])[] = [
  ['or'],
  ['and'],
  ['not'],
  ['<', '<=', '>', '>=', '==', '!='],
  ['+', '-'],
  ['*', '/'],
  ['negate'],
  ['^'],
];

/** Writes a tree with as few brackets as the language's own precedence allows. */
export function printedBriefly(tree: Expression): string {
  return brief(tree, 0);
}

function brief(tree: Expression, least: number): string {
  if (tree.kind === 'unary') {
    const own = tree.operator === 'not' ? 2 : 6;
    return wrapped(`${tree.operator === 'not' ? 'not ' : '-'}${brief(tree.operand, own)}`, own, least);
  }
  if (tree.kind === 'binary') {
    const own = levels.findIndex((operators) => operators.includes(tree.operator));
    const isPower = tree.operator === '^';
    const text = `${brief(tree.left, isPower ? 8 : own)} ${tree.operator} ${brief(tree.right, isPower ? 6 : own + 1)}`;
    return wrapped(text, own, least);
  }
  if (tree.kind === 'member') return `${tree.family}[${brief(tree.index, 0)}]`;
  if (tree.kind === 'call') return `${tree.function}(${tree.arguments.map((part) => brief(part, 0)).join(',')})`;
  return printed(tree);
}

function wrapped(text: string, own: number, least: number): string {
  return own < least ? `(${text})` : text;
}

/** A tree without its places in the text. */
export function shape(tree: unknown): unknown {
  return JSON.parse(JSON.stringify(tree, (key, value) => (key === 'span' || key === 'nameSpan' ? undefined : value)));
}
