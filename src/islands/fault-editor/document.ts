/** Between the note's own blocks and the editor's document. What the editor adds (targets, starts) is left behind. */
import type { JSONContent } from '@tiptap/core';
import type { Block, Inline, Mark } from '@/domain/faults/body';

type Attrs = Record<string, unknown>;
const words = (attrs: Attrs | undefined, name: string): string => {
  const value = attrs?.[name];
  return typeof value === 'string' ? value : '';
};

function toMark({ type, attrs }: { type: string; attrs?: Attrs }): Mark[] {
  if (type === 'bold' || type === 'italic' || type === 'code') return [{ type }];
  if (type === 'link') return [{ type, attrs: { href: words(attrs, 'href') } }];
  return [];
}

function toInline(node: JSONContent): Inline[] {
  if (node.type === 'text' && node.text) {
    const marks = (node.marks ?? []).flatMap((m) => toMark(m as { type: string; attrs?: Attrs }));
    return [{ type: 'text', text: node.text, ...(marks.length > 0 ? { marks } : {}) }];
  }
  if (node.type === 'hardBreak') return [{ type: 'hardBreak' }];
  if (node.type === 'partRef')
    return [{ type: 'partRef', attrs: { ref: words(node.attrs, 'ref') } }];
  return [];
}

function toBlock(node: JSONContent): Block[] {
  const { type, attrs, content = [] } = node;
  switch (type) {
    case 'paragraph':
    case 'caution': {
      const inline = content.flatMap(toInline);
      return [inline.length > 0 ? { type, content: inline } : { type }];
    }
    case 'bulletList':
    case 'orderedList':
      return [
        {
          type,
          content: content.map((item) => ({
            type: 'listItem' as const,
            content: (item.content ?? []).flatMap(toBlock),
          })),
        },
      ];
    case 'reading': {
      const expected = words(attrs, 'expected');
      return [
        {
          type,
          attrs: {
            from: words(attrs, 'from'),
            to: words(attrs, 'to'),
            position: words(attrs, 'position'),
            typed: words(attrs, 'typed'),
            expected: expected === '' ? null : expected,
          },
        },
      ];
    }
    case 'photo':
      return [{ type, attrs: { id: words(attrs, 'id'), caption: words(attrs, 'caption') } }];
    default:
      return [];
  }
}

const isEmpty = (block: Block | undefined) => block?.type === 'paragraph' && !block.content?.length;

/** The document's blocks; empty lines before and after them are the editor's, for the caret, and not part of the note. */
export function toBlocks(document: JSONContent): Block[] {
  const blocks = (document.content ?? []).flatMap(toBlock);
  while (isEmpty(blocks.at(-1))) blocks.pop();
  while (isEmpty(blocks[0])) blocks.shift();
  return blocks;
}

/** The document of a section; the editor always wants a paragraph to stand in. */
export const toDocument = (blocks: readonly Block[]): JSONContent => ({
  type: 'doc',
  content: blocks.length > 0 ? (blocks as JSONContent[]) : [{ type: 'paragraph' }],
});
