/** What the page tells of one call. */
export interface Operation {
  readonly id: string;
  readonly method: string;
  readonly path: string;
  readonly summary: string;
  readonly who: string;
  /** Whether a write must send the CSRF token. */
  readonly needsToken: boolean;
  readonly parts: readonly Part[];
}

/** The fields of one place of a call: its address, query, headers, body, or an answer. */
interface Part {
  readonly heading: string;
  readonly fields: readonly Field[];
}

export interface Field {
  /** Its place, as in `inputs.thresholds[].heartRate`; '' where the part is one value. */
  readonly name: string;
  readonly type: string;
  readonly required: boolean;
  readonly bounds: string;
}

export interface Reference {
  readonly title: string;
  readonly version: string;
  readonly areas: readonly { readonly name: string; readonly operations: readonly Operation[] }[];
}

type Json = Readonly<Record<string, unknown>>;

const object = (value: unknown): Json =>
  typeof value === 'object' && value !== null && !Array.isArray(value) ? (value as Json) : {};
const list = (value: unknown): readonly unknown[] => (Array.isArray(value) ? value : []);
const words = (value: unknown): string => (typeof value === 'string' ? value : '');

const kinds = (schema: Json): readonly Json[] =>
  list(schema['anyOf'] ?? schema['oneOf']).map(object);

/** In words: `text (date)`, `one of: nurse, physician`, `list of number`, `text or null`. */
export function typeOf(schema: Json): string {
  const choices = kinds(schema);
  if (choices.length > 0) return [...new Set(choices.map(typeOf))].join(' or ');
  if ('const' in schema) return JSON.stringify(schema['const']);
  if (Array.isArray(schema['enum'])) return `one of: ${schema['enum'].join(', ')}`;
  const type = schema['type'];
  if (Array.isArray(type)) return type.join(' or ');
  if (type === 'array') return `list of ${typeOf(object(schema['items']))}`;
  const format = words(schema['format']);
  return `${words(type) || 'any'}${format && ` (${format})`}`;
}

const limits: readonly (readonly [string, string])[] = [
  ['minimum', 'from'],
  ['exclusiveMinimum', 'above'],
  ['maximum', 'to'],
  ['exclusiveMaximum', 'below'],
  ['minLength', 'at least characters:'],
  ['maxLength', 'at most characters:'],
  ['minItems', 'at least items:'],
  ['maxItems', 'at most items:'],
  ['default', 'default'],
];

/** JSON's own whole numbers are told as bounds by the generator; nobody is helped by them. */
const says = (value: unknown): boolean =>
  value !== undefined && Math.abs(Number(value)) !== Number.MAX_SAFE_INTEGER;

function boundsOf(schema: Json): string {
  const own = limits
    .filter(([key]) => says(schema[key]))
    .map(([key, word]) => `${word} ${JSON.stringify(schema[key])}`);
  return [...own, ...kinds(schema).map(boundsOf)].filter((text) => text !== '').join(', ');
}

/** What stands below: the properties of an object, of each kind, and of the items of a list. */
function below(schema: Json, name: string): Field[] {
  const { properties, items } = schema;
  const required = list(schema['required']);
  const own = Object.entries(object(properties)).flatMap(([key, property]) =>
    fieldsOf(object(property), name === '' ? key : `${name}.${key}`, required.includes(key)),
  );
  const ofItems = items === undefined ? [] : below(object(items), `${name}[]`);
  return [...own, ...ofItems, ...kinds(schema).flatMap((kind) => below(kind, name))];
}

/** A schema as rows, each with its place. */
export function fieldsOf(schema: Json, name = '', required = true): Field[] {
  const inner = below(schema, name);
  if (name === '' && inner.length > 0) return inner;
  return [{ name, type: typeOf(schema), required, bounds: boundsOf(schema) }, ...inner];
}

const places: readonly (readonly [string, string])[] = [
  ['path', 'In the address'],
  ['query', 'In the query'],
  ['header', 'Headers'],
];

function contentFields(holder: Json): Field[] | null {
  const [[kind, content] = []] = Object.entries(object(holder['content']));
  if (kind === undefined) return null;
  if (kind === 'application/json') return fieldsOf(object(object(content)['schema']));
  return [{ name: '', type: kind, required: true, bounds: '' }];
}

function partsOf(operation: Json): Part[] {
  const parameters = list(operation['parameters']).map(object);
  const sent = places.map(([place, heading]) => ({
    heading,
    fields: parameters
      .filter((one) => one['in'] === place)
      .flatMap((one) =>
        fieldsOf(object(one['schema']), words(one['name']), one['required'] === true),
      ),
  }));
  const body = { heading: 'Body', fields: contentFields(object(operation['requestBody'])) ?? [] };
  const answers = Object.entries(object(operation['responses']))
    .filter(([status]) => status !== 'default')
    .map(([status, answer]) => ({
      heading: `Answer ${status}`,
      fields: contentFields(object(answer)) ?? [
        { name: '', type: 'nothing', required: false, bounds: '' },
      ],
    }));
  return [...sent, body, ...answers].filter(({ fields }) => fields.length > 0);
}

function operationOf(path: string, method: string, operation: Json): Operation {
  return {
    id: words(operation['operationId']),
    method: method.toUpperCase(),
    path,
    summary: words(operation['summary']),
    who: words(operation['description']),
    needsToken: list(operation['security']).some((one) => 'csrf' in object(one)),
    parts: partsOf(operation),
  };
}

/** An OpenAPI document as the page tells it, by the areas that its tags name. */
export function readOpenApi(document: unknown): Reference {
  const { info, paths } = object(document);
  const areas = new Map<string, Operation[]>();
  for (const [path, methods] of Object.entries(object(paths))) {
    for (const [method, given] of Object.entries(object(methods))) {
      const operation = object(given);
      const name = words(list(operation['tags'])[0]) || 'other';
      areas.set(name, [...(areas.get(name) ?? []), operationOf(path, method, operation)]);
    }
  }
  return {
    title: words(object(info)['title']),
    version: words(object(info)['version']),
    areas: [...areas]
      .map(([name, operations]) => ({ name, operations }))
      .sort((one, other) => one.name.localeCompare(other.name)),
  };
}

/** The calls whose method, address or summary holds every word. */
export function filtered({ areas }: Reference, query: string): Reference['areas'] {
  const wanted = query.toLowerCase().split(/\s+/);
  const fits = ({ method, path, summary }: Operation): boolean => {
    const text = `${method} ${path} ${summary}`.toLowerCase();
    return wanted.every((word) => text.includes(word));
  };
  return areas
    .map(({ name, operations }) => ({ name, operations: operations.filter(fits) }))
    .filter(({ operations }) => operations.length > 0);
}
