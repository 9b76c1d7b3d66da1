import fc, { type Arbitrary } from 'fast-check';
import * as z from 'zod';

interface JsonSchema {
  readonly type?: string;
  readonly const?: unknown;
  readonly enum?: readonly unknown[];
  readonly anyOf?: readonly JsonSchema[];
  readonly oneOf?: readonly JsonSchema[];
  readonly allOf?: readonly JsonSchema[];
  readonly properties?: Readonly<Record<string, JsonSchema>>;
  readonly required?: readonly string[];
  readonly items?: JsonSchema;
  readonly prefixItems?: readonly JsonSchema[];
  readonly format?: string;
  readonly minLength?: number;
  readonly maxLength?: number;
  readonly minItems?: number;
  readonly maxItems?: number;
  readonly minimum?: number;
  readonly maximum?: number;
  readonly exclusiveMinimum?: number;
  readonly exclusiveMaximum?: number;
}

const formats: Readonly<Record<string, Arbitrary<string>>> = {
  uuid: fc.uuid({ version: 7 }),
  email: fc.uuid().map((id) => `${id}@clinic.example`),
  date: fc
    .date({ min: new Date('1900-01-01'), max: new Date('2100-01-01'), noInvalidDate: true })
    .map((at) => at.toISOString().slice(0, 10)),
  'date-time': fc
    .date({ min: new Date('1900-01-01'), max: new Date('2100-01-01'), noInvalidDate: true })
    .map((at) => at.toISOString()),
};

function text({ format, minLength = 0, maxLength = 80 }: JsonSchema): Arbitrary<string> {
  const known = format ? formats[format] : undefined;
  if (known) return known;
  const limits = { minLength, maxLength: Math.max(minLength, Math.min(maxLength, 300)) };
  return fc.oneof(
    { weight: 3, arbitrary: fc.string({ ...limits, unit: 'grapheme' }) },
    { weight: 1, arbitrary: fc.string({ ...limits, unit: 'binary' }) },
    { weight: 1, arbitrary: fc.constantFrom('\u0000', '\ud800', "'; --", '%s%d%n', '09:30') },
  );
}

function number(schema: JsonSchema, whole: boolean): Arbitrary<number> {
  const step = whole ? 1 : 1e-6;
  const low = schema.minimum ?? (schema.exclusiveMinimum ?? -1e6) + step;
  const high = schema.maximum ?? (schema.exclusiveMaximum ?? 1e9) - step;
  const [min, max] = [Math.max(low, -1e12), Math.min(high, 1e12)];
  return whole
    ? fc.integer({
        min: Math.max(Math.ceil(min), -(2 ** 31)),
        max: Math.min(Math.floor(max), 2 ** 31 - 1),
      })
    : fc.double({ min, max, noNaN: true });
}

function object({ properties = {}, required = [] }: JsonSchema): Arbitrary<unknown> {
  const fields = Object.entries(properties).map(
    ([key, property]) => [key, valuesOf(property)] as const,
  );
  return fc.record(Object.fromEntries(fields), { requiredKeys: [...required] });
}

/** Values as a JSON schema describes them: most are valid, and near its edges. */
function valuesOf(schema: JsonSchema): Arbitrary<unknown> {
  const choices = schema.anyOf ?? schema.oneOf;
  if (choices) return fc.oneof(...choices.map(valuesOf));
  if (schema.allOf?.[0]) return valuesOf(schema.allOf[0]);
  if ('const' in schema) return fc.constant(schema.const);
  if (schema.enum) return fc.constantFrom(...schema.enum);
  switch (schema.type) {
    case 'string':
      return text(schema);
    case 'integer':
      return number(schema, true);
    case 'number':
      return number(schema, false);
    case 'boolean':
      return fc.boolean();
    case 'null':
      return fc.constant(null);
    case 'array': {
      if (schema.prefixItems) return fc.tuple(...schema.prefixItems.map(valuesOf));
      const { minItems = 0, maxItems = 4 } = schema;
      return fc.array(valuesOf(schema.items ?? {}), {
        minLength: minItems,
        maxLength: Math.max(minItems, Math.min(maxItems, 4)),
      });
    }
    case 'object':
      return object(schema);
    default:
      return fc.jsonValue();
  }
}

/** What a contract would take, as a caller might send it. */
export const valuesFor = (contract: z.ZodType): Arbitrary<unknown> =>
  valuesOf(z.toJSONSchema(contract, { io: 'input', unrepresentable: 'any' }) as JsonSchema);
