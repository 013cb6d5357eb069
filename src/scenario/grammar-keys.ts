import type { z } from 'zod';

/** What is read of a schema's inside; zod documents `def` for tools that walk a schema. */
interface Definition {
  readonly type: string;
  readonly shape?: Readonly<Record<string, z.ZodType>>;
  readonly innerType?: z.ZodType;
  readonly element?: z.ZodType;
  readonly valueType?: z.ZodType;
  readonly options?: readonly z.ZodType[];
}

function definitionOf(schema: z.ZodType): Definition {
  return schema.def as unknown as Definition;
}

/** The schemas behind optional values and choices. */
function unwrapped(schema: z.ZodType): z.ZodType[] {
  const { innerType, options } = definitionOf(schema);
  if (innerType !== undefined) return unwrapped(innerType);
  return options === undefined ? [schema] : options.flatMap(unwrapped);
}

/** The keys that the grammar has in a group at a path; none if there is no group with fixed keys. */
export function keysAt(schema: z.ZodType, path: readonly PropertyKey[]): string[] {
  const [step, ...rest] = path;
  return unwrapped(schema).flatMap((option) => {
    const { shape, element, valueType } = definitionOf(option);
    if (step === undefined) return shape === undefined ? [] : Object.keys(shape);
    if (shape !== undefined) return Object.hasOwn(shape, step) ? keysAt(shape[String(step)]!, rest) : [];
    const inner = typeof step === 'number' ? element : valueType;
    return inner === undefined ? [] : keysAt(inner, rest);
  });
}

/** Where else in the grammar a key stands, as the way there from the top; names of the user's are written `…`. */
export function placesOfKey(schema: z.ZodType, key: string, path: readonly string[] = []): string[][] {
  return unwrapped(schema).flatMap((option) => {
    const { shape, element, valueType } = definitionOf(option);
    if (shape !== undefined) {
      const here = Object.hasOwn(shape, key) ? [[...path]] : [];
      return [...here, ...Object.entries(shape).flatMap(([name, inner]) => placesOfKey(inner, key, [...path, name]))];
    }
    if (element !== undefined) return placesOfKey(element, key, path);
    return valueType === undefined ? [] : placesOfKey(valueType, key, [...path, '…']);
  });
}
