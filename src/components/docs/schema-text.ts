/** JSON Schema written as a person would note it down: one member a line, its kind and limits behind it. */

export type Schema = Readonly<Record<string, unknown>>;

const UNSAFE = Number.MAX_SAFE_INTEGER;
const isSchema = (value: unknown): value is Schema => typeof value === 'object' && value !== null;
const schemas = (value: unknown): Schema[] => (Array.isArray(value) ? value.filter(isSchema) : []);

function range(low: unknown, high: unknown, noun: string): string {
  const from = typeof low === 'number' && low > -UNSAFE ? low : undefined;
  const to = typeof high === 'number' && high < UNSAFE ? high : undefined;
  const tail = noun && ` ${noun}`;
  if (from !== undefined && to !== undefined)
    return from === to ? `exactly ${from}${tail}` : `${from} to ${to}${tail}`;
  if (to !== undefined) return `up to ${to}${tail}`;
  return from ? `at least ${from}${tail}` : '';
}

const FORMATS: Readonly<Record<string, string>> = {
  'date-time': 'moment, RFC 3339 in UTC',
  date: 'day, year-month-day',
  email: 'e-mail address',
  uuid: 'UUID',
};

function textKind(schema: Schema): string {
  const { format, pattern } = schema;
  if (typeof format === 'string') return FORMATS[format] ?? format;
  const length = range(schema['minLength'], schema['maxLength'], 'characters');
  // Patterns that only keep control characters out say nothing to a reader.
  const shape =
    typeof pattern === 'string' && !pattern.includes('u0000') ? `like /${pattern}/` : '';
  return ['text', length, shape].filter(Boolean).join(', ');
}

function numberKind(schema: Schema): string {
  const whole = schema['type'] === 'integer' ? 'whole number' : 'number';
  const { exclusiveMinimum: above, exclusiveMaximum: below } = schema;
  const limits = [
    typeof above === 'number' ? `above ${above}` : '',
    range(schema['minimum'], schema['maximum'], ''),
    typeof below === 'number' ? `below ${below}` : '',
  ];
  return [whole, ...limits.filter(Boolean)].join(', ');
}

/** Alternatives worth telling: not the empty text a form sends, not the impossible. */
const telling = (schema: Schema) => schema['const'] !== '' && !('not' in schema);

function kindOf(schema: Schema, indent: string): string {
  const { type, $ref: ref } = schema;
  if (typeof ref === 'string') return ref.split('/').at(-1) ?? ref;
  if ('const' in schema) return JSON.stringify(schema['const']);
  if (Array.isArray(schema['enum']))
    return schema['enum'].map((v) => JSON.stringify(v)).join(' | ');
  const several = schemas(schema['anyOf'] ?? schema['oneOf']).filter(telling);
  if (several.length > 0) return several.map((one) => kindOf(one, indent)).join(' | ');
  if (type === 'object') return objectText(schema, indent);
  if (type === 'array') return arrayText(schema, indent);
  if (type === 'string') return textKind(schema);
  if (type === 'number' || type === 'integer') return numberKind(schema);
  if (type === 'boolean') return 'true | false';
  if (type === 'null') return 'null';
  return 'anything';
}

function arrayText(schema: Schema, indent: string): string {
  const fixed = schemas(schema['prefixItems']);
  if (fixed.length > 0) return `[${fixed.map((item) => kindOf(item, indent)).join(', ')}]`;
  const count = range(schema['minItems'], schema['maxItems'], '');
  const items = isSchema(schema['items']) ? kindOf(schema['items'], indent) : 'anything';
  return `list${count && ` of ${count}`}: ${items}`;
}

function objectText(schema: Schema, indent: string): string {
  const deeper = `${indent}  `;
  const required = Array.isArray(schema['required']) ? (schema['required'] as unknown[]) : [];
  const members = Object.entries((schema['properties'] ?? {}) as Record<string, Schema>);
  const lines = members.map(([name, member]) =>
    memberText(name, member, !required.includes(name), deeper),
  );
  const others = schema['additionalProperties'];
  if (isSchema(others)) lines.push(`${deeper}(any name): ${kindOf(others, deeper)}`);
  if (lines.length === 0) return '{}';
  // What is short stays on one line, unless a member has members of its own.
  const short = `{ ${lines.map((line) => line.trim()).join(', ')} }`;
  if (short.length <= 64 && !short.includes('\n')) return short;
  return `{\n${lines.join('\n')}\n${indent}}`;
}

function memberText(name: string, schema: Schema, optional: boolean, indent: string): string {
  const fallback = schema['default'];
  const otherwise = fallback === undefined ? '' : `  (unless given: ${JSON.stringify(fallback)})`;
  const mark = optional || fallback !== undefined ? '?' : '';
  return `${indent}${name}${mark}: ${kindOf(schema, indent)}${otherwise}`;
}

/** The whole schema, over several lines where it has members. A `?` marks what may be left out. */
export const schemaText = (schema: unknown): string =>
  isSchema(schema) ? kindOf(schema, '') : 'anything';
