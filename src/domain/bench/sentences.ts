/** What the readings say, one sentence a part, the measured value beside the predicted one. */
import type { Leader } from '../diagnosis/leaders';
import { predictUnder } from '../diagnosis/predict';
import type { DiagnosisAnswer, Fault, PartStanding } from '../diagnosis/types';
import type { ForcedPart, Network, Ohms } from '../network/types';
import { violations } from '../network/validate';
import { failureShare, modesOf } from '../parts/failure-shares';
import type { Mode } from '../parts/kinds';
import { modeLabels } from '../parts/words';
import { formatOhms } from '../quantities/format';
import { writeExpected } from './expected';
import type { SheetJudgement } from './judge-sheet';
import { drawnNetwork, placePoints } from './points';
import { apart, fitFaults, typicalFault, type Taken } from './suspect-fit';
import type { Points, SheetBoard, SheetReading } from './types';

/** A sentence and the reading it quotes. */
export type Said = { words: string; reading: number | null };

type Quoted = { reading: SheetReading; taken: Taken; telling: number };
/**
 * A quoted reading must be closer to the fault than to its absence by this many factors of e; by half of what the
 * healthy board's tolerances leave where they leave little.
 */
const TELLING = 0.15;
const LEAST_TELLING = 0.01;
/** From here a suspect that no single reading accuses is a likely one. */
const LIKELY = 0.5;
/** From here the other modes of a suspect are not worth a word. */
const PLAIN = 0.8;

/** A value as the meter showed it. */
export function writeMeasured({ value, resolution }: SheetReading): string {
  return value === 'OL' ? 'OL' : formatOhms(value, resolution || undefined);
}

/** `V to COM`, or `RT1` when the leads stood straight on the part. */
export function writePoints({ from, to, part, lifted }: Points): string {
  const where = part ?? `${from} to ${to}`;
  return lifted.length === 0 ? where : `${where} (${lifted.join(', ')} lifted)`;
}

/** The likeliest mode first, a second one when the first does not stand out: `open`, `leaky or short`. */
export function modeWords({ modes, fault }: Pick<PartStanding, 'modes' | 'fault'>): {
  mode: Mode | null;
  words: string;
} {
  const order = (Object.entries(modes) as [Mode, number][]).sort((a, b) => b[1] - a[1]);
  const [first, second] = order;
  if (!first) return { mode: null, words: '' };
  const both = second !== undefined && first[1] < PLAIN * fault;
  const named = both ? [first, second] : [first];
  return { mode: first[0], words: named.map(([mode]) => modeLabels[mode]).join(' or ') };
}

function usedReadings(
  board: SheetBoard,
  sheet: readonly SheetReading[],
  { expected }: Pick<SheetJudgement, 'expected'>,
): Quoted[] {
  return sheet.flatMap((reading) => {
    const placed = placePoints(board, reading);
    if (placed.kind !== 'network') return [];
    const healthy = expected.find((e) => e.reading === reading.id);
    const tight = healthy && healthy.ohms !== 'OL' ? healthy.band / 2 : TELLING;
    const telling = Math.min(TELLING, Math.max(LEAST_TELLING, tight));
    return [{ reading, telling, taken: { ...placed.probe, value: reading.value } }];
  });
}

/** Of readings that tell as much, the one straight across the part is quoted. */
const ACROSS = 0.5;

/** The reading that the first prediction fits better than the second one by the most. */
function mostTelling(
  readings: readonly Quoted[],
  nets: readonly string[],
  fits: ReturnType<typeof predictUnder>,
  misses: ReturnType<typeof predictUnder>,
) {
  let best: { at: number; gain: number } | null = null;
  readings.forEach(({ taken, telling }, at) => {
    const [near, far] = [fits[at], misses[at]];
    if (near === undefined || far === undefined) return;
    const told = apart(taken.value, far) - apart(taken.value, near);
    const across = nets.includes(taken.from) && nets.includes(taken.to);
    const gain = told + (across ? ACROSS : 0);
    if (told > telling && (!best || gain > best.gain)) best = { at, gain };
  });
  return best as { at: number; gain: number } | null;
}

const netsOf = (network: Network, ref: string): readonly string[] =>
  network.parts.find((part) => part.ref === ref)?.nets ?? [];

/** The likeliest hypothesis that has this fault as it fits the readings, the fault itself first. */
function withCompanions(
  network: Network,
  taken: readonly Taken[],
  { hypotheses }: DiagnosisAnswer,
  leaders: readonly Leader[],
  fault: Fault,
): ForcedPart[] {
  const same = (one: { ref: string; mode?: Mode }) =>
    one.ref === fault.ref && one.mode === fault.mode;
  const leader = leaders.find(({ faults }) => faults.some(same));
  if (leader) return [...leader.forced].sort((a, b) => Number(same(b)) - Number(same(a)));
  const found = hypotheses.find(({ faults }) => faults.some(same));
  const others = (found?.faults ?? []).filter((one) => !same(one));
  return fitFaults(network, [fault, ...others].slice(0, 2), taken);
}

/** What the reading would be without this fault: healthy, or with the other one alone where that makes it differ. */
function shouldBe(
  judged: Pick<SheetJudgement, 'expected'>,
  reading: SheetReading,
  others: readonly ForcedPart[],
  without: Ohms | undefined,
): string {
  const healthy = judged.expected.find((e) => e.reading === reading.id);
  if (!healthy) return '';
  const [other] = others;
  if (other?.mode && without !== undefined && apart(without, healthy.ohms) > TELLING)
    return `; with ${other.ref} ${modeLabels[other.mode]} alone it would be ${writeExpected(without)}`;
  return `; healthy it would be ${writeExpected(healthy.ohms)}`;
}

/** What the part would have to be: `RV1 leaking about 22 kΩ explains that.` */
function explaining(ref: string, mode: Mode, ohms: Ohms): string {
  if (ohms === 'OL' || mode === 'open' || mode === 'short') return '';
  const about = formatOhms(Number(ohms.toPrecision(2)));
  return mode === 'leaky'
    ? `A leak of about ${about} through ${ref} explains that.`
    : `${ref} at about ${about} explains that.`;
}

function suspectSaid(
  network: Network,
  readings: readonly Quoted[],
  judged: Pick<SheetJudgement, 'expected'>,
  diagnosis: DiagnosisAnswer,
  leaders: readonly Leader[],
  standing: PartStanding,
): Said {
  const { ref } = standing;
  const lead = leaders.flatMap(({ faults }) => faults).find((fault) => fault.ref === ref);
  const mode = lead?.mode ?? modeWords(standing).mode;
  if (mode === null) return { words: 'No reading tells of it yet.', reading: null };
  const taken = readings.map((r) => r.taken);
  const fault = { ref, mode };
  const [own, ...others] = withCompanions(network, taken, diagnosis, leaders, fault);
  const fits = predictUnder(network, own ? [own, ...others] : others, taken);
  const without = predictUnder(network, others, taken);
  const found = mostTelling(readings, netsOf(network, ref), fits, without);
  const quoted = found ? readings[found.at] : undefined;
  if (!quoted)
    return {
      words:
        standing.fault < LIKELY
          ? 'Not ruled out: no reading tells against it yet.'
          : 'No reading speaks against it; its kind and the incident speak for it.',
      reading: null,
    };
  const { reading } = quoted;
  const should = shouldBe(judged, reading, others, without[found?.at ?? 0]);
  const about = own ? ` ${explaining(ref, mode, own.ohms)}`.trimEnd() : '';
  return {
    words: `${writePoints(reading)} reads ${writeMeasured(reading)}${should}.${about}`,
    reading: reading.id,
  };
}

/** `lead`: the likeliest hypothesis as it fits the readings; a cleared part is weighed beside it. */
function clearedSaid(
  network: Network,
  readings: readonly Quoted[],
  lead: readonly ForcedPart[],
  ref: string,
): Said {
  const part = network.parts.find((p) => p.ref === ref);
  const taken = readings.map((r) => r.taken);
  const fits = predictUnder(network, lead, taken);
  const modes = part
    ? modesOf(part.kind).sort((a, b) => failureShare(part.kind, b) - failureShare(part.kind, a))
    : [];
  for (const mode of modes) {
    const under = predictUnder(network, [...lead, typicalFault(network, ref, mode)], taken);
    const found = mostTelling(readings, part?.nets ?? [], fits, under);
    const quoted = found ? readings[found.at]?.reading : undefined;
    if (found && quoted)
      return {
        words:
          `${writePoints(quoted)} reads ${writeMeasured(quoted)}; ` +
          `with ${ref} ${modeLabels[mode]} it would be ${writeExpected(under[found.at] ?? 'OL')}.`,
        reading: quoted.id,
      };
  }
  return { words: 'The readings together speak for it.', reading: null };
}

/**
 * Answers the sentence of each part of a judged sheet: for a suspect the reading that tells most for it, for a
 * cleared part the reading that a fault would have changed most.
 */
export function sentencesOn(
  board: SheetBoard,
  sheet: readonly SheetReading[],
  judged: Pick<SheetJudgement, 'diagnosis' | 'expected'>,
  leaders: readonly Leader[],
): (standing: PartStanding) => Said {
  const network = drawnNetwork(board.positions, board.parts);
  const readings = usedReadings(board, sheet, judged);
  const { diagnosis } = judged;
  const able = diagnosis !== null && violations(network).length === 0;
  const lead = leaders[0]?.forced ?? [];
  return (standing) => {
    if (!able || standing.standing === 'untouched')
      return { words: 'No reading tells of it yet.', reading: null };
    return standing.standing === 'suspect'
      ? suspectSaid(network, readings, judged, diagnosis, leaders, standing)
      : clearedSaid(network, readings, lead, standing.ref);
  };
}
