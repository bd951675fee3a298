import { Node } from '@tiptap/core';
import { NodeViewWrapper, ReactNodeViewRenderer, type NodeViewProps } from '@tiptap/react';
import { wordAttributes } from './words';

function PhotoView({ node, selected, deleteNode, updateAttributes }: NodeViewProps) {
  const { id, caption } = node.attrs as { id: string; caption: string };
  return (
    <NodeViewWrapper
      as="figure"
      className={`note-photo editor-block${selected ? ' editor-block-chosen' : ''}`}
    >
      <img
        src={`/api/photos/${id}/page`}
        alt={caption || 'Photo without a caption'}
        data-drag-handle
      />
      <input
        className="field-input"
        aria-label="Caption of the photo"
        placeholder="What the photo shows"
        maxLength={200}
        value={caption}
        onChange={(event) => updateAttributes({ caption: event.target.value })}
      />
      <button
        type="button"
        className="editor-remove"
        aria-label={`Take out the photo ${caption}`}
        onClick={deleteNode}
      >
        ×
      </button>
    </NodeViewWrapper>
  );
}

/** A photo of the ticket, by its public id. */
export const Photo = Node.create({
  name: 'photo',
  group: 'block',
  atom: true,
  draggable: true,
  addAttributes: () => wordAttributes(['id', 'caption']),
  parseHTML: () => [{ tag: 'div[data-photo]' }],
  renderHTML: ({ HTMLAttributes }) => ['div', { ...HTMLAttributes, 'data-photo': '' }],
  renderText: ({ node }) => String(node.attrs['caption']),
  addNodeView: () => ReactNodeViewRenderer(PhotoView),
});
