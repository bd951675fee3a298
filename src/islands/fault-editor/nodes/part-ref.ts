import { Node } from '@tiptap/core';

/** A part reference as a chip. It is one thing: the caret steps over it, Backspace takes it whole. */
export const PartRef = Node.create({
  name: 'partRef',
  group: 'inline',
  inline: true,
  atom: true,
  selectable: true,
  addAttributes: () => ({
    ref: {
      default: '',
      parseHTML: (element: HTMLElement) => element.getAttribute('data-part') ?? '',
      renderHTML: ({ ref }: { ref: string }) => ({ 'data-part': ref }),
    },
  }),
  parseHTML: () => [{ tag: 'span[data-part]' }],
  renderHTML: ({ node, HTMLAttributes }) => [
    'span',
    { ...HTMLAttributes, class: 'part-chip' },
    String(node.attrs['ref']),
  ],
  renderText: ({ node }) => String(node.attrs['ref']),
});
