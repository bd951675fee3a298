/** What the demo shop's technicians measured, and when they were at work. */
import { randomUUID } from 'node:crypto';
import type { Database } from '@/db/client';
import { drawnNetwork } from '@/domain/bench/points';
import { predictUnder } from '@/domain/diagnosis/predict';
import type { Permission, StaffRole } from '@/domain/people';
import { formatTrade } from '@/domain/quantities/format';
import { grant, type Granted } from '../auth/actor';
import { enterReading } from '../bench/commands';
import type { Outcome } from '../refusal';
import type { TicketFull } from '../tickets/queries';
import type { Shop } from '../tickets/types';
import type { Chance } from './chance';
import type { DemoBoard, DemoCustomer, DemoScenario } from './content';

export type Person = { id: number; name: string; email: string; role: StaffRole };
export type DemoShop = {
  db: Database;
  shop: Shop;
  chance: Chance;
  boards: readonly DemoBoard[];
  scenarios: readonly DemoScenario[];
  customers: readonly DemoCustomer[];
  staff: { counter: Person; techs: readonly Person[]; senior: Person };
};

export const HOUR = 3_600_000;
export const DAY = 24 * HOUR;

/** The same moment in opening hours: days are squeezed into 07–16 h UTC, weekends into the Friday's last minutes. */
export function atWork(moment: number, now: Date): Date {
  const day = Math.floor(moment / DAY) * DAY;
  const weekday = new Date(day).getUTCDay();
  const share = (moment - day) / DAY;
  const open =
    weekday === 6
      ? day - DAY + (16 + share / 4) * HOUR
      : weekday === 0
        ? day - 2 * DAY + (16.25 + share / 4) * HOUR
        : day + (7 + 9 * share) * HOUR;
  return new Date(Math.min(open, now.getTime()));
}

export function must<T>(outcome: Outcome<T>, what: string): T {
  if (!outcome.ok) throw new Error(`Demo data, ${what}: ${outcome.reason}`);
  return outcome.value;
}
export function as<P extends Permission>(person: Person, permission: P): Granted<P> {
  const granted = grant({ kind: 'staff', ...person, scopes: null }, permission);
  if (!granted) throw new Error(`${person.name} may not ${permission}.`);
  return granted;
}
/** Enters what a meter would have shown, computed from the scenario's faults with a little noise. */
export async function measure(
  demo: DemoShop,
  tech: Person,
  ticket: TicketFull,
  scenario: DemoScenario,
  repaired: boolean,
  at: Date,
) {
  const board = demo.boards.find((b) => b.code === scenario.board);
  if (!board) throw new Error(`No demo board ${scenario.board}.`);
  const parts = board.parts.map((p) => ({ ...p, closed: p.closed ?? null }));
  const network = drawnNetwork(board.positions, parts);
  const shown = predictUnder(network, repaired ? [] : scenario.faults, scenario.probes);
  const bench = as(tech, 'ticket.bench');
  for (const [place, probe] of scenario.probes.entries()) {
    const ohms = shown[place];
    const noisy = typeof ohms === 'number' ? ohms * demo.chance.between(0.996, 1.004) : null;
    const typed =
      noisy === null ? 'OL' : formatTrade(Number(noisy.toPrecision(noisy < 10 ? 2 : 4)));
    const reading = {
      ...probe,
      place,
      typed,
      part: null,
      lifted: [],
      clientKey: randomUUID(),
      phase: repaired ? ('after-repair' as const) : ('as-found' as const),
    };
    const later = new Date(at.getTime() + place * 90_000);
    must(await enterReading(demo.db, bench, ticket, reading, later), `reading of ${ticket.number}`);
  }
}
