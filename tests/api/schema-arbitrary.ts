import fc from 'fast-check';
import type { JsonSchema } from './api-description';

interface Schema {
  readonly type?: string;
  readonly const?: unknown;
  readonly enum?: readonly unknown[];
  readonly oneOf?: readonly Schema[];
  readonly anyOf?: readonly Schema[];
  readonly allOf?: readonly Schema[];
  readonly properties?: Readonly<Record<string, Schema>>;
  readonly required?: readonly string[];
  readonly items?: Schema;
  readonly minItems?: number;
  readonly minLength?: number;
  readonly maxLength?: number;
  readonly minimum?: number;
  readonly maximum?: number;
  readonly format?: string;
}

/** Longer ones are another test's business. */
const MOST_ITEMS = 4;
const LONGEST_TEXT = 40;

/** Values of the form that a JSON schema asks for; what it leaves open is any JSON. */
export function valueOf(schema: JsonSchema): fc.Arbitrary<unknown> {
  return arbitraryOf(schema as Schema);
}

function arbitraryOf(schema: Schema): fc.Arbitrary<unknown> {
  const branches = schema.oneOf ?? schema.anyOf;
  if (branches !== undefined) return fc.oneof(...branches.map(arbitraryOf));
  if (schema.const !== undefined) return fc.constant(schema.const);
  if (schema.enum !== undefined) return fc.constantFrom(...schema.enum);
  switch (schema.type) {
    case 'object':
      return objectOf(schema);
    case 'array':
      return fc.array(arbitraryOf(schema.items ?? {}), { minLength: schema.minItems ?? 0, maxLength: MOST_ITEMS });
    case 'string':
      return textOf(schema);
    case 'integer':
      return fc.integer({ min: Math.max(schema.minimum ?? -10, -10), max: Math.min(schema.maximum ?? 100, 100) });
    case 'number':
      return fc.double({ noNaN: true, noDefaultInfinity: true });
    case 'boolean':
      return fc.boolean();
    default:
      return fc.jsonValue({ maxDepth: 2 });
  }
}

function objectOf({ properties, required }: Schema): fc.Arbitrary<unknown> {
  if (properties === undefined) return fc.dictionary(fc.string({ maxLength: 12 }), fc.jsonValue({ maxDepth: 2 }));
  const fields = Object.fromEntries(Object.entries(properties).map(([key, value]) => [key, arbitraryOf(value)]));
  return fc.record(fields, { requiredKeys: [...(required ?? [])] });
}

function textOf({ format, minLength = 0, maxLength = LONGEST_TEXT }: Schema): fc.Arbitrary<string> {
  if (format === 'uuid') return fc.uuid();
  const longest = Math.max(minLength, Math.min(maxLength, LONGEST_TEXT));
  return fc.string({ unit: 'grapheme', minLength, maxLength: longest });
}
