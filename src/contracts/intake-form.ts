/** The intake as an HTML form: flat fields, turned into the shape the API takes. */
import * as z from 'zod/v4';
import { INCIDENTS } from '@/domain/parts/kinds';
import { ACCESSORY_CODES, SYMPTOM_CODES } from '@/domain/tickets/vocabulary';
import { DateOnly, Email, Id, line, orNothing, prose } from './common';
import type { Intake } from './tickets';

export const IntakeForm = z
  .object({
    customerId: orNothing(Id),
    name: line(120).default(''),
    email: orNothing(Email),
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
  })
  .refine((f) => f.customerId !== undefined || f.name !== '', {
    path: ['name'],
    message: 'No customer was given: find one or write the name of a new one.',
  })
  .transform((f): Intake => {
    const { customerId, name, email, phone, address, maker, model, serial, promisedOn, ...said } =
      f;
    return {
      ...said,
      customer: customerId === undefined ? { name, email, phone, address } : { id: customerId },
      instrument: { maker, model, serial },
      promisedOn: promisedOn ?? null,
    };
  });
