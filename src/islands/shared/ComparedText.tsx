import type { Change } from '@/domain/faults/compare';

/** One text as a change of another: what went is struck, what came is ruled under. */
export function ComparedText({ changes }: { changes: readonly Change[] }) {
  return (
    <p className="note-body compared">
      {changes.map(({ kind, text }, i) =>
        kind === 'gone' ? (
          <del key={i}>{text}</del>
        ) : kind === 'new' ? (
          <ins key={i}>{text}</ins>
        ) : (
          text
        ),
      )}
    </p>
  );
}
