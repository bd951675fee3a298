/** Names offered while a cell is typed: nets, parts and switch positions of the board. */
import type { Board } from './panel-props';
import type { Cells, Field } from './rows';

export type Candidate = { name: string; about: string };

/** What a cell may hold; nothing for the reading itself. */
export function candidatesFor(field: Field, board: Board): Candidate[] {
  const nets = [...board.nets]
    .sort((a, b) => Number(b.probe) - Number(a.probe))
    .map(({ name, label }) => ({ name, about: label }));
  const parts = board.parts.map(({ ref, value }) => ({ name: ref, about: value }));
  switch (field) {
    case 'from':
      return [...nets, ...parts];
    case 'to':
      return nets;
    case 'position':
      return board.positions.map((name) => ({ name, about: '' }));
    case 'lifted':
      return parts;
    case 'typed':
      return [];
  }
}

/** The part of a cell that is being completed: all of it, or the last reference of a list. */
function tailOf(field: Field, text: string): { head: string; tail: string } {
  if (field !== 'lifted') return { head: '', tail: text.trim() };
  const at = text.search(/[^\s,;]*$/);
  return { head: text.slice(0, at), tail: text.slice(at) };
}

/** The candidates that begin with what is typed, an exact one first; all of them while nothing is. */
export function matching(field: Field, text: string, candidates: readonly Candidate[]) {
  const typed = tailOf(field, text).tail.toLowerCase();
  return candidates
    .filter(({ name }) => name.toLowerCase().startsWith(typed))
    .sort(
      (a, b) => Number(b.name.toLowerCase() === typed) - Number(a.name.toLowerCase() === typed),
    );
}

/** The cell with one candidate taken. */
export function taking(field: Field, text: string, name: string): string {
  const { head } = tailOf(field, text);
  const before = head.split(/[\s,;]+/).filter(Boolean);
  return [...before, name].join(', ');
}

/** What a cell holds once it is left: the first candidate that begins so, or the text as it is. */
export function settled(field: Field, text: string, candidates: readonly Candidate[]): string {
  const { head, tail } = tailOf(field, text);
  if (tail === '')
    return head
      .split(/[\s,;]+/)
      .filter(Boolean)
      .join(', ');
  const [first] = matching(field, text, candidates);
  return taking(field, text, first?.name ?? tail);
}

/** True when a name that fits this cell begins with the letter. */
export function beginsWith(field: Field, letter: string, board: Board): boolean {
  return matching(field, letter, candidatesFor(field, board)).length > 0;
}

/** Cells from elsewhere with their names written as the board writes them: `com` becomes `COM`. */
export function named(cells: Cells, board: Board): Cells {
  const exact = (field: Field, text: string) => {
    const same = candidatesFor(field, board).find(
      ({ name }) => name.toLowerCase() === text.toLowerCase(),
    );
    return same?.name ?? text;
  };
  return {
    ...cells,
    from: exact('from', cells.from),
    to: exact('to', cells.to),
    position: exact('position', cells.position),
  };
}
