/** What became of pasted lines, in words. */
import { MAX_READINGS } from '@/contracts/compute';

export type PasteReport = {
  /** Rows that were written. */
  taken: number;
  /** Numbers of the lines that hold no reading. */
  empty: readonly number[];
  /** Lines for which the sheet had no row left. */
  beyond: number;
};

const LISTED = 8;
const count = (n: number, one: string) => `${n} ${one}${n === 1 ? '' : 's'}`;

/** "56 rows taken; 25 lines not: 23 because the sheet holds 60 readings, no reading in lines 4, 9. …" */
export function pasteWords({ taken, empty, beyond }: PasteReport): string {
  const left = beyond + empty.length;
  const lines = `${empty.slice(0, LISTED).join(', ')}${empty.length > LISTED ? ' …' : ''}`;
  const because = [
    beyond > 0 &&
      `${empty.length > 0 ? `${beyond} because ` : ''}the sheet holds ${MAX_READINGS} readings`,
    empty.length > 0 && `no reading in ${empty.length === 1 ? 'line' : 'lines'} ${lines}`,
  ].filter(Boolean);
  const first = taken > 0 ? `${count(taken, 'row')} taken` : 'Nothing taken';
  const rest = left > 0 ? `; ${count(left, 'line')} not: ${because.join(', ')}` : '';
  return `${first}${rest}.${taken > 0 ? ' Ctrl+Z takes the paste back.' : ''}`;
}
