/** One line for those who hear the sheet instead of seeing it, and for the head of the panel. */
import type { DiagnosisAnswer } from '../diagnosis/types';
import { modeLabels } from '../parts/words';
import type { SheetJudgement } from './judge-sheet';
import { modeWords } from './sentences';

/** From here on the network is more likely sound than not: the fault is elsewhere. */
export const LOOK_ELSEWHERE = 0.5;

const two = (probability: number) => probability.toFixed(2);

/** The suspects of a diagnosis, likeliest first. */
export function suspectsFirst({ parts }: DiagnosisAnswer) {
  return parts
    .filter((part) => part.standing === 'suspect')
    .sort((a, b) => b.fault - a.fault || a.ref.localeCompare(b.ref));
}

/** `Suspects: RT1 open 0.97, RV2 short 0.61. 3 parts cleared.` */
export function summaryOf(judged: SheetJudgement): string {
  const { diagnosis, alone } = judged;
  const said: string[] = [];
  const ranked = diagnosis ? suspectsFirst(diagnosis) : [];
  const names = [
    ...ranked.map((part) => `${part.ref} ${modeWords(part).words} ${two(part.fault)}`),
    ...alone
      .filter(({ verdict }) => verdict === 'suspect')
      .map(({ ref, mode, probability }) =>
        [ref, mode ? modeLabels[mode] : 'suspect', two(probability)].join(' '),
      ),
  ];
  if (diagnosis && diagnosis.healthy >= LOOK_ELSEWHERE)
    said.push(`The readings fit the healthy network (${two(diagnosis.healthy)}): look elsewhere.`);
  if (names.length > 0) said.push(`Suspects: ${names.join(', ')}.`);
  else if (said.length === 0) said.push('No suspects yet.');
  const cleared = diagnosis?.parts.filter(({ standing }) => standing === 'cleared').length ?? 0;
  if (cleared > 0) said.push(`${cleared} ${cleared === 1 ? 'part' : 'parts'} cleared.`);
  const again = diagnosis?.doubtful.length ?? 0;
  if (again > 0) said.push(`${again} ${again === 1 ? 'reading' : 'readings'} to measure again.`);
  return said.join(' ');
}
