/** What the groups of fields of an intake, new or corrected, are given to draw themselves. */
import type { IntakeField } from '@/domain/tickets/intake-fields';

type Field = IntakeField | 'changedHands';

export type IntakeFields = {
  text: (name: Field, otherwise?: string) => string;
  picked: (name: Field) => string[];
  wrong: (name: Field) => string | undefined;
  /** What somebody else wrote there meanwhile. */
  news: (name: IntakeField) => string | undefined;
};
