/** The OpenAPI document as the page about it needs it: by area, in the order the areas are described. */
import type { Schema } from './schema-text';

export type Parameter = {
  name: string;
  in: string;
  required?: boolean;
  description?: string;
  schema: Schema;
};
type Content = Readonly<Record<string, { schema: Schema }>>;
export type Operation = {
  /** For links to it: `post-api-session`. */
  id: string;
  method: string;
  path: string;
  summary: string;
  description: string;
  parameters: readonly Parameter[];
  body: Schema | null;
  status: string;
  answers: Content;
};
type Described = {
  summary: string;
  description: string;
  parameters?: Parameter[];
  requestBody?: { content: Content };
  responses: Record<string, { content?: Content }>;
};

/** The operations by area: the word after `/api/`. */
export function operationsByArea(document: {
  paths?: unknown;
}): { area: string; operations: Operation[] }[] {
  const areas = new Map<string, Operation[]>();
  const paths = (document.paths ?? {}) as Record<string, Record<string, Described>>;
  for (const [path, methods] of Object.entries(paths))
    for (const [method, described] of Object.entries(methods)) {
      const area = path.split('/')[2]?.split('.')[0] ?? '';
      const [status = '', answer] =
        Object.entries(described.responses).find(([key]) => key !== 'default') ?? [];
      const list = areas.get(area) ?? [];
      list.push({
        id: `${method}${path.replace(/[^a-z]+/gi, '-')}`.toLowerCase().replace(/-$/, ''),
        method: method.toUpperCase(),
        path,
        summary: described.summary,
        description: described.description,
        parameters: described.parameters ?? [],
        body: Object.values(described.requestBody?.content ?? {})[0]?.schema ?? null,
        status,
        answers: answer?.content ?? {},
      });
      areas.set(area, list);
    }
  return [...areas].map(([area, operations]) => ({ area, operations }));
}
