/** What an intake writes down, field by field: its names, its words, and what a correction of it changed. */
import { INCIDENT_LABELS, type Accessory, type Symptom } from './vocabulary';
import { ACCESSORIES, SYMPTOMS } from './vocabulary';
import type { Incident } from '../parts/kinds';

/** The fields in the order of the page, with their names. */
export const INTAKE_LABELS = {
  name: 'Name',
  email: 'E-mail',
  phone: 'Phone',
  address: 'Address',
  maker: 'Maker',
  model: 'Model',
  serial: 'Serial number',
  symptoms: 'Symptoms',
  symptomText: 'In the customer’s words',
  incident: 'What happened',
  accessories: 'Accessories',
  accessoryText: 'Anything else',
  condition: 'Condition',
  promisedOn: 'Promised for',
} as const;
export type IntakeField = keyof typeof INTAKE_LABELS;
export const INTAKE_FIELDS = Object.keys(INTAKE_LABELS) as IntakeField[];

/** All that has a name on the pages of an intake, in their order. */
export const FIELD_LABELS = {
  ...INTAKE_LABELS,
  changedHands: 'It changed hands',
  board: 'Board',
} as const;

/** An intake as it stands; the empty text where nothing is known. */
export type IntakeRecord = Record<
  Exclude<IntakeField, 'symptoms' | 'incident' | 'accessories'>,
  string
> & {
  symptoms: readonly Symptom[];
  incident: Incident;
  accessories: readonly Accessory[];
};

const listed = <C extends string>(labels: Record<C, string>, codes: readonly C[]): string =>
  (Object.keys(labels) as C[])
    .filter((code) => codes.includes(code))
    .map((code) => labels[code])
    .join('; ');

/** A field in words; empty when nothing is known. */
export function intakeWords(record: IntakeRecord, field: IntakeField): string {
  switch (field) {
    case 'symptoms':
      return listed(SYMPTOMS, record.symptoms);
    case 'accessories':
      return listed(ACCESSORIES, record.accessories);
    case 'incident':
      return INCIDENT_LABELS[record.incident];
    default:
      return record[field];
  }
}

export type IntakeChange = { field: IntakeField; from: string; to: string };

/** The fields in which two records differ, in the order of the page. */
export function intakeChanges(before: IntakeRecord, after: IntakeRecord): IntakeChange[] {
  return INTAKE_FIELDS.flatMap((field) => {
    const [from, to] = [intakeWords(before, field), intakeWords(after, field)];
    return from === to ? [] : [{ field, from, to }];
  });
}

/** Characters of a value that an event quotes. */
const QUOTED = 50;

function quoted(words: string): string {
  if (words === '') return 'nothing';
  const plain = words.replace(/\s+/g, ' ');
  const characters = [...plain];
  return characters.length > QUOTED ? `“${characters.slice(0, QUOTED).join('')}…”` : `“${plain}”`;
}

/** One line for the ticket's events, at most 2000 characters. */
export const changeWords = (changes: readonly IntakeChange[]): string =>
  `Corrected: ${changes
    .map(({ field, from, to }) => `${INTAKE_LABELS[field]} ${quoted(from)} → ${quoted(to)}`)
    .join('; ')}`;
