/** What can be written in a section: the closed set of domain/faults/body.ts and nothing else. */
import StarterKit from '@tiptap/starter-kit';
import { isSafeLink } from '@/domain/faults/links';
import { Caution } from './nodes/caution';
import { PartRef } from './nodes/part-ref';
import { Photo } from './nodes/photo';
import { Reading } from './nodes/reading';
import { PartTyping, type PartListener } from './part-typing';

export const extensionsFor = (listener: PartListener) => [
  StarterKit.configure({
    heading: false,
    blockquote: false,
    codeBlock: false,
    horizontalRule: false,
    strike: false,
    underline: false,
    dropcursor: { color: false, class: 'editor-drop' },
    link: {
      openOnClick: false,
      autolink: false,
      linkOnPaste: false,
      isAllowedUri: (href) => isSafeLink(href),
      HTMLAttributes: { rel: 'noopener noreferrer nofollow', target: null },
    },
  }),
  PartRef,
  Reading,
  Photo,
  Caution,
  PartTyping.configure({ listener }),
];
