/** The piece of a text that shows best why it was found. */
import { scanWords } from './search-terms';

export type Piece = { text: string; hit: boolean };

const WIDTH = 190;
const LEAD = 40;

/** The text in pieces with the words marked that are found by one of the terms. */
export function markWords(text: string, terms: ReadonlySet<string>): Piece[] {
  const pieces: Piece[] = [];
  let done = 0;
  for (const word of scanWords(text)) {
    if (!word.terms.some((term) => terms.has(term))) continue;
    if (word.start > done) pieces.push({ text: text.slice(done, word.start), hit: false });
    pieces.push({ text: text.slice(word.start, word.end), hit: true });
    done = word.end;
  }
  if (done < text.length) pieces.push({ text: text.slice(done), hit: false });
  return pieces;
}

/** Where the most different terms stand close together; the beginning when none does. */
function bestStart(text: string, terms: ReadonlySet<string>): { start: number; kinds: number } {
  const hits = scanWords(text).flatMap((word) => {
    const term = word.terms.find((t) => terms.has(t));
    return term ? [{ at: word.start, term }] : [];
  });
  let best = { start: 0, kinds: 0 };
  hits.forEach((from, i) => {
    const near = new Set<string>();
    for (const hit of hits.slice(i)) {
      if (hit.at > from.at + WIDTH - LEAD) break;
      near.add(hit.term);
    }
    if (near.size > best.kinds) best = { start: Math.max(0, from.at - LEAD), kinds: near.size };
  });
  return best;
}

/** A cut never goes through a word. */
function window(text: string, start: number): string {
  if (text.length <= WIDTH) return text;
  const from = start === 0 ? 0 : text.indexOf(' ', start) + 1;
  const rest = text.slice(from);
  const cut = rest.length <= WIDTH ? rest : rest.slice(0, rest.lastIndexOf(' ', WIDTH));
  return `${from > 0 ? '… ' : ''}${cut}${cut.length < rest.length ? ' …' : ''}`;
}

/**
 * The best piece of several named texts, with the words marked that were found.
 *
 * @param texts in the order in which they are preferred when they say equally much.
 * @returns null when all are empty.
 */
export function snippetOf<Name extends string>(
  texts: readonly (readonly [Name, string])[],
  terms: ReadonlySet<string>,
): { from: Name; pieces: Piece[] } | null {
  let best: { from: Name; text: string; start: number; kinds: number } | null = null;
  for (const [from, text] of texts) {
    if (text === '') continue;
    const place = bestStart(text, terms);
    if (!best || place.kinds > best.kinds) best = { from, text, ...place };
  }
  return best && { from: best.from, pieces: markWords(window(best.text, best.start), terms) };
}
