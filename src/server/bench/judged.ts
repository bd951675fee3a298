/** What sheets say, kept for the last ones asked: judging is pure and costs tens of milliseconds. */
import { createHash } from 'node:crypto';
import type { Suspects } from '@/contracts/bench';
import { judgeSheet } from '@/domain/bench/judge-sheet';
import type { SheetBoard, SheetReading } from '@/domain/bench/types';
import type { Incident } from '@/domain/parts/kinds';

/** Sheets kept; one is a few ten kilobytes. */
const MOST = 200;
const kept = new Map<string, Suspects>();

/** Answers what one phase of a sheet says. The answer is shared: read it, never change it. */
export function judged(
  { positions, parts }: SheetBoard,
  sheet: readonly SheetReading[],
  incident: Incident,
): Suspects {
  const rows = sheet.map((r) => [
    r.id,
    r.from,
    r.to,
    r.part,
    r.position,
    r.lifted,
    r.value,
    r.resolution,
  ]);
  const asked = JSON.stringify([positions, parts, rows, incident]);
  const key = createHash('sha256').update(asked).digest('base64');
  const known = kept.get(key);
  kept.delete(key);
  const answer = known ?? (judgeSheet([...positions], parts, sheet, incident) as Suspects);
  // The one asked for last stands last; the first one goes.
  kept.set(key, answer);
  if (kept.size > MOST) kept.delete(kept.keys().next().value ?? '');
  return answer;
}
