/** What a bench sheet says: the network's diagnosis, what was expected of each reading, parts judged alone. */
import type { DiagnosisAnswer, Reading } from '../diagnosis/types';
import { diagnoseClosely } from '../diagnosis/diagnose';
import { predict } from '../diagnosis/predict';
import type { Ohms } from '../network/types';
import { violations } from '../network/validate';
import type { Incident, Mode, PartKind } from '../parts/kinds';
import { checkPart } from '../parts/check';
import { drawnNetwork, placePoints } from './points';
import { sentencesOn } from './sentences';
import type { SheetPart, SheetReading } from './types';

export type AloneVerdict = {
  reading: number;
  ref: string;
  kind: PartKind;
  verdict: 'fits' | 'suspect' | 'inconclusive';
  mode: Mode | null;
  probability: number;
  reasons: string[];
  next: string | null;
};
export type SheetJudgement = {
  diagnosis: DiagnosisAnswer | null;
  expected: { reading: number; ohms: Ohms; band: number }[];
  alone: AloneVerdict[];
  unused: { reading: number; reason: string }[];
  /** A sentence for every part that the readings accuse or clear, and the reading it quotes. */
  said: { ref: string; words: string; reading: number | null }[];
};

const noJudgement = (): SheetJudgement => ({
  diagnosis: null,
  expected: [],
  alone: [],
  unused: [],
  said: [],
});

function judgeAlone(reading: SheetReading, part: SheetPart): AloneVerdict | string {
  const answer = checkPart({
    kind: part.kind,
    ohms: part.ohms ?? undefined,
    tolerance: part.tolerance ?? undefined,
    value: reading.value,
    resolution: reading.resolution ?? undefined,
    inCircuit: !reading.lifted.includes(part.ref),
    position: reading.position ?? undefined,
  });
  if (!answer.ok) return answer.reason;
  return {
    reading: reading.id,
    ref: part.ref,
    kind: part.kind,
    verdict: answer.verdict,
    mode: answer.mode ?? null,
    probability: answer.probability,
    reasons: answer.reasons,
    next: answer.next ?? null,
  };
}

/**
 * Judges one phase of a bench sheet. A reading on a drawn part counts as taken between that part's nets; a part
 * that is not drawn is judged alone (Rayleigh's rule when it was read in circuit). Readings that fit nothing are
 * listed with the reason, never dropped in silence.
 */
export function judgeSheet(
  positions: string[],
  parts: readonly SheetPart[],
  sheet: readonly SheetReading[],
  incident: Incident,
): SheetJudgement {
  const found = noJudgement();
  const network = drawnNetwork(positions, parts);
  const broken = network.parts.length > 0 ? violations(network) : [];
  const usable: { id: number; reading: Reading }[] = [];

  for (const reading of sheet) {
    const unused = (reason: string) => found.unused.push({ reading: reading.id, reason });
    const placed = placePoints({ positions, parts }, reading);
    if (placed.kind === 'unusable') unused(placed.reason);
    else if (placed.kind === 'alone') {
      const verdict = judgeAlone(reading, placed.part);
      if (typeof verdict === 'string') unused(verdict);
      else found.alone.push(verdict);
    } else {
      const { value, resolution } = reading;
      usable.push({
        id: reading.id,
        reading: { ...placed.probe, value, resolution: resolution || undefined },
      });
    }
  }
  if (usable.length === 0) return found;
  if (broken.length > 0) {
    const first = broken[0];
    for (const { id } of usable)
      found.unused.push({
        reading: id,
        reason: `The board’s network is not sound: ${first?.message}.`,
      });
    return found;
  }
  const taken = usable.map((u) => u.reading);
  const { answer, leaders } = diagnoseClosely({ network, readings: taken, incident });
  found.diagnosis = answer;
  found.expected = predict(network, taken).map((p, i) => ({
    reading: usable[i]?.id ?? 0,
    ohms: p.ohms,
    band: p.band,
  }));
  const say = sentencesOn({ positions, parts }, sheet, found, leaders);
  found.said = found.diagnosis.parts
    .filter(({ standing }) => standing !== 'untouched')
    .map((part) => ({ ref: part.ref, ...say(part) }));
  return found;
}
