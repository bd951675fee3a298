import { formatOhms } from '@/domain/quantities/format';
import type { Expected } from './check-expected';
import type { KnownPart } from './check-input';
import type { PartCheckInput, PartVerdict, Side } from './check-types';
import { COOLING_MINUTES, defaultTolerance } from './defaults';
import type { Mode } from './kinds';
import { kindLabels, modeLabels } from './words';

type Verdict = PartVerdict['verdict'];

const RAYLEIGH = 'In circuit a parallel path can only lower a reading';
const LIFT = 'Lift one lead and measure again.';

/** Why the verdict stands, the measured value beside the needed one, in sentences. */
export function reasonsFor(
  input: PartCheckInput,
  part: KnownPart,
  expected: Expected,
  side: Side,
  verdict: Verdict,
  mode: Mode | undefined,
): string[] {
  const reasons = [`Measured ${measured(input)}; ${needed(part, expected)}.`];
  const rule = input.inCircuit ? inCircuitRule(part, side, verdict) : null;
  if (rule) reasons.push(rule);
  if (mode) reasons.push(judgement(input, part, side, mode));
  if (side === 'beyond-range') {
    reasons.push('The meter shows OL before it reaches this part’s value: it cannot judge it.');
  }
  if (expected.judgedBy === 'floor' && side === 'within') reasons.push(unseen(part));
  if (expected.judgedBy === 'unknown') {
    reasons.push('Its value is not known: only an open and a short can be told.');
  }
  if (part.kind === 'trimmer' && side === 'below') {
    reasons.push('This holds end to end: from the wiper any lower value is right.');
  }
  if (part.unread) reasons.push('The marking could not be read and was left out of account.');
  if (isThermistor(part) && side !== 'within' && verdict !== 'fits') {
    reasons.push(
      `Its value holds at 25 °C: within ${COOLING_MINUTES} minutes of power or soldering the reading is doubtful.`,
    );
  }
  return reasons;
}

/** The one thing to do next, or nothing when the reading settles it. */
export function nextStep(
  input: PartCheckInput,
  part: KnownPart,
  expected: Expected,
  side: Side,
  verdict: Verdict,
): string | undefined {
  if (side === 'beyond-range') return 'Measure it with an insulation tester or a higher range.';
  if (verdict === 'fits') return undefined;
  if (expected.judgedBy === 'unknown' && verdict === 'inconclusive') {
    return 'Give the part’s ohms or its marking.';
  }
  if (input.inCircuit && side !== 'above') return LIFT;
  if (part.kind === 'trimmer' && side === 'below') return 'Measure it again from end to end.';
  if (isJunction(part) && side === 'below') {
    return 'Swap the leads and measure again: only the higher of the two readings counts.';
  }
  if (isThermistor(part) && side !== 'near-short' && input.value !== 'OL') {
    return `Let it cool for ${COOLING_MINUTES} minutes and measure again.`;
  }
  if (verdict === 'suspect') return undefined;
  return 'Touch the leads together, then measure again.';
}

function measured({ value, resolution, inCircuit, position }: PartCheckInput): string {
  const shown = value === 'OL' ? 'OL' : formatOhms(value, resolution);
  const where = position ? ` at position ${position}` : '';
  return `${shown} ${inCircuit ? 'in circuit' : 'with a lead lifted'}${where}`;
}

function needed(part: KnownPart, { band, judgedBy }: Expected): string {
  if (judgedBy === 'floor') return `${formatOhms(band.low)} or more needed`;
  if (judgedBy === 'unknown') return 'no value to compare it with';
  if (band.low === 0) return `no more than ${formatOhms(band.high)} needed`;
  const span = `${formatOhms(band.low)} to ${formatOhms(band.high)}`;
  if (judgedBy === 'usual' || part.ohms === null || part.ohms === 0) {
    return `${span} usual for this kind of part`;
  }
  const percent = Number(((part.tolerance ?? defaultTolerance(part.kind)) * 100).toPrecision(4));
  const assumed = part.tolerance === null ? ' assumed' : '';
  const warmth = part.kind === 'ntc' ? ', 5 K either side of 25 °C allowed' : '';
  return `${formatOhms(part.ohms)} ±${percent} %${assumed} needed (${span}${warmth})`;
}

function inCircuitRule(part: KnownPart, side: Side, verdict: Verdict): string | null {
  switch (side) {
    case 'above':
      return `${RAYLEIGH}: one above tolerance proves the part open or drifted high.`;
    case 'below':
      return `${RAYLEIGH}: one below tolerance proves nothing until a lead is lifted.`;
    case 'near-short':
      return verdict === 'suspect'
        ? `${RAYLEIGH}: about 0 Ω across this ${kindLabels[part.kind]} is strong, though not proof until a lead is lifted.`
        : `${RAYLEIGH}: one below tolerance proves nothing until a lead is lifted.`;
    case 'within':
      return verdict === 'fits' && part.ohms !== null
        ? `${RAYLEIGH}: a path that hides a drift upwards would have to make up for it exactly.`
        : null;
    case 'beyond-range':
      return null;
  }
}

/** What a reading above the floor leaves unseen. */
function unseen({ kind, marked }: KnownPart): string {
  if (kind === 'mov') {
    const code =
      marked?.unit === 'V'
        ? ` A shift of its ${marked.value} V at 1 mA`
        : ' A shift of its 1 mA voltage';
    return `An open varistor reads the same.${code} cannot be seen on the ohms range.`;
  }
  if (kind === 'contact') return 'An open contact should read so.';
  return `An open ${kindLabels[kind]} reads the same: the ohms range cannot tell.`;
}

function judgement(input: PartCheckInput, part: KnownPart, side: Side, mode: Mode): string {
  // In circuit a path beside an open part may show any value: the two are told apart by odds alone.
  if (input.inCircuit && side === 'above' && input.value !== 'OL') {
    return mode === 'open'
      ? 'Of the two, open is the likelier.'
      : 'Of the two, the drift is likelier.';
  }
  const words = mode === 'short' ? 'shorted' : modeLabels[mode];
  return `As measured, the ${kindLabels[part.kind]} is ${words}.`;
}

function isThermistor({ kind }: KnownPart): boolean {
  return kind === 'ptc' || kind === 'ntc';
}

function isJunction({ kind }: KnownPart): boolean {
  return kind === 'diode' || kind === 'zener' || kind === 'clamp' || kind === 'ic-pin';
}
