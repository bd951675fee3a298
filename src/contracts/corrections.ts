/** Putting right what was written down at intake. */
import * as z from 'zod/v4';
import { INCIDENTS } from '@/domain/parts/kinds';
import { ACCESSORY_CODES, SYMPTOM_CODES } from '@/domain/tickets/vocabulary';
import { DateOnly, EmailIfAny, Id, line, orNothing, prose } from './common';
import { defineRoute } from './route';
import { ByNumber } from './tickets';

/** Only what is given is changed. An empty e-mail, phone or address takes it away. */
export const Correction = z.object({
  customer: z
    .object({
      /** The version of the customer's data that the correction was made from. */
      version: z.int().positive(),
      name: line(120, 1).optional(),
      email: EmailIfAny.transform((email) => email ?? null).optional(),
      phone: line(40).optional(),
      address: line(300).optional(),
    })
    .optional(),
  instrument: z.object({ maker: line(80, 1), model: line(80, 1), serial: line(60, 1) }).optional(),
  changedHands: z.boolean().default(false),
  symptoms: z.array(z.enum(SYMPTOM_CODES)).max(SYMPTOM_CODES.length).optional(),
  symptomText: prose(2000).optional(),
  incident: z.enum(INCIDENTS).optional(),
  accessories: z.array(z.enum(ACCESSORY_CODES)).max(ACCESSORY_CODES.length).optional(),
  accessoryText: line(300).optional(),
  condition: prose(1000).optional(),
  promisedOn: DateOnly.nullable().optional(),
});
export type Correction = z.output<typeof Correction>;

const version = z.coerce.number().int().positive();

/** The same as an HTML form: flat fields, all of them, with the versions that the page showed. */
export const CorrectionForm = z
  .object({
    version,
    customerVersion: version,
    name: line(120, 1),
    email: EmailIfAny.optional(),
    phone: line(40).default(''),
    address: line(300).default(''),
    maker: line(80, 1),
    model: line(80, 1),
    serial: line(60, 1),
    changedHands: z.literal('yes').optional(),
    symptoms: z.array(z.enum(SYMPTOM_CODES)).default([]),
    symptomText: prose(2000).default(''),
    incident: z.enum(INCIDENTS).default('unknown'),
    accessories: z.array(z.enum(ACCESSORY_CODES)).default([]),
    accessoryText: line(300).default(''),
    condition: prose(1000).default(''),
    promisedOn: orNothing(DateOnly),
  })
  .transform((f): { version: number; correction: Correction } => {
    const { version: at, customerVersion, name, email, phone, address, ...rest } = f;
    const { maker, model, serial, changedHands, promisedOn, ...said } = rest;
    return {
      version: at,
      correction: {
        ...said,
        customer: { version: customerVersion, name, email: email ?? null, phone, address },
        instrument: { maker, model, serial },
        changedHands: changedHands === 'yes',
        promisedOn: promisedOn ?? null,
      },
    };
  });

export const BoardForm = z.object({ board: Id });

export const correctionRoutes = {
  correct: defineRoute({
    method: 'PATCH',
    path: '/api/tickets/{number}',
    summary:
      'Correct what was written down at intake: only what is given is changed. A closed ticket is corrected by a senior.',
    who: 'ticket.intake',
    params: ByNumber,
    body: Correction,
    answer: z.object({ version: z.int() }),
    status: 200,
    versioned: true,
  }),
};
