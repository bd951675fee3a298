/**
 * What the text of a fault note may hold. The node set is closed and lists nest to a fixed depth, so a note can be
 * drawn without ever trusting markup; nothing here is HTML.
 */
import * as z from 'zod/v4';
import type { Block, FaultBody, Inline } from '@/domain/faults/body';
import { SECTIONS } from '@/domain/faults/body';
import { isSafeLink } from '@/domain/faults/links';
import { wholePairs } from './common';

export const BODY_LIMITS = {
  bytes: 200_000,
  nodes: 500,
  text: 5_000,
  listDepth: 3,
} as const;

// No control characters, nothing that turns the direction of the text around.
const PLAIN = /^[^\u0000-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069]*$/;
const plain = (max: number, min = 0) =>
  z
    .string()
    .min(min, 'Empty: text is needed.')
    .max(max, `Longer than ${max} characters: shorten it.`)
    .regex(PLAIN, 'Has a control character: plain text is needed.')
    .refine(wholePairs, 'Has half of a character: whole ones are needed.');

const Href = z
  .string()
  .max(500, 'Longer than 500 characters: shorten it.')
  .refine(isSafeLink, 'Not a link that is taken: https, http, mailto or a path of this site.');

const Mark = z.discriminatedUnion('type', [
  z.strictObject({ type: z.literal('bold') }),
  z.strictObject({ type: z.literal('italic') }),
  z.strictObject({ type: z.literal('code') }),
  z.strictObject({ type: z.literal('link'), attrs: z.strictObject({ href: Href }) }),
]);

const marks = z
  .array(Mark)
  .max(4, 'More than 4 marks on one text.')
  .refine((all) => new Set(all.map((m) => m.type)).size === all.length, 'The same mark twice.');

const InlineNode: z.ZodType<Inline, Inline> = z.discriminatedUnion('type', [
  z.strictObject({
    type: z.literal('text'),
    text: plain(BODY_LIMITS.text, 1),
    marks: marks.optional(),
  }),
  z.strictObject({ type: z.literal('hardBreak') }),
  z.strictObject({
    type: z.literal('partRef'),
    attrs: z.strictObject({ ref: plain(20, 1) }),
  }),
]);

const words = z.array(InlineNode).max(BODY_LIMITS.nodes).optional();

const leaves = [
  z.strictObject({ type: z.literal('paragraph'), content: words }),
  z.strictObject({ type: z.literal('caution'), content: words }),
  z.strictObject({
    type: z.literal('reading'),
    attrs: z.strictObject({
      from: plain(40, 1),
      to: plain(40),
      position: plain(40),
      typed: plain(40, 1),
      expected: plain(40).nullable(),
    }),
  }),
  z.strictObject({
    type: z.literal('photo'),
    attrs: z.strictObject({
      id: z.string().regex(/^[A-Za-z0-9_-]{22}$/, 'Not the id of a photo.'),
      caption: plain(200),
    }),
  }),
] as const;

type BlockSchema = z.ZodType<Block, Block>;

/** Block schemas by list depth: the last may hold lists to the full depth, the first none. */
function blockSchemas(depth: number): BlockSchema[] {
  if (depth === 0) return [z.discriminatedUnion('type', leaves) as BlockSchema];
  const inner = blockSchemas(depth - 1);
  const item = z.strictObject({
    type: z.literal('listItem'),
    content: z
      .array(inner.at(-1) as BlockSchema)
      .min(1)
      .max(BODY_LIMITS.nodes)
      .refine(([first]) => first?.type === 'paragraph', 'A list entry begins with a paragraph.'),
  });
  const content = z.array(item).min(1, 'A list without entries.').max(BODY_LIMITS.nodes);
  const block = z.discriminatedUnion('type', [
    ...leaves,
    z.strictObject({ type: z.literal('bulletList'), content }),
    z.strictObject({ type: z.literal('orderedList'), content }),
  ]);
  return [...inner, block as BlockSchema];
}

const blocks = blockSchemas(BODY_LIMITS.listDepth);

/** Schemas that the API's description names once: written out wherever they occur they would fill it. */
export const NAMED_BLOCKS = blocks.map((schema, depth) => ({ id: `FaultBlock${depth}`, schema }));

const Blocks = z.array(blocks.at(-1) as BlockSchema).max(BODY_LIMITS.nodes);

function countNodes(nodes: readonly unknown[] | undefined): number {
  return (nodes ?? []).reduce<number>(
    (sum, node) => sum + 1 + countNodes((node as { content?: unknown[] }).content),
    0,
  );
}

const bytesOf = (value: unknown) => new TextEncoder().encode(JSON.stringify(value)).length;

export const FaultBodySchema: z.ZodType<FaultBody, FaultBody> = z
  .strictObject({ symptom: Blocks, cause: Blocks, proof: Blocks, repair: Blocks })
  .refine(
    (body) => SECTIONS.reduce((sum, s) => sum + countNodes(body[s]), 0) <= BODY_LIMITS.nodes,
    `More than ${BODY_LIMITS.nodes} paragraphs, readings and pieces of text: shorten the note.`,
  )
  .refine(
    (body) => bytesOf(body) <= BODY_LIMITS.bytes,
    `More than ${BODY_LIMITS.bytes} bytes: shorten the note.`,
  );
