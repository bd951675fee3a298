import { Node } from '@tiptap/core';
import { NodeViewWrapper, ReactNodeViewRenderer, type NodeViewProps } from '@tiptap/react';
import { NoteReading, type ReadingWords } from '../../shared/NoteReading';
import { wordAttributes } from './words';

function ReadingView({ node, selected, deleteNode }: NodeViewProps) {
  const { from, to, position, typed, expected } = node.attrs as ReadingWords;
  return (
    <NodeViewWrapper
      className={`editor-block${selected ? ' editor-block-chosen' : ''}`}
      data-drag-handle
    >
      <NoteReading
        from={from}
        to={to}
        position={position}
        typed={typed}
        expected={expected === '' ? null : expected}
      />
      <button
        type="button"
        className="editor-remove"
        aria-label={`Take out the reading ${from} ${to}`}
        onClick={deleteNode}
      >
        ×
      </button>
    </NodeViewWrapper>
  );
}

/** A reading copied from a bench sheet. */
export const Reading = Node.create({
  name: 'reading',
  group: 'block',
  atom: true,
  draggable: true,
  addAttributes: () => wordAttributes(['from', 'to', 'position', 'typed', 'expected']),
  parseHTML: () => [{ tag: 'div[data-reading]' }],
  renderHTML: ({ HTMLAttributes }) => ['div', { ...HTMLAttributes, 'data-reading': '' }],
  renderText: ({ node }) =>
    [node.attrs['from'], node.attrs['to'], node.attrs['position'], node.attrs['typed']]
      .filter(Boolean)
      .join(' '),
  addNodeView: () => ReactNodeViewRenderer(ReadingView),
});
