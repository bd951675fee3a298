/** What changed between two texts, word by word. */

export type Change = { kind: 'same' | 'gone' | 'new'; text: string };

/** Longer texts are compared line by line, so that the work stays bounded. */
const MOST_CELLS = 1_000_000;

/** Longest common subsequence over tokens, by the usual table. */
function changes(before: readonly string[], after: readonly string[]): Change[] {
  const width = after.length + 1;
  const longest = new Uint32Array((before.length + 1) * width);
  for (let i = before.length - 1; i >= 0; i--)
    for (let j = after.length - 1; j >= 0; j--)
      longest[i * width + j] =
        before[i] === after[j]
          ? (longest[(i + 1) * width + j + 1] ?? 0) + 1
          : Math.max(longest[(i + 1) * width + j] ?? 0, longest[i * width + j + 1] ?? 0);
  const found: Change[] = [];
  let i = 0;
  let j = 0;
  while (i < before.length || j < after.length) {
    const [old, fresh] = [before[i], after[j]];
    if (old !== undefined && old === fresh) {
      found.push({ kind: 'same', text: old });
      i++;
      j++;
    } else if (
      fresh === undefined ||
      (old !== undefined &&
        (longest[(i + 1) * width + j] ?? 0) >= (longest[i * width + j + 1] ?? 0))
    ) {
      found.push({ kind: 'gone', text: old ?? '' });
      i++;
    } else {
      found.push({ kind: 'new', text: fresh });
      j++;
    }
  }
  return found;
}

/** Neighbours of one kind become one piece. */
function joined(all: readonly Change[]): Change[] {
  const pieces: Change[] = [];
  for (const change of all) {
    const last = pieces.at(-1);
    if (last?.kind === change.kind) last.text += change.text;
    else pieces.push({ ...change });
  }
  return pieces;
}

/**
 * The second text as a change of the first: pieces kept, gone and new, in reading order. The kept and gone pieces
 * together are the first text, the kept and new ones the second.
 */
export function compareTexts(before: string, after: string): Change[] {
  const words = (text: string) => text.match(/\s+|[^\s]+/g) ?? [];
  const lines = (text: string) => text.match(/[^\n]*\n|[^\n]+/g) ?? [];
  const [a, b] = [words(before), words(after)];
  if (a.length * b.length <= MOST_CELLS) return joined(changes(a, b));
  const [x, y] = [lines(before), lines(after)];
  if (x.length * y.length <= MOST_CELLS) return joined(changes(x, y));
  return joined([
    { kind: 'gone', text: before },
    { kind: 'new', text: after },
  ]);
}
