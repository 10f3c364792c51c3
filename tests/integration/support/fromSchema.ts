import fc, { type Arbitrary } from 'fast-check';

/** As much of a JSON schema as the interface's description uses. */
export interface Schema {
  $ref?: string;
  type?: string | string[];
  enum?: unknown[];
  const?: unknown;
  format?: string;
  pattern?: string;
  minimum?: number;
  maximum?: number;
  exclusiveMinimum?: number;
  exclusiveMaximum?: number;
  minLength?: number;
  maxLength?: number;
  minItems?: number;
  maxItems?: number;
  items?: Schema;
  properties?: Record<string, Schema>;
  required?: string[];
  anyOf?: Schema[];
  oneOf?: Schema[];
  allOf?: Schema[];
}

export type Components = Record<string, Schema>;

const INSTANTS = [
  '2026-02-10T12:00:00Z',
  '2026-02-10T13:00:00Z',
  '2026-02-11T00:00:00+01:00',
  '2026-02-10',
  '2026-02-12',
  '2026-02',
  '1969-12-31T23:59:59Z',
  '9999-12-31T23:59:59Z',
];

/** Means something to a parser, a database, a spreadsheet, a page or a mail header. */
export const HOSTILE = [
  '',
  '\u0000',
  "' OR 1=1 -- ",
  '"><script>alert(1)</script>',
  '=HYPERLINK("http://b.example")',
  'a@b.example\r\nBcc: c@d.example',
  '../../etc/passwd',
  '%00%ff..%2f',
  '__proto__',
  '\u202Egnp.exe',
  '\uD800',
  '😀'.repeat(40),
  '1e999',
  '-0',
  'NaN',
  '9'.repeat(40),
  ' '.repeat(300),
];

const junk: Arbitrary<unknown> = fc.oneof(
  fc.constantFrom<unknown>(null, true, -1, 0.5, 1e308, [], {}, [null], { __proto__: null, constructor: {} }),
  fc.constantFrom<unknown>(...HOSTILE),
  fc.jsonValue({ maxDepth: 3 }),
);

/** Values that a schema lets pass, or nearly: what it says only in words is not known here. */
export function valid(schema: Schema | undefined, components: Components, depth = 0): Arbitrary<unknown> {
  if (!schema || depth > 6) return fc.constant(null);
  const of = (inner: Schema | undefined) => valid(inner, components, depth + 1);
  if (schema.$ref) return of(components[schema.$ref.split('/').at(-1) ?? '']);
  if (schema.const !== undefined) return fc.constant(schema.const);
  if (schema.enum) return fc.constantFrom(...schema.enum);
  const choices = schema.anyOf ?? schema.oneOf;
  if (choices) return fc.oneof(...choices.map(of));
  if (schema.allOf) {
    return fc.tuple(...schema.allOf.map(of)).map((parts) => Object.assign({}, ...parts) as unknown);
  }
  const types = [schema.type ?? 'object'].flat();
  return fc.oneof(...types.map((type) => ofType(type, schema, of)));
}

function ofType(type: string, schema: Schema, of: (inner: Schema | undefined) => Arbitrary<unknown>) {
  switch (type) {
    case 'null':
      return fc.constant(null);
    case 'boolean':
      return fc.boolean();
    case 'integer':
      return fc.integer({ min: lowest(schema), max: highest(schema) });
    case 'number':
      return fc.double({ min: lowest(schema), max: highest(schema), noNaN: true });
    case 'string':
      return text(schema);
    case 'array':
      return fc.array(of(schema.items), {
        minLength: schema.minItems ?? 0,
        maxLength: Math.min(schema.maxItems ?? 3, (schema.minItems ?? 0) + 3),
      });
    default: {
      const properties = Object.entries(schema.properties ?? {}).map(([name, inner]) => [name, of(inner)]);
      return fc.record(Object.fromEntries(properties) as Record<string, Arbitrary<unknown>>, {
        requiredKeys: schema.required ?? [],
      });
    }
  }
}

const lowest = ({ minimum, exclusiveMinimum }: Schema) => Math.ceil(minimum ?? exclusiveMinimum ?? -5);
const highest = (schema: Schema) =>
  Math.max(lowest(schema), Math.floor(schema.maximum ?? schema.exclusiveMaximum ?? lowest(schema) + 2_000));

function text({ format, pattern, minLength = 0, maxLength = 200 }: Schema): Arbitrary<unknown> {
  if (format === 'email') return fc.constantFrom('a@people.example', "o'b+c@people.example");
  if (format === 'uuid') return fc.uuid();
  if (format === 'uri') return fc.constantFrom('https://alerts.quay.example/noise', 'http://127.0.0.1/');
  const words = fc.oneof(
    fc.constantFrom(...INSTANTS, 'FZ-1', 'a word', '1'),
    fc.string({ minLength, maxLength: Math.min(maxLength, minLength + 12) }),
  );
  return pattern === undefined ? words : fc.oneof(fc.stringMatching(new RegExp(pattern)), words);
}

/** What somebody may send: right, with one member wrong, or nothing like it. */
export function sent(schema: Schema | undefined, components: Components): Arbitrary<unknown> {
  const right = valid(schema, components);
  const broken = fc.tuple(right, fc.nat(), junk).map(([value, at, wrong]) => {
    if (typeof value !== 'object' || value === null) return wrong;
    const names = Object.keys(value);
    const name = names[at % Math.max(1, names.length)];
    return name === undefined ? wrong : { ...value, [name]: wrong };
  });
  return fc.oneof(
    { weight: 5, arbitrary: right },
    { weight: 3, arbitrary: broken },
    { weight: 1, arbitrary: junk },
  );
}
