import { getSchema, type JSONContent } from '@tiptap/core';
import { describe, expect, test } from 'vitest';
import { SECTIONS } from '@/domain/faults/body';
import { demoFaults } from '@/server/demo/faults';
import { toBlocks, toDocument } from '@/islands/fault-editor/document';
import { extensionsFor } from '@/islands/fault-editor/extensions';

const schema = getSchema(extensionsFor({ typing: () => undefined, key: () => false }));

describe('what the editor makes of a note', () => {
  test.each(demoFaults().map((n) => [n.key, n] as const))(
    '%s comes back unchanged',
    (_key, note) => {
      for (const section of SECTIONS) {
        const node = schema.nodeFromJSON(toDocument(note.body[section]));
        node.check();
        expect(toBlocks(node.toJSON() as JSONContent)).toEqual(note.body[section]);
      }
    },
  );

  test('what the editor adds for itself is left behind', () => {
    const link = {
      type: 'link',
      attrs: { href: '/boards/1', target: '_blank', rel: 'x', class: null },
    };
    const document = {
      type: 'doc',
      content: [
        { type: 'paragraph' },
        {
          type: 'paragraph',
          content: [{ type: 'text', text: 'x', marks: [link, { type: 'strike' }] }],
        },
        {
          type: 'orderedList',
          attrs: { start: 3, type: 'a' },
          content: [{ type: 'listItem', content: [{ type: 'paragraph' }] }],
        },
        { type: 'horizontalRule' },
        { type: 'reading', attrs: { from: 'V', to: '', position: '', typed: 'OL', expected: '' } },
        { type: 'paragraph' },
        { type: 'paragraph' },
      ],
    };
    expect(toBlocks(document)).toEqual([
      {
        type: 'paragraph',
        content: [
          { type: 'text', text: 'x', marks: [{ type: 'link', attrs: { href: '/boards/1' } }] },
        ],
      },
      { type: 'orderedList', content: [{ type: 'listItem', content: [{ type: 'paragraph' }] }] },
      { type: 'reading', attrs: { from: 'V', to: '', position: '', typed: 'OL', expected: null } },
    ]);
  });
});
