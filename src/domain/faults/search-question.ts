/** Turns what somebody typed into a question the index understands: synonyms beside words, typos and prefixes allowed where they help. */
import { scanWords, termsOf } from './search-terms';
import { SYNONYMS } from './synonyms';

/** The part of the index's query language that is used here. */
export type Question = {
  combineWith: 'AND' | 'OR';
  queries: (Question | string)[];
  prefix?: boolean;
  fuzzy?: number | false;
  boostTerm?: () => number;
};

/** Longest question read, in characters; and in words. */
export const LONGEST_QUESTION = 200;
const MOST_WORDS = 12;
const LONGEST_PHRASE = 4;

const rows = SYNONYMS.map((row) => row.map((phrase) => termsOf(phrase)));
const byPhrase = new Map<string, string[][]>();
for (const row of rows)
  for (const phrase of row) {
    const key = phrase.join(' ');
    const others = row.filter((other) => other !== phrase);
    byPhrase.set(key, [...(byPhrase.get(key) ?? []), ...others]);
  }

/** `open circuit` and `dead short` say no more than the word of their row that stands in them. */
function shortest(phrase: string[]): string[] {
  const inside = (byPhrase.get(phrase.join(' ')) ?? []).find(
    (other) => other.length < phrase.length && other.every((term) => phrase.includes(term)),
  );
  return inside ?? phrase;
}

/** What else its rows say for a phrase, each once. */
function othersOf(phrase: string[]): string[][] {
  const said = new Map<string, string[]>();
  for (const other of byPhrase.get(phrase.join(' ')) ?? []) {
    const short = shortest(other);
    said.set(short.join(' '), short);
  }
  said.delete(phrase.join(' '));
  return [...said.values()];
}

const hasDigit = (term: string) => /\d/.test(term);

/** One term: a reference or value as it stands, a word with its endings and one or two slips. */
const exactly = (term: string, typing: boolean): Question => ({
  combineWith: 'AND',
  queries: [term],
  prefix: typing || (term.length >= 3 && !hasDigit(term)),
  // A word of the trade is spelt as it is meant: `open` is no slip for `pen`.
  fuzzy: term.length >= 4 && !hasDigit(term) && !byPhrase.has(term) ? 0.2 : false,
});

const otherwise = (terms: string[]): Question => ({
  combineWith: 'AND',
  queries: terms,
  prefix: false,
  fuzzy: false,
  boostTerm: () => 0.35,
});

type Unit = { terms: string[]; others: string[][] };

/** Words and phrases of the question, each with what the trade also calls it. */
function unitsOf(text: string): Unit[] {
  const words = scanWords(text.slice(0, LONGEST_QUESTION)).slice(0, MOST_WORDS);
  const units: Unit[] = [];
  for (let i = 0; i < words.length;) {
    let taken = 1;
    for (let n = Math.min(LONGEST_PHRASE, words.length - i); n > 1; n--)
      if (byPhrase.has(keyOf(words.slice(i, i + n).map((w) => w.terms)))) {
        taken = n;
        break;
      }
    const phrase = words.slice(i, i + taken).map((w) => w.terms);
    const terms = shortest(phrase.map(([best = '']) => best));
    const others = othersOf(terms);
    const [first, ...rest] = phrase[0] ?? [];
    // A value may stand as it was typed (in a marking), a dashed word in pieces.
    if (taken === 1 && rest.length > 0)
      others.push(first?.startsWith('=') ? rest.slice(0, 1) : rest);
    units.push({ terms, others });
    i += taken;
  }
  return units;
}

const keyOf = (phrase: string[][]) => phrase.map((terms) => terms[0]).join(' ');

/**
 * The question for the index, or null when nothing in the text can be searched for.
 *
 * @param all true: every word must be met (by itself or by a synonym); false: any of them.
 * @param typing the last word is still being typed: its beginning is enough, whatever it is.
 */
export function questionOf(text: string, all = true, typing = false): Question | null {
  const units = unitsOf(text);
  if (units.length === 0) return null;
  return {
    combineWith: all ? 'AND' : 'OR',
    queries: units.map((unit, i) => {
      const last = typing && i === units.length - 1;
      return {
        combineWith: 'OR',
        queries: [
          {
            combineWith: 'AND',
            queries: unit.terms.map((term, k) =>
              exactly(term, last && k === unit.terms.length - 1),
            ),
          },
          ...unit.others.map(otherwise),
        ],
      };
    }),
  };
}
