/** The text of a fault note. Every node is drawn by name from checked data; nothing in it is ever taken as markup. */
import type { Block, Inline } from '@/domain/faults/body';
import { NoteReading } from './NoteReading';

function Words({ content }: { content: readonly Inline[] | undefined }) {
  return (content ?? []).map((node, i) => {
    if (node.type === 'hardBreak') return <br key={i} />;
    if (node.type === 'partRef')
      return (
        <span key={i} className="part-chip">
          {node.attrs.ref}
        </span>
      );
    return <MarkedText key={i} node={node} />;
  });
}

function MarkedText({ node }: { node: Extract<Inline, { type: 'text' }> }) {
  return (node.marks ?? []).reduceRight<React.ReactNode>((inner, mark) => {
    switch (mark.type) {
      case 'bold':
        return <strong>{inner}</strong>;
      case 'italic':
        return <em>{inner}</em>;
      case 'code':
        return <code>{inner}</code>;
      case 'link':
        return (
          <a href={mark.attrs.href} rel="noopener noreferrer nofollow">
            {inner}
          </a>
        );
    }
  }, node.text);
}

function NotePhoto({ id, caption }: { id: string; caption: string }) {
  return (
    <figure className="note-photo">
      <a href={`/api/photos/${id}/full`}>
        <img
          src={`/api/photos/${id}/page`}
          alt={caption || 'Photo of the board, without a caption'}
          loading="lazy"
          decoding="async"
        />
      </a>
      {caption && <figcaption>{caption}</figcaption>}
    </figure>
  );
}

function NoteBlock({ block }: { block: Block }) {
  switch (block.type) {
    case 'paragraph':
      return (
        <p>
          <Words content={block.content} />
        </p>
      );
    case 'bulletList':
    case 'orderedList': {
      const List = block.type === 'bulletList' ? 'ul' : 'ol';
      return (
        <List>
          {block.content.map((item, i) => (
            <li key={i}>
              <NoteBlocks blocks={item.content} />
            </li>
          ))}
        </List>
      );
    }
    case 'reading':
      return <NoteReading {...block.attrs} />;
    case 'photo':
      return <NotePhoto {...block.attrs} />;
    case 'caution':
      return (
        <div className="bar bar-caution note-caution" role="note">
          <strong>Caution</strong>
          <p>
            <Words content={block.content} />
          </p>
        </div>
      );
  }
}

/** A section of a note. */
export function NoteBlocks({ blocks }: { blocks: readonly Block[] }) {
  return blocks.map((block, i) => <NoteBlock key={i} block={block} />);
}
