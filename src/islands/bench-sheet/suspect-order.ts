/** The order of the suspects panel, from what the server told. */
import type { Suspects } from '@/contracts/bench';
import { suspectsFirst } from '@/domain/bench/summary';

type Diagnosis = NonNullable<Suspects['diagnosis']>;
export type Standing = Diagnosis['parts'][number];

/** Suspects, likeliest first; a group that cannot be told apart stands together where its likeliest member does. */
export function gathered(diagnosis: Diagnosis): Standing[][] {
  const ranked: Standing[] = suspectsFirst(diagnosis);
  const placed = new Set<string>();
  return ranked.flatMap((part) => {
    if (placed.has(part.ref)) return [];
    const group = diagnosis.groups.find((refs) => refs.includes(part.ref));
    const members = group ? ranked.filter(({ ref }) => group.includes(ref)) : [part];
    for (const { ref } of members) placed.add(ref);
    return [members];
  });
}
