import type { ReactNode } from 'react';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { MODES, PART_KINDS } from '@/domain/parts/kinds';
import { AccuracyScale } from '@/islands/shared/AccuracyScale';
import { Field } from '@/islands/shared/Field';
import { MeterFace } from '@/islands/shared/MeterFace';
import { PartSymbol, partName, type PartState } from '@/islands/shared/PartSymbol';
import { ProbabilityScale, writeProbability } from '@/islands/shared/ProbabilityScale';
import { ReadingScale } from '@/islands/shared/ReadingScale';
import { StageScale } from '@/islands/shared/StageScale';

const draw = (node: ReactNode) => renderToStaticMarkup(node);
const names = (html: string) => [...html.matchAll(/aria-label="([^"]*)"/g)].map(([, name]) => name);
const STATES: PartState[] = [...MODES, 'cleared', 'untouched', 'plain'];

describe('a part symbol', () => {
  it.each(PART_KINDS)('draws %s differently in each standing, without colour', (kind) => {
    const bare = STATES.map((state) =>
      draw(<PartSymbol kind={kind} state={state} label="x" />).replace(
        /symbol-(failed|cleared|untouched|plain|glyph)/g,
        '',
      ),
    );
    expect(new Set(bare).size).toBe(STATES.length);
  });

  it('draws every kind differently', () => {
    const drawn = PART_KINDS.map((kind) =>
      draw(<PartSymbol kind={kind} state="plain" label="x" />),
    );
    expect(new Set(drawn).size).toBe(PART_KINDS.length);
  });

  it('says the kind and the standing in its name', () => {
    const html = draw(<PartSymbol kind="ptc" state="open" />);
    expect(html).toContain('role="img"');
    expect(names(html)).toEqual(['PTC thermistor, open']);
    expect(partName('mov', 'plain')).toBe('varistor (MOV)');
  });

  it('is hidden from readers when the words beside it say the same', () => {
    const html = draw(<PartSymbol kind="fuse" state="open" label="" />);
    expect(html).toContain('aria-hidden="true"');
    expect(html).not.toContain('role=');
  });
});

describe('a probability scale', () => {
  it('says its number in its name and beside it, with the range', () => {
    const html = draw(<ProbabilityScale value={0.97} low={0.93} high={0.99} label="RT1 open" />);
    expect(names(html)).toEqual(['RT1 open: probability 0.97, between 0.93 and 0.99']);
    expect(html).toMatch(/>0\.97<\/span>/);
    expect(html).toContain('scale-sector');
  });

  it('draws no sector without a range', () => {
    expect(draw(<ProbabilityScale value={0.5} label="R1" />)).not.toContain('scale-sector');
  });

  it.each([
    [0, '0.00'],
    [0.001, '< 0.01'],
    [0.005, '0.01'],
    [0.99, '0.99'],
    [0.9951, '> 0.99'],
    [1, '1.00'],
  ])('writes %s as %s', (value, text) => {
    expect(writeProbability(value)).toBe(text);
  });
});

describe('a reading scale', () => {
  it('says what was read, what was expected and how they lie', () => {
    const html = draw(
      <ReadingScale
        measured="OL"
        predicted={1100}
        low={880}
        high={1320}
        text="OL"
        expectedText="1.10 kΩ"
        label="V to P"
      />,
    );
    expect(names(html)).toEqual(['V to P: OL, expected 1.10 kΩ, above what fits']);
    expect(html).toContain('tone-danger');
  });

  it('leaves the number to its column when asked, but not in its name', () => {
    const html = draw(
      <ReadingScale measured={11.2} text="11.2 Ω" label="MA to COM" numberElsewhere />,
    );
    expect(html).not.toContain('scale-number');
    expect(names(html)).toEqual(['MA to COM: 11.2 Ω']);
  });
});

describe('an accuracy scale', () => {
  it('names point, error and verdict', () => {
    const html = draw(
      <AccuracyScale
        error={-0.44}
        limit={0.5}
        guard={0.1}
        text="−0.44 mV"
        label="6 V"
        verdict="fail"
      />,
    );
    expect(names(html)).toEqual(['6 V: error −0.44 mV, fail']);
  });

  it('says when the needle is at its stop', () => {
    const html = draw(<AccuracyScale error={5} limit={0.5} text="+5.00 mV" label="6 V" />);
    expect(names(html)).toEqual(['6 V: error +5.00 mV, beyond the scale']);
  });
});

describe('a stage scale', () => {
  const at = { iso: '2026-12-01T09:40:00Z', text: '1 Dec, 09:40' };
  const stages = [
    { key: 'received', label: 'received', at },
    { key: 'bench', label: 'on the bench', at },
    { key: 'ready', label: 'ready' },
  ];

  it('marks the current stage once, and dates what has been reached', () => {
    const html = draw(<StageScale stages={stages} current="bench" />);
    expect(names(html)).toEqual(['Stage: on the bench, 2 of 3']);
    expect(html.match(/aria-current="step"/g)).toHaveLength(1);
    expect(html).toMatch(/aria-current="step"[^]*on the bench/);
    expect(html.match(/<time dateTime="2026-12-01T09:40:00Z">/g)).toHaveLength(2);
    expect(html.match(/class="stage stage-(passed|reached|ahead)/g)).toEqual([
      'class="stage stage-passed',
      'class="stage stage-reached',
      'class="stage stage-ahead',
    ]);
  });

  it('sets the needle on the side exit, after the stage it left from', () => {
    const html = draw(
      <StageScale
        stages={stages}
        current="bench"
        exit={{ label: 'beyond repair', after: 'bench', kind: 'end', at }}
      />,
    );
    expect(names(html)).toEqual(['Stage: beyond repair']);
    expect(html.match(/aria-current="step"/g)).toHaveLength(1);
    const order = ['on the bench', 'beyond repair', 'ready'].map((word) =>
      html.indexOf(`>${word}<`),
    );
    expect(order).toEqual([...order].sort((a, b) => a - b));
    expect(order).not.toContain(-1);
  });
});

describe('a field', () => {
  it('ties label, hint and error to its control', () => {
    const html = draw(
      <Field
        name="limit"
        label="Limit"
        hint="In euro."
        error="Given -1; a sum of 0 or more is needed."
        unit="EUR"
      >
        {(control) => <input {...control} defaultValue="-1" />}
      </Field>,
    );
    expect(html).toContain('for="limit"');
    expect(html).toContain('aria-describedby="limit-hint limit-error"');
    expect(html).toContain('aria-invalid="true"');
    expect(html).toMatch(/id="limit-error">Given -1; a sum of 0 or more is needed\.</);
  });
});

it('draws without style attributes, which the content security policy refuses', () => {
  const all = draw(
    <>
      {PART_KINDS.flatMap((kind) =>
        STATES.map((state) => <PartSymbol key={kind + state} kind={kind} state={state} />),
      )}
      <ProbabilityScale value={0.5} low={0.2} high={0.7} label="R1" />
      <ReadingScale measured={5} predicted={4} low={3} high={6} text="5 Ω" label="A to B" wide />
      <MeterFace deflection={0.5} />
      <AccuracyScale error={1} limit={2} guard={0.2} uncertainty={0.2} text="1 V" label="V" wide />
    </>,
  );
  expect(all).not.toContain('style=');
});
