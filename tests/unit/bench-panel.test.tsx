import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import type { Suspects } from '@/contracts/bench';
import { judgeSheet } from '@/domain/bench/judge-sheet';
import { BenchPanel } from '@/islands/bench-sheet/BenchPanel';
import { glued } from '@/islands/bench-sheet/glued';
import { noteOf } from '@/islands/bench-sheet/RowNote';
import { savedRow } from '@/islands/bench-sheet/rows';
import { gathered } from '@/islands/bench-sheet/suspect-order';
import { board, saved, taken } from '../fixtures/bench-board';

const NOTHING: Suspects = { diagnosis: null, expected: [], alone: [], unused: [], said: [] };
const readings = [saved(1), saved(2, { from: null, to: null, part: 'NT1', position: null })];
const judged = judgeSheet(
  board.positions,
  board.parts,
  readings.map((r) => ({ ...taken(r.id, {}), from: r.from!, to: r.to!, part: r.part! })),
  'mains-on-ohms',
) as Suspects;

function drawn(more: Partial<Parameters<typeof BenchPanel>[0]> = {}) {
  return renderToStaticMarkup(
    <BenchPanel
      ticketNumber="2612-0001"
      canEdit
      cautionsTicked
      closed={false}
      {...board}
      readings={readings}
      suspects={{ asFound: judged, afterRepair: null }}
      {...more}
    />,
  );
}
const text = (html: string) => html.replace(/<[^>]+>/g, ' ').replace(/\s+/g, ' ');

describe('the panel as the server draws it', () => {
  it('shows every reading with its expectation, and the suspects with their reasons', () => {
    const html = drawn();
    expect(html).toContain('aria-label="Row 1, Reading: OL"');
    expect(html).toContain('aria-label="Row 1, Expected: 1.1 kΩ"');
    expect(html).toContain('aria-label="V to P: OL, expected 1.1 kΩ, above what fits"');
    expect(html).toContain('aria-label="Row 2, From: NT1"');
    expect(text(html)).toContain('V to P reads OL; healthy it would be 1.1 kΩ.');
    expect(text(html)).toContain('by row 2 alone');
    expect(text(html)).toContain('from 2 readings');
  });

  it('has one tab stop, on the first cell to fill in, and names for every cell', () => {
    const html = drawn();
    expect(html.match(/<td[^>]*tabindex="0"/gi)).toHaveLength(1);
    expect(html).toMatch(/<td[^>]*tabindex="0"[^>]*aria-label="Row 3, From: empty"/i);
    for (const name of ['From', 'To', 'Switch', 'Lifted', 'Reading'])
      expect(html).toContain(`aria-label="Row 3, ${name}: `);
  });

  it('folds what is to be measured again beyond three rows', () => {
    const asked = (n: number) => {
      const doubtful = Array.from({ length: n }, (_, reading) => ({
        reading,
        reason: `measure row ${reading} again: no fault explains it`,
      }));
      const diagnosis = judged.diagnosis && { ...judged.diagnosis, doubtful };
      return drawn({ suspects: { asFound: { ...judged, diagnosis }, afterRepair: null } });
    };
    expect(asked(3)).not.toContain('more to measure again');
    const html = asked(8);
    const [open = '', folded = ''] = html.split('5 more to measure again');
    const blocks = (part: string) => part.match(/measure this one again/g)?.length;
    expect([blocks(open), blocks(folded)]).toEqual([3, 5]);
    expect(html).toMatch(/<details class="suspect-fold"><summary>5 more/);
  });

  it('is locked until the cautions are ticked, and says where they are', () => {
    const html = drawn({ cautionsTicked: false });
    expect(html).toContain('<a href="#cautions">');
    expect(html).toContain('aria-readonly="true"');
    expect(html).not.toContain('Row 3');
  });

  it.each([
    ['is only read by those who may not measure', { canEdit: false }],
    ['stays as it is once the ticket is closed', { closed: true }],
  ])('%s', (_, more) => {
    const html = drawn(more);
    expect(html).toContain('aria-readonly="true"');
    expect(html).not.toContain('Row 3');
    expect(html).not.toContain('#cautions');
    expect(html).not.toContain('Strike row');
  });

  it('proposes the next reading as a row of its own', () => {
    const next = [{ from: 'P', to: 'COM', position: 'ohms', lifted: ['R3'], bits: 0.87, cost: 1 }];
    const html = drawn({
      suspects: {
        asFound: { ...judged, diagnosis: { ...judged.diagnosis!, next } },
        afterRepair: null,
      },
    });
    expect(html).toContain('aria-label="Measure this next: P to COM, ohms"');
    expect(text(html)).toContain('next: 0.9 bit, lift R3');
  });

  it('says what would fill an empty panel', () => {
    const none = { asFound: NOTHING, afterRepair: null };
    expect(text(drawn({ readings: [], suspects: none }))).toContain('Begin between the jacks.');
    const bare = { readings: [], suspects: none, positions: [], nets: [], parts: [] };
    expect(text(drawn(bare))).toContain('The board of this instrument is not known');
    expect(text(drawn({ ...bare, canEdit: false }))).toContain('No reading yet.');
  });

  it('says to look elsewhere when the network is likelier sound, and which readings to take again', () => {
    const diagnosis = {
      ...judged.diagnosis!,
      healthy: 0.93,
      doubtful: [{ reading: 0, reason: 'Measure V to P again: OL fits no likely fault.' }],
    };
    const html = drawn({ suspects: { asFound: { ...judged, diagnosis }, afterRepair: null } });
    expect(text(html)).toContain('The network looks sound.');
    expect(text(html)).toContain('Row 1: measure this one again. OL fits no likely fault.');
    expect(html).toMatch(/<tr[^>]*class="[^"]*row-caution/);
    expect(html).toContain('aria-label="Row 1, saved, measure again"');
  });
});

describe('groups of suspects', () => {
  it('stand together where the likeliest of them does', () => {
    const part = (ref: string, fault: number) =>
      ({ ref, fault, standing: 'suspect', modes: { open: fault } }) as const;
    const diagnosis = {
      ...judged.diagnosis!,
      parts: [
        part('R1', 0.2),
        part('RT1', 0.9),
        part('R2', 0.4),
        { ...part('R3', 0.01), standing: 'cleared' as const },
      ],
      groups: [['R1', 'R2']],
    };
    expect(gathered(diagnosis).map((group) => group.map(({ ref }) => ref))).toEqual([
      ['RT1'],
      ['R2', 'R1'],
    ]);
  });
});

describe('the note under a row', () => {
  const about = { typed: 'OL', editing: false, missing: null, unusable: null };
  const row = savedRow(saved(1));

  it('is missing while all is well', () => {
    expect(noteOf(row, about)).toBeNull();
  });

  it('offers both readings of an ambiguous text while it is typed', () => {
    const note = noteOf(row, { ...about, typed: '1,600', editing: true });
    expect(note?.could).toEqual(['1.600', '1600']);
    expect(note?.words).toBe('"1,600" given: 1.600 or 1600; type one of them.');
  });

  it('leaves a text that is only begun alone until it is left', () => {
    expect(noteOf(row, { ...about, typed: 'O', editing: true })).toBeNull();
    expect(noteOf(row, { ...about, typed: 'O' })?.kind).toBe('danger');
  });

  it('says what is missing, what is not used, what was not saved', () => {
    expect(noteOf(row, { ...about, missing: 'To is missing.' })?.words).toBe(
      'Not saved yet. To is missing.',
    );
    expect(noteOf(row, { ...about, unusable: 'X is no net.' })?.words).toBe(
      'Not used in the ranking: X is no net.',
    );
    const failed = { ...row, state: { is: 'failed', words: 'No answer.' } } as const;
    expect(noteOf(failed, about)).toMatchObject({
      words: 'Not saved yet. No answer.',
      retry: true,
    });
    const theirs = saved(1, { typed: '2k2', by: 'Aleida' });
    const stale = { ...row, state: { is: 'stale', theirs, doing: 'edit' } } as const;
    expect(noteOf(stale, about)?.words).toBe(
      'Aleida changed this reading meanwhile to: V to P, volts, 2k2. Yours: V to P, volts, OL.',
    );
  });
});

describe('text with quantities', () => {
  it('never breaks between number and unit', () => {
    expect(glued('OL; healthy 1.1 kΩ, 0.5 % of 12 parts')).toBe(
      'OL; healthy 1.1\u00a0kΩ, 0.5\u00a0% of 12 parts',
    );
  });
});
