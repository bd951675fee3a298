import type { BoardPart } from './types';

export const PART_MENU_ID = 'part-menu';
export const partOptionId = (ref: string) => `${PART_MENU_ID}-${ref}`;

/** The parts that fit what is typed after the @, under the caret. */
export function PartMenu({
  parts,
  chosen,
  left,
  top,
  onChoose,
}: {
  parts: readonly BoardPart[];
  chosen: number;
  left: number;
  top: number;
  onChoose: (ref: string) => void;
}) {
  return (
    <ul
      id={PART_MENU_ID}
      role="listbox"
      aria-label="Parts of the board"
      className="suggestions part-menu floating"
      style={{ left: Math.max(8, Math.min(left, window.innerWidth - 272)), top }}
    >
      {parts.map(({ ref, value }, i) => (
        <li
          key={ref}
          id={partOptionId(ref)}
          role="option"
          aria-selected={i === chosen}
          onPointerDown={(event) => {
            event.preventDefault();
            onChoose(ref);
          }}
        >
          <strong className="mono">{ref}</strong>
          <span className="mono">{value}</span>
        </li>
      ))}
    </ul>
  );
}
