/** One endpoint, described once: the server validates by it, OpenAPI and the access tests are made from it. */
import type * as z from 'zod/v4';
import type { Permission } from '@/domain/people';

export type Who = Permission | 'public' | 'customer';
export type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';

export type Route = {
  method: Method;
  /** With `{name}` for each path parameter. */
  path: string;
  summary: string;
  who: Who;
  params?: z.ZodType;
  /** Names in the address; others are refused. */
  query?: z.ZodObject;
  body?: z.ZodType;
  /** The answer's JSON; null when there is none (204) or it is not JSON (then `media` says what). */
  answer: z.ZodType | null;
  status: 200 | 201 | 202 | 204;
  media?: string;
  /** The edit must carry `If-Match` with the version it was made from. */
  versioned?: true;
  /** An `Idempotency-Key` makes a repeat harmless. */
  repeatable?: true;
  /** The list is offered as CSV too: by `Accept: text/csv` or `?format=csv`, all pages at once. */
  csv?: true;
  /** Bytes of body accepted; 256 kB unless told. */
  bodyLimit?: number;
};

export const defineRoute = <const R extends Route>(route: R): R => route;

type Parsed<S> = S extends z.ZodType ? z.output<S> : undefined;
export type ParamsOf<R extends Route> = Parsed<R['params']>;
export type QueryOf<R extends Route> = Parsed<R['query']>;
export type BodyOf<R extends Route> = Parsed<R['body']>;
export type AnswerOf<R extends Route> = R['answer'] extends z.ZodType ? z.input<R['answer']> : null;
