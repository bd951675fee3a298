/** What a value that is not taken is told, where its schema says nothing of its own: the house's words, in one place. */
import * as z from 'zod/v4';
import type { $ZodRawIssue } from 'zod/v4/core';

export const NOTHING_GIVEN = 'Nothing was given: this is needed.';
export const NO_FORM_FITS =
  'None of the forms that are taken here: see the documentation for them.';

const KINDS: Readonly<Record<string, string>> = {
  string: 'Not text: text is needed.',
  number: 'Not a number: a number is needed.',
  int: 'Not a whole number: a whole number is needed.',
  boolean: 'Neither true nor false: one of them is needed.',
  array: 'Not a list: a list is needed.',
  object: 'Not an object: an object with named members is needed.',
  null: 'Not null: null is needed.',
};

/** The word for what a size counts. */
const unit = (origin: string, size: number | bigint) =>
  origin === 'string'
    ? size === 1
      ? 'character'
      : 'characters'
    : size === 1
      ? 'entry'
      : 'entries';
const isNumber = (origin: string) => ['number', 'int', 'bigint'].includes(origin);
const given = (input: unknown) =>
  typeof input === 'number' || typeof input === 'bigint' ? `${input} was given` : null;

function tooSmall({
  origin,
  minimum,
  inclusive = true,
  input,
}: Extract<$ZodRawIssue, { code: 'too_small' }>): string {
  if (isNumber(origin)) {
    const needed = inclusive ? `${minimum} or more is needed` : `more than ${minimum} is needed`;
    return `${given(input) ?? 'Too small'}: ${needed}.`;
  }
  return Number(minimum) === 1
    ? NOTHING_GIVEN
    : `Too short: at least ${minimum} ${unit(origin, minimum)} are needed.`;
}

function tooBig({
  origin,
  maximum,
  inclusive = true,
  input,
}: Extract<$ZodRawIssue, { code: 'too_big' }>): string {
  if (isNumber(origin)) {
    const needed = inclusive ? `${maximum} or less is needed` : `less than ${maximum} is needed`;
    return `${given(input) ?? 'Too large'}: ${needed}.`;
  }
  return `Longer than ${maximum} ${unit(origin, maximum)}: shorten it.`;
}

const LISTED = 12;

/** The closed lists are named where they are short enough to be read. */
function notInList(values: readonly unknown[]): string {
  const names = values.map(String);
  if (names.length === 1) return `Only ${names[0] || 'nothing'} is taken here.`;
  if (names.length > LISTED) return 'Not in the list: choose one that the documentation names.';
  return `Not in the list: one of ${names.map((name) => name || 'nothing').join(', ')} is needed.`;
}

/** The sentence for one issue. */
export function wrongWords(issue: $ZodRawIssue): string {
  switch (issue.code) {
    case 'invalid_type':
      if (issue.input === undefined) return NOTHING_GIVEN;
      return KINDS[issue.expected] ?? 'Not the kind of value that is needed here.';
    case 'too_small':
      return tooSmall(issue);
    case 'too_big':
      return tooBig(issue);
    case 'invalid_value':
      return issue.input === undefined ? NOTHING_GIVEN : notInList(issue.values);
    case 'invalid_union':
      return issue.input === undefined ? NOTHING_GIVEN : NO_FORM_FITS;
    case 'unrecognized_keys':
      return `Not known here: ${issue.keys.join(', ')}. Leave ${issue.keys.length === 1 ? 'it' : 'them'} out.`;
    case 'not_multiple_of':
      return `Not a multiple of ${issue.divisor}: one is needed.`;
    case 'invalid_format':
      return 'Not written as it is needed here: see the documentation for the form.';
    default:
      return 'Not a value that is taken here.';
  }
}

z.config({ customError: wrongWords });
