import { Node } from '@tiptap/core';
import { NodeViewWrapper, ReactNodeViewRenderer, type NodeViewProps } from '@tiptap/react';
import { wordAttributes } from './words';

const PHOTO_ID = /^[A-Za-z0-9_-]{22}$/;

function PhotoView({ node, selected, deleteNode, updateAttributes }: NodeViewProps) {
  const { id, caption } = node.attrs as { id: string; caption: string };
  return (
    <NodeViewWrapper className={`note-photo editor-block${selected ? ' editor-block-chosen' : ''}`}>
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
  // What is pasted may say anything: only an id that can be one is taken.
  parseHTML: () => [
    {
      tag: 'div[data-photo]',
      getAttrs: (element) => (PHOTO_ID.test(element.getAttribute('data-id') ?? '') ? null : false),
    },
  ],
  renderHTML: ({ HTMLAttributes }) => ['div', { ...HTMLAttributes, 'data-photo': '' }],
  renderText: ({ node }) => String(node.attrs['caption']),
  addNodeView: () => ReactNodeViewRenderer(PhotoView),
});
