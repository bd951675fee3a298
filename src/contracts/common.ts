/** Shapes that many endpoints share. */
import * as z from 'zod/v4';
import './wrong-words';

export const Problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  detail: z.string(),
  errors: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
});
export type Problem = z.infer<typeof Problem>;

/** JSON Schema’s patterns are read without Unicode classes by many: this is judged beside them. */
export const wholePairs = (text: string): boolean => !/\p{Cs}/u.test(text);

/** One line of text: no control characters, no half of a surrogate pair, trimmed. */
export const line = (max: number, min = 0) =>
  z
    .string()
    .trim()
    .min(min, min === 1 ? 'Nothing was given: this is needed.' : undefined)
    .max(max, `Longer than ${max} characters: shorten it.`)
    .regex(
      /^[^\u0000-\u001f\u007f]*$/,
      'Has a control character: one line of plain text is needed.',
    )
    .refine(wholePairs, 'Has half of a character: whole ones are needed.');

/** Several lines of text. */
export const prose = (max: number, min = 0) =>
  z
    .string()
    .transform((s) => s.replace(/\r\n?/g, '\n').trim())
    .pipe(
      z
        .string()
        .min(min, min === 1 ? 'Nothing was given: this is needed.' : undefined)
        .max(max, `Longer than ${max} characters: shorten it.`)
        .regex(
          /^[^\u0000-\u0008\u000b-\u001f\u007f]*$/,
          'Has a control character: plain text is needed.',
        )
        .refine(wholePairs, 'Has half of a character: whole ones are needed.'),
    );

export const Email = z
  .string()
  .trim()
  .toLowerCase()
  .max(190, 'Longer than 190 characters: shorten it.')
  .pipe(z.email('Not an e-mail address: something like name@example.org is needed.'));

/** What may be left empty: a form sends the empty text for nothing. A union would not say what is wrong with the rest. */
export const orNothing = <T extends z.ZodType>(one: T) =>
  z.preprocess((given) => (given === '' ? undefined : given), one.optional()).optional();

/** An e-mail address, or nothing where nothing was typed. */
export const EmailIfAny = z
  .string()
  .trim()
  .toLowerCase()
  .max(190, 'Longer than 190 characters: shorten it.')
  .transform((typed) => typed || undefined)
  .pipe(z.email('Not an e-mail address: something like name@example.org is needed.').optional());

/** Internal keys as they stand in addresses. */
export const Id = z.coerce.number().int().positive().max(Number.MAX_SAFE_INTEGER);

export const TicketNumber = z
  .string()
  .trim()
  .regex(
    /^\d{4}-\d{4,6}$/,
    'Not a ticket number: four digits, a dash, four or more digits, like 2612-0047.',
  );

export const DateOnly = z.iso.date('Not a date: year-month-day is needed, like 2026-12-24.');
export const Moment = z.iso.datetime();

export const Money = z.object({ amount: z.int(), currency: z.string().length(3) });

/** `?limit&cursor&sort` of every list. The cursor is opaque; it may hold the longest name, in any script. */
export const ListQuery = z.object({
  limit: z.coerce.number().int().min(1).max(200).default(50),
  cursor: z.string().max(800).optional(),
  sort: z.string().max(40).optional(),
});

export const listOf = <T extends z.ZodType>(item: T) =>
  z.object({ items: z.array(item), next: z.string().nullable() });
