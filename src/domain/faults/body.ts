/**
 * What a fault note says: four sections of structured text. The shape is our own and closed, so that stored
 * notes stay readable whatever editor wrote them; contracts/faults.ts holds its schema with limits.
 */

export const SECTIONS = ['symptom', 'cause', 'proof', 'repair'] as const;
export type Section = (typeof SECTIONS)[number];

export type Mark =
  | { type: 'bold' }
  | { type: 'italic' }
  | { type: 'code' }
  | { type: 'link'; attrs: { href: string } };

export type Inline =
  | { type: 'text'; text: string; marks?: Mark[] }
  | { type: 'hardBreak' }
  /** A part reference as a chip. */
  | { type: 'partRef'; attrs: { ref: string } };

export type Block =
  | { type: 'paragraph'; content?: Inline[] }
  | { type: 'bulletList' | 'orderedList'; content: { type: 'listItem'; content: Block[] }[] }
  /** A reading copied from a ticket's bench sheet: what was measured, not a link to it. */
  | {
      type: 'reading';
      attrs: { from: string; to: string; position: string; typed: string; expected: string | null };
    }
  /** A photo of the ticket or board, by its public id. */
  | { type: 'photo'; attrs: { id: string; caption: string } }
  | { type: 'caution'; content?: Inline[] };

export type FaultBody = Record<Section, Block[]>;

export const emptyBody = (): FaultBody => ({ symptom: [], cause: [], proof: [], repair: [] });

function inlineWords(content: Inline[] | undefined): string {
  return (content ?? [])
    .map((n) => (n.type === 'text' ? n.text : n.type === 'partRef' ? n.attrs.ref : ' '))
    .join('');
}

function blockWords(block: Block): string {
  switch (block.type) {
    case 'paragraph':
    case 'caution':
      return inlineWords(block.content);
    case 'bulletList':
    case 'orderedList':
      return block.content.map((item) => item.content.map(blockWords).join(' ')).join(' ');
    case 'reading': {
      const { from, to, position, typed } = block.attrs;
      return `${to === '' ? from : `${from} – ${to}`} ${typed}${position === '' ? '' : ` (${position})`};`;
    }
    case 'photo':
      return block.attrs.caption;
  }
}

/** The plain words of a section, for the index and for previews. */
export function sectionWords(blocks: readonly Block[]): string {
  return blocks.map(blockWords).join(' ').replace(/\s+/g, ' ').trim();
}

/** A section as plain lines, a line for every paragraph, list entry, reading and photo: for comparing revisions. */
export function sectionLines(blocks: readonly Block[], indent = ''): string {
  return blocks
    .map((block) => {
      switch (block.type) {
        case 'paragraph':
          return `${indent}${inlineWords(block.content)}`;
        case 'caution':
          return `${indent}Caution: ${inlineWords(block.content)}`;
        case 'bulletList':
        case 'orderedList':
          return block.content
            .map((item, i) => {
              const mark = block.type === 'bulletList' ? '•' : `${i + 1}.`;
              return `${indent}${mark} ${sectionLines(item.content, `${indent}  `).trimStart()}`;
            })
            .join('\n');
        case 'reading': {
          const { from, to, position, typed, expected } = block.attrs;
          const between = to === '' ? from : `${from} – ${to}`;
          const wanted = expected === null ? '' : ` (expected ${expected})`;
          return `${indent}${[between, position, typed].filter(Boolean).join(' · ')}${wanted}`;
        }
        case 'photo':
          return `${indent}[photo ${block.attrs.id}] ${block.attrs.caption}`.trimEnd();
      }
    })
    .join('\n');
}

/** Every node of a section, whatever its depth. */
function* nodesOf(blocks: readonly Block[]): Generator<Block | Inline> {
  for (const block of blocks) {
    yield block;
    if (block.type === 'bulletList' || block.type === 'orderedList')
      for (const item of block.content) yield* nodesOf(item.content);
    else if (block.type === 'paragraph' || block.type === 'caution') yield* block.content ?? [];
  }
}

/** The part references named by chips, each once, in order of appearance. */
export function partRefs(body: FaultBody): string[] {
  const refs = new Set<string>();
  for (const section of SECTIONS)
    for (const node of nodesOf(body[section]))
      if (node.type === 'partRef') refs.add(node.attrs.ref);
  return [...refs];
}

/** The photos shown, by public id, each with where it stands: `proof`. */
export function photosIn(body: FaultBody): { id: string; section: Section }[] {
  return SECTIONS.flatMap((section) =>
    [...nodesOf(body[section])].flatMap((node) =>
      node.type === 'photo' ? [{ id: node.attrs.id, section }] : [],
    ),
  );
}
