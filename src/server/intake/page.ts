/** The fields of an intake, new or corrected, as their page shows them. */
import { FIELD_LABELS, type IntakeField } from '@/domain/tickets/intake-fields';
import { errorFor, typedText, type Typed } from '../http/form';
import type { FieldError } from '../refusal';

type Field = IntakeField | 'changedHands';

/** Where the API's paths and the form's names differ. */
function pathsOf(name: Field): string[] {
  const paths = [name, `instrument.${name}`, `customer.${name}`];
  return name === 'name' ? [...paths, 'customerId', 'customer.id'] : paths;
}

export function intakeFields(
  typed: Typed,
  errors: readonly FieldError[],
  news: Partial<Record<IntakeField, string>> = {},
) {
  return {
    text: (name: Field, otherwise?: string) => typedText(typed, name, otherwise),
    picked: (name: Field): string[] => {
      const value = typed[name];
      return Array.isArray(value) ? value : [];
    },
    wrong: (name: Field) =>
      pathsOf(name)
        .map((path) => errorFor(errors, path))
        .find((message) => message !== undefined),
    news: (name: IntakeField) => news[name],
  };
}

/** For the summary over the form: every field that has an error, in the order of the page. */
export const wrongFields = ({
  wrong,
}: ReturnType<typeof intakeFields>): Record<string, string | undefined> =>
  Object.fromEntries((Object.keys(FIELD_LABELS) as Field[]).map((name) => [name, wrong(name)]));
