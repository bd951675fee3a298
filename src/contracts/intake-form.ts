/** The intake as an HTML form: flat fields, turned into the shape the API takes. */
import * as z from 'zod/v4';
import { INCIDENTS } from '@/domain/parts/kinds';
import { ACCESSORY_CODES, SYMPTOM_CODES } from '@/domain/tickets/vocabulary';
import { DateOnly, EmailIfAny, Id, line, orNothing, prose } from './common';
import type { Intake } from './tickets';

export const IntakeForm = z
  .object({
    customerId: orNothing(Id),
    name: line(120).default(''),
    email: EmailIfAny.optional(),
    phone: line(40).default(''),
    address: line(300).default(''),
    maker: line(80, 1),
    model: line(80, 1),
    serial: line(60, 1),
    symptoms: z.array(z.enum(SYMPTOM_CODES)).default([]),
    symptomText: prose(2000).default(''),
    incident: z.enum(INCIDENTS).default('unknown'),
    accessories: z.array(z.enum(ACCESSORY_CODES)).default([]),
    accessoryText: line(300).default(''),
    condition: prose(1000).default(''),
    promisedOn: orNothing(DateOnly),
    changedHands: z.literal('yes').optional(),
    /** Made with the form: sent twice, it makes one ticket. */
    once: z.uuid('This form is not one of ours: open the page anew.').optional(),
  })
  .refine((f) => f.customerId !== undefined || f.name !== '', {
    path: ['name'],
    message: 'No customer was given: find one or write the name of a new one.',
  })
  .transform(({ once, ...f }): { intake: Intake; once: string | null } => {
    const { customerId, name, email, phone, address, maker, model, serial, ...said } = f;
    return {
      once: once ?? null,
      intake: {
        ...said,
        customer: customerId === undefined ? { name, email, phone, address } : { id: customerId },
        instrument: { maker, model, serial },
        promisedOn: f.promisedOn ?? null,
        changedHands: f.changedHands === 'yes',
      },
    };
  });
