import MiniSearch from 'minisearch';
import { describe, expect, test } from 'vitest';
import { partRefs, sectionWords } from '@/domain/faults/body';
import { INDEX_OPTIONS, labelWords, type NoteDocument } from '@/domain/faults/search-options';
import { LONGEST_QUESTION, questionOf } from '@/domain/faults/search-question';
import { scanWords, termsOf } from '@/domain/faults/search-terms';
import { SYNONYMS } from '@/domain/faults/synonyms';
import { demoBoards } from '@/server/demo/content';
import { demoFaults } from '@/server/demo/faults';

const boards = demoBoards();
const notes = demoFaults().filter((n) => n.state === 'published');
const index = new MiniSearch<NoteDocument>(INDEX_OPTIONS);
notes.forEach((note, id) => {
  const board = boards.find((b) => b.code === note.board) ?? null;
  const { title, body } = note;
  const words = (section: 'symptom' | 'cause' | 'proof' | 'repair') => sectionWords(body[section]);
  index.add({
    id,
    title,
    refs: partRefs(body).join(' '),
    labels: labelWords({ ...note, board, models: board?.models ?? [] }),
    about: board?.about ?? '',
    symptom: words('symptom'),
    cause: words('cause'),
    proof: words('proof'),
    repair: words('repair'),
  });
});
const find = (text: string, all = true, typing = false): string[] => {
  const question = questionOf(text, all, typing);
  return question ? index.search(question).map(({ id }) => notes[id as number]?.key ?? '') : [];
};

describe('terms', () => {
  test('one value is one term, however it is written', () => {
    for (const text of [
      '1k1',
      '1.1k',
      '1.1 kΩ',
      '1,1kΩ',
      '1.1\u00a0kΩ',
      '1.1 kohm',
      '1100 Ω',
      '1100R',
    ])
      expect(termsOf(text)[0], text).toBe('=1100r');
    for (const text of ['440mA', '440 mA', '0.44 A']) expect(termsOf(text)[0], text).toBe('=0.44a');
    for (const text of ['10nF', '10 nF', '10n', '0.01uF', '0.01 µF'])
      expect(termsOf(text)[0], text).toBe('=1e-8f');
  });

  test('a reference or a marking is never read as a value', () => {
    expect(termsOf('RT1 10D471K S-303 T9')).toEqual(['rt1', '10d471k', 's303', 's', '303', 't9']);
  });

  test('accents, case and number of a word do not matter', () => {
    expect(termsOf('Überspannung')).toEqual(termsOf('uberspannung'));
    expect(termsOf('Fuses BATTERIES')).toEqual(['fuse', 'battery']);
    expect(termsOf('glass bus')).toEqual(['glass', 'bus']);
  });

  test('the places of words are those of the text as given', () => {
    const text = 'At 4.99 MΩ (R1–R2), LB-40.';
    expect(scanWords(text).map((w) => text.slice(w.start, w.end))).toEqual([
      '4.99 MΩ',
      'R1–R2',
      'LB-40',
    ]);
  });
});

describe('questions', () => {
  test.each([
    // by itself
    ['continuity silent', 'lb-40-ptc-open'],
    ['fuse clips', 'lb-22-clips'],
    ['LB-22 varistor', 'lb-22-mov-short'],
    ['lb22 varistor', 'lb-22-mov-short'],
    // by what else the trade calls it
    ['thermistor open', 'lb-40-ptc-open'],
    ['VDR leaking', 'lb-40-mov-leaky'],
    ['metal oxide varistor leakage', 'lb-40-mov-leaky'],
    ['resettable fuse open', 'lb-40-ptc-open'],
    ['power supply stuck transistor shorted', 'ps-3-pass'],
    ['megohmmeter capacitor', 'it-5-capacitor'],
    ['high rupturing capacity glass', 'glass-fuse'],
    ['calibration memory', 'lb-40-eeprom'],
    ['tarnished clips', 'lb-22-clips'],
    ['flameproof resistor', 'it-5-flameproof'],
    // with slips and beginnings
    ['varister leaky', 'lb-40-mov-leaky'],
    ['calibratoin lost', 'lb-40-eeprom'],
    ['batery leaked', 'lb-22-battery'],
    ['reserv dried', 'ps-3-reservoir'],
    ['oxid clips', 'lb-22-clips'],
    // by value and marking
    ['10D471K', 'lb-40-ptc-and-mov'],
    ['38R shunt', 'lb-40-shunt-ma'],
    ['6800uF', 'ps-3-reservoir'],
    // by the label on the case
    ['Tessaly T9 ohms dead', 'lb-40-ptc-open'],
    ['Ostrel P2 clips', 'lb-22-clips'],
    ['Corvane C700 coil', 'cx-7-coil'],
  ])('%j finds %s first', (question, key) => {
    expect(find(question)[0] ?? null).toBe(key);
  });

  // What the bench says for the same thing; common usage of the trade.
  test.each([
    [['fuse blown', 'blown fuse', 'fuse open', 'fuse open circuit'], 'lb-40-fuse-ma'],
    [['PTC open', 'thermistor', 'polyfuse', 'resettable fuse'], 'lb-40-ptc-open'],
    [['MOV leaky', 'varistor leak', 'VDR leakage', 'surge absorber leaks'], 'lb-40-mov-leaky'],
    [['GDT', 'gas tube', 'gas discharge tube', 'arrester'], 'it-5-flameproof'],
    [['TVS', 'transient suppressor', 'zener', 'zener leakage'], 'lb-40-clamp-leaky'],
    [['shunt', 'sense resistor', 'current shunt burnt'], 'lb-40-shunt-ma'],
    [['drifted', 'R1 drift'], 'lb-40-chain-high'],
    [
      ['pass transistor shorted', 'pass transistor dead short', 'output transistor short'],
      'ps-3-pass',
    ],
  ])('%j all find %s first', (questions, key) => {
    for (const question of questions) expect(find(question)[0], question).toBe(key);
  });

  test('a phrase that only says a word at length asks for that word, not for its other words', () => {
    for (const [phrase, word] of [
      ['open circuit', 'open'],
      ['short circuit', 'short'],
      ['dead short', 'short'],
    ] as const) {
      expect(find(phrase), phrase).toEqual(find(word));
      expect(find(`RV1 ${phrase}`)).toEqual(find(`RV1 ${word}`));
    }
    // "high-impedance circuit" stands in this one, and nothing in it that is open circuit ranks it.
    const found = find('open circuit');
    expect(found[0]).toBe('lb-40-ptc-and-mov');
    expect(found.slice(0, 5)).not.toContain('lb-40-mov-leaky');
    expect(found.slice(0, 5)).not.toContain('it-5-flameproof');
  });

  test('a word of the trade is no slip for another', () => {
    const titles = (text: string) => JSON.stringify(questionOf(text));
    for (const word of ['open', 'leak', 'dead', 'blown'])
      expect(titles(word)).toContain('"fuzzy":false');
    expect(titles('batery')).toContain('"fuzzy":0.2');
  });

  test('a reference is met exactly: RT1 is not RT2, R1 is not R10', () => {
    const withRt1 = notes.filter((n) => partRefs(n.body).includes('RT1')).map((n) => n.key);
    for (const key of find('RT1')) expect(withRt1).toContain(key);
    expect(find('RT9')).toEqual([]);
  });

  test('every word must be met, unless any is asked for', () => {
    expect(find('varistor hinge')).toEqual([]);
    expect(find('varistor hinge', false)).toContain('cx-7-coil');
  });

  test('while typing, the beginning of the last word is enough', () => {
    expect(find('rt', true, true).length).toBeGreaterThan(0);
    expect(find('lb-4', true, true)).toContain('lb-40-ptc-open');
  });

  test('nothing to search for is no question, and a long one is cut', () => {
    for (const text of ['', '  ', 'the of and', '?!', '—']) expect(questionOf(text)).toBeNull();
    const long = questionOf('varistor '.repeat(5_000));
    expect(JSON.stringify(long).length).toBeLessThan(LONGEST_QUESTION * 100);
  });
});

test('no synonym stands twice in its row, and each can be searched for', () => {
  for (const row of SYNONYMS) {
    expect(new Set(row).size, row.join()).toBe(row.length);
    for (const phrase of row) expect(termsOf(phrase).length, phrase).toBeGreaterThan(0);
  }
});
