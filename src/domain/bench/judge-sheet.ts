/** What a bench sheet says: the network's diagnosis, what was expected of each reading, parts judged alone. */
import type { DiagnosisAnswer } from '../diagnosis/types';
import { diagnose } from '../diagnosis/diagnose';
import { predict } from '../diagnosis/predict';
import type { Network, Ohms } from '../network/types';
import { violations } from '../network/validate';
import type { Incident, Mode, PartKind } from '../parts/kinds';
import { checkPart } from '../parts/check';

export type SheetPart = {
  ref: string;
  kind: PartKind;
  nets: [string, string] | null;
  ohms: number | null;
  tolerance: number | null;
  closed: string[] | null;
};
export type SheetReading = {
  id: number;
  from: string | null;
  to: string | null;
  part: string | null;
  position: string | null;
  lifted: string[];
  value: Ohms;
  resolution: number | null;
};
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
};

const noJudgement = (): SheetJudgement => ({
  diagnosis: null,
  expected: [],
  alone: [],
  unused: [],
});

/** The parts drawn into the network, as the computation takes them. */
export function drawnNetwork(positions: string[], parts: readonly SheetPart[]): Network {
  return {
    positions,
    parts: parts.flatMap((p) =>
      p.nets
        ? [
            {
              ref: p.ref,
              kind: p.kind,
              nets: p.nets,
              ohms: p.ohms ?? undefined,
              tolerance: p.tolerance ?? undefined,
              closed: p.closed ?? undefined,
            },
          ]
        : [],
    ),
  };
}

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
  const nets = new Set(network.parts.flatMap((p) => p.nets));
  const usable: { id: number; reading: Parameters<typeof predict>[1][number] }[] = [];
  const unused = (reading: SheetReading, reason: string) =>
    found.unused.push({ reading: reading.id, reason });

  for (const reading of sheet) {
    const part = reading.part === null ? undefined : parts.find((p) => p.ref === reading.part);
    if (reading.part !== null && !part) {
      unused(
        reading,
        `${reading.part} is not in the board file: add it there, or name two points.`,
      );
      continue;
    }
    if (part && !part.nets) {
      const verdict = judgeAlone(reading, part);
      if (typeof verdict === 'string') unused(reading, verdict);
      else found.alone.push(verdict);
      continue;
    }
    const from = part?.nets?.[0] ?? reading.from;
    const to = part?.nets?.[1] ?? reading.to;
    if (from === null || to === null) unused(reading, 'Two points or a part are needed.');
    else if (!nets.has(from) || !nets.has(to))
      unused(reading, `${nets.has(from) ? to : from} is no net of the board’s network.`);
    else if (from === to) unused(reading, 'Both points are the same net.');
    else if (reading.position !== null && !positions.includes(reading.position))
      unused(reading, `${reading.position} is no switch position of this board.`);
    else
      usable.push({
        id: reading.id,
        reading: {
          from,
          to,
          position: reading.position ?? undefined,
          value: reading.value,
          resolution: reading.resolution || undefined,
          lifted: reading.lifted.filter((ref) => network.parts.some((p) => p.ref === ref)),
        },
      });
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
  found.diagnosis = diagnose({ network, readings: taken, incident });
  found.expected = predict(network, taken).map((p, i) => ({
    reading: usable[i]?.id ?? 0,
    ohms: p.ohms,
    band: p.band,
  }));
  return found;
}
