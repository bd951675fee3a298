import { describe, expect, test } from 'vitest';
import { defaultOhms, defaultTolerance, healthyFloor } from '@/domain/parts/defaults';
import { FAILURE_SHARES, failureShare, modesOf } from '@/domain/parts/failure-shares';
import { incidentFactor } from '@/domain/parts/incident-factors';
import { kindRate } from '@/domain/parts/kind-rates';
import { INCIDENTS, MODES, PART_KINDS, STANDINGS } from '@/domain/parts/kinds';
import { modeRange } from '@/domain/parts/mode-ranges';
import { incidentLabels, kindLabels, modeLabels, standingLabels } from '@/domain/parts/words';

describe('failure shares', () => {
  test.each(PART_KINDS)('%s: the shares sum to 1 and name their source', (kind) => {
    const sum = modesOf(kind).reduce((total, mode) => total + failureShare(kind, mode), 0);
    expect(sum).toBeCloseTo(1, 12);
    expect(modesOf(kind).length).toBeGreaterThan(1);
    const { source, certainty } = FAILURE_SHARES[kind];
    if (certainty === 'assumed') expect(source).toContain('ench assumption');
    else expect(source).toMatch(/MIL-HDBK-338B|FMD-91/);
    if (certainty === 'memory') expect(source).toContain('from memory');
  });

  test('published figures that fit our modes are kept as published, MIL-HDBK-338B (1998)', () => {
    expect(failureShare('resistor', 'open')).toBe(0.59); // [T]
    expect(failureShare('resistor', 'short')).toBe(0.05); // [T]
    expect(failureShare('shunt', 'open')).toBe(0.65); // [T]
    expect(failureShare('shunt', 'short')).toBe(0.09); // [T]
    expect(failureShare('diode', 'short')).toBe(0.49); // [T]
    expect(failureShare('diode', 'open')).toBe(0.36); // [T]
    expect(failureShare('diode', 'leaky')).toBe(0.15); // parameter [T]
    expect(failureShare('capacitor', 'short')).toBe(0.49); // [T]
    expect(failureShare('contact', 'open')).toBe(0.65); // [T]
    expect(failureShare('contact', 'short')).toBe(0.16); // [T]
    expect(failureShare('clamp', 'open')).toBe(0.27); // [T]
  });

  test('a published figure that had to be split adds up to what was published', () => {
    const drift = (kind: 'resistor' | 'shunt' | 'ptc' | 'ntc') =>
      failureShare(kind, 'drifted-high') + failureShare(kind, 'drifted-low');
    expect(drift('resistor')).toBeCloseTo(0.36, 12); // [T]
    expect(drift('shunt')).toBeCloseTo(0.26, 12); // [T]
    expect(drift('ptc')).toBeCloseTo(0.22, 12); // FMD-91 [M]
    expect(drift('ntc')).toBeCloseTo(0.22, 12); // FMD-91 [M]
    expect(failureShare('clamp', 'short') + failureShare('clamp', 'leaky')).toBeCloseTo(0.73, 12); // [T]
    const contact = failureShare('contact', 'drifted-high') + failureShare('contact', 'leaky');
    expect(contact).toBeCloseTo(0.19, 12); // sticking [T]
    // Ceramic: value .29 split over leaky and open, open .22 [T].
    expect(failureShare('capacitor', 'leaky') + failureShare('capacitor', 'open')).toBeCloseTo(
      0.51,
      12,
    );
  });
});

test('rates lie between 1 and 5 in a hundred', () => {
  for (const kind of PART_KINDS) {
    expect(kindRate(kind)).toBeGreaterThanOrEqual(0.01);
    expect(kindRate(kind)).toBeLessThanOrEqual(0.05);
  }
});

describe('incidents', () => {
  test('an unknown incident carries no weight', () => {
    for (const kind of PART_KINDS) {
      for (const mode of MODES) expect(incidentFactor('unknown', kind, mode)).toBe(1);
    }
  });

  test('what the trade expects of each incident leads there', () => {
    expect(incidentFactor('mains-on-ohms', 'ptc', 'open')).toBeGreaterThan(3);
    expect(incidentFactor('mains-on-ohms', 'mov', 'short')).toBeGreaterThan(3);
    expect(incidentFactor('mains-on-ohms', 'clamp', 'short')).toBeGreaterThan(3);
    expect(incidentFactor('overcurrent-on-amps', 'fuse', 'open')).toBe(10);
    expect(incidentFactor('overcurrent-on-amps', 'shunt', 'open')).toBeGreaterThan(3);
    expect(incidentFactor('battery-leak', 'contact', 'drifted-high')).toBeGreaterThan(3);
    expect(incidentFactor('none', 'ptc', 'open')).toBeLessThan(1);
  });

  test('no prior leaves the range of a probability', () => {
    for (const incident of INCIDENTS) {
      for (const kind of PART_KINDS) {
        const sum = modesOf(kind).reduce(
          (total, mode) =>
            total +
            kindRate(kind) * failureShare(kind, mode) * incidentFactor(incident, kind, mode),
          0,
        );
        expect(sum).toBeGreaterThan(0);
        expect(sum).toBeLessThan(0.6);
      }
    }
  });

  test('factors touch only modes that the kind shows', () => {
    for (const incident of INCIDENTS) {
      for (const kind of PART_KINDS) {
        for (const mode of MODES) {
          if (!modesOf(kind).includes(mode)) expect(incidentFactor(incident, kind, mode)).toBe(1);
        }
      }
    }
  });
});

describe('ranges of the modes', () => {
  test('as the design says for a part in the middle of things', () => {
    expect(modeRange('open', 1100)).toEqual({ low: 1e8, high: 1e10 });
    expect(modeRange('short', 1100)).toEqual({ low: 0.01, high: 10 });
    expect(modeRange('leaky', 50e6)).toEqual({ low: 1e3, high: 1e7 });
    expect(modeRange('drifted-high', 1000)).toEqual({ low: 1200, high: 30_000 });
    expect(modeRange('drifted-low', 1000).low).toBeCloseTo(33.33, 2);
    expect(modeRange('drifted-low', 1000).high).toBeCloseTo(833.3, 1);
  });

  test('no range is empty, and none but the drifts can reach the healthy value', () => {
    for (const nominal of [1e-4, 0.01, 0.1, 1, 50, 1100, 1e5, 1e7, 50e6, 1e9]) {
      for (const mode of MODES) {
        const { low, high } = modeRange(mode, nominal);
        expect(low).toBeGreaterThan(0);
        expect(high).toBeGreaterThan(low);
        expect(low > nominal || high < nominal, `${mode} of ${nominal}`).toBe(true);
      }
    }
    expect(() => modeRange('open', 0)).toThrow(RangeError);
    expect(() => modeRange('open', Number.NaN)).toThrow(RangeError);
  });
});

test('defaults: surge parts and reverse junctions have a floor, the rest a value or none', () => {
  for (const kind of ['mov', 'gdt', 'capacitor', 'clamp', 'diode', 'zener'] as const) {
    expect(healthyFloor(kind)).toBe(50e6);
    expect(defaultOhms(kind)).toBe(50e6);
  }
  for (const kind of ['resistor', 'ntc', 'trimmer'] as const) expect(defaultOhms(kind)).toBeNull();
  expect(defaultOhms('ptc')).toBe(1100);
  for (const kind of PART_KINDS) {
    expect(defaultTolerance(kind)).toBeGreaterThan(0);
    expect(defaultTolerance(kind)).toBeLessThan(1);
  }
});

test('every kind, mode, incident and standing has its word', () => {
  expect(Object.keys(kindLabels)).toHaveLength(PART_KINDS.length);
  expect(Object.keys(modeLabels)).toHaveLength(MODES.length);
  expect(Object.keys(incidentLabels)).toHaveLength(INCIDENTS.length);
  expect(Object.keys(standingLabels)).toHaveLength(STANDINGS.length);
  for (const labels of [kindLabels, modeLabels, incidentLabels, standingLabels]) {
    expect(new Set(Object.values(labels)).size).toBe(Object.values(labels).length);
  }
});
