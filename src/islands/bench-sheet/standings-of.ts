import type { Suspects } from '@/contracts/bench';
import { modeWords } from '@/domain/bench/sentences';
import type { PartState } from '../shared/PartSymbol';
import type { Standings } from '../shared/standings';

/** What is drawn into each part's symbol wherever it stands on the page: the network's word, else that of a reading. */
export function standingsOf(suspects: Suspects | null): Standings {
  if (!suspects) return {};
  const alone = suspects.alone
    .filter(({ verdict }) => verdict !== 'inconclusive')
    .map(({ ref, verdict, mode }): [string, PartState] => [
      ref,
      verdict === 'fits' ? 'cleared' : (mode ?? 'plain'),
    ]);
  const ofNetwork = (suspects.diagnosis?.parts ?? []).map((part): [string, PartState] => [
    part.ref,
    part.standing === 'suspect' ? (modeWords(part).mode ?? 'plain') : part.standing,
  ]);
  return Object.fromEntries([...alone, ...ofNetwork]);
}
