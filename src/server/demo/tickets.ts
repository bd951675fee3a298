/** Sixty tickets in all stages, taken in and moved by the same commands the shop uses, with dates in the past. */
import { CAUTION_CODES, type Accessory } from '@/domain/tickets/vocabulary';
import type { Step } from '@/domain/tickets/stages';
import { takeIn } from '../intake/commands';
import { writeNote, writeToCustomer, writeToShop } from '../messages/commands';
import { accountOf } from '../customers/commands';
import { takeStep, tickCaution } from '../tickets/commands';
import { ticketByNumber, type TicketFull } from '../tickets/queries';
import { as, atWork, DAY, HOUR, measure, must, type DemoShop } from './bench';

/** The steps that lead to each place a demo ticket stands at. */
const PATHS: readonly (readonly Step[])[] = [
  [],
  ['begin'],
  ['begin', 'send-estimate'],
  ['begin', 'send-estimate', 'approve'],
  ['begin', 'send-estimate', 'approve', 'start-repair'],
  ['begin', 'send-estimate', 'approve', 'start-repair', 'begin-release-check'],
  ['begin', 'send-estimate', 'approve', 'start-repair', 'begin-release-check', 'release'],
  [
    'begin',
    'send-estimate',
    'approve',
    'start-repair',
    'begin-release-check',
    'release',
    'hand-over',
  ],
  ['begin', 'send-estimate', 'approve', 'wait-for-parts'],
  ['begin', 'send-estimate', 'decline'],
  ['begin', 'give-up'],
  ['begin', 'send-estimate', 'decline', 'return-unrepaired'],
];
/** How many tickets end where, in the order of PATHS: sixty in all. */
export const COUNTS = [6, 7, 6, 4, 5, 3, 4, 18, 3, 1, 1, 2] as const;

const NOTES: Partial<Record<Step, string>> = {
  approve: 'Approved by phone, called back to the number on the ticket.',
  decline: 'Declined by phone: buys a new one.',
  'wait-for-parts': 'Parts of the same ratings and class ordered, due on Thursday.',
  'give-up': 'Board carbonised between the jacks: creepage cannot be restored.',
  release: 'Insulation jacks to case, fuse types, all ranges at two points: passed.',
};
const MESSAGES = [
  'Is it possible to have it back before the weekend?',
  'The battery door was already cracked when I brought it in.',
  'Please keep the old parts for me.',
];

/** One ticket from intake along its path. */
async function writeTicket(
  demo: DemoShop,
  index: number,
  path: readonly Step[],
  received: Date,
  now: Date,
) {
  const { db, shop, chance, staff } = demo;
  const scenario = chance.pick(demo.scenarios);
  const board = demo.boards.find((b) => b.code === scenario.board);
  const model = chance.pick(board?.models ?? []);
  const tech = chance.pick(staff.techs);
  const customer = demo.customers[index % demo.customers.length];
  if (!customer) throw new Error('No demo customer.');
  const accessories: Accessory[] = chance.next() < 0.6 ? ['leads', 'case'] : ['leads'];
  const promised = new Date(received.getTime() + (5 + Math.floor(chance.next() * 9)) * DAY);
  const taken = await takeIn(
    db,
    as(staff.counter, 'ticket.intake'),
    {
      customer,
      instrument: {
        maker: model.maker,
        model: model.name,
        serial: String(80_000 + ((index * 7919) % 9973)),
      },
      symptoms: scenario.symptoms,
      symptomText: scenario.text,
      incident: scenario.incident,
      accessories,
      accessoryText: '',
      condition: chance.next() < 0.4 ? 'Scratched window, jacks clean.' : '',
      promisedOn: promised.toISOString().slice(0, 10),
      changedHands: false,
    },
    shop,
    atWork(received.getTime(), now),
  );
  const { number } = must(taken, 'intake');
  const head = await ticketByNumber(db, number);
  if (!head) throw new Error(`Ticket ${number} is gone.`);
  let version = 1;
  const pace = Math.min(20 * HOUR, (now.getTime() - received.getTime()) / (path.length + 1));
  for (const [i, step] of path.entries()) {
    const at = atWork(received.getTime() + pace * (i + chance.between(0.5, 0.9)), now);
    if (i === 1) {
      for (const caution of CAUTION_CODES)
        must(await tickCaution(db, as(tech, 'ticket.bench'), head, caution, true, at), 'caution');
      await measure(demo, tech, head, scenario, false, at);
    }
    if (step === 'begin-release-check') await measure(demo, tech, head, scenario, true, at);
    const person =
      step === 'release'
        ? staff.senior
        : step === 'hand-over' ||
            step === 'return-unrepaired' ||
            step === 'approve' ||
            step === 'decline'
          ? staff.counter
          : tech;
    const input = {
      step,
      note: NOTES[step] ?? '',
      estimate:
        step === 'send-estimate'
          ? {
              total: { amount: scenario.estimate.total, currency: shop.currency },
              work: scenario.estimate.work,
            }
          : null,
    };
    const moved = await takeStep(db, as(person, 'ticket.step'), number, version, input, shop, at);
    ({ version } = must(moved, `${step} of ${number}`));
    if (step === 'start-repair')
      await writeNote(db, as(tech, 'ticket.message'), head.id, scenario.cause, at);
  }
  if (index % 6 === 2)
    await talk(demo, head, index, atWork(received.getTime() + pace * path.length + HOUR / 2, now));
  // Half of those that wait at the bench have been measured already.
  if (path.length === 1 && index % 2 === 0) {
    const at = atWork(received.getTime() + pace, now);
    for (const caution of CAUTION_CODES)
      must(await tickCaution(db, as(tech, 'ticket.bench'), head, caution, true, at), 'caution');
    await measure(demo, tech, head, scenario, false, at);
  }
  return number;
}

async function talk(demo: DemoShop, ticket: TicketFull, index: number, at: Date) {
  const { db, shop, staff } = demo;
  const id = await accountOf(db, ticket.customerId);
  if (id === null) return;
  const { customerId, customerName: name } = ticket;
  const body = MESSAGES[index % MESSAGES.length] ?? '';
  await writeToShop(
    db,
    { kind: 'customer', id, name, role: 'customer', customerId, ticketId: null },
    ticket,
    body,
    at,
  );
  if (index % 12 === 2)
    await writeToCustomer(
      db,
      as(staff.counter, 'ticket.message'),
      ticket,
      'We will see to it and write you here.',
      shop,
      new Date(at.getTime() + HOUR),
    );
}

/** Writes all tickets, the oldest first, and answers their numbers. */
export async function writeTickets(demo: DemoShop, now: Date): Promise<string[]> {
  const ends = COUNTS.flatMap((n, path) => Array.from({ length: n }, () => PATHS[path] ?? []));
  // The further a ticket has come, the longer it has been here.
  const planned = ends
    .map((path) => {
      const closed = path.includes('hand-over') || path.includes('return-unrepaired');
      const days = closed
        ? demo.chance.between(20, 120)
        : path.length * 1.3 + demo.chance.between(0.2, 4);
      return { path, received: new Date(now.getTime() - days * DAY) };
    })
    .sort((a, b) => a.received.getTime() - b.received.getTime());
  const numbers: string[] = [];
  for (const [index, { path, received }] of planned.entries())
    numbers.push(await writeTicket(demo, index, path, received, now));
  return numbers;
}
