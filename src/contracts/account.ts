/** The forms of one's own account. */
import * as z from 'zod/v4';
import { Id, line } from './common';
import { Code, CurrentPassword, Password, sameTwice, twice } from './session';
import { NewToken } from './tokens';

export const AccountForm = z.discriminatedUnion('do', [
  z.object({ do: z.literal('name'), name: line(120, 1) }),
  z
    .object({
      do: z.literal('password'),
      current: CurrentPassword,
      password: Password,
      again: z.string().max(200),
      /** Ticked: API tokens end too. */
      tokens: z.literal('revoke').optional(),
    })
    .refine(twice, sameTwice),
  z.object({ do: z.literal('everywhere') }),
]);

export const SecondFactorForm = z.discriminatedUnion('do', [
  z.object({
    do: z.literal('on'),
    current: CurrentPassword,
    code: Code,
    sealed: z.string().max(1000),
  }),
  z.object({ do: z.literal('off'), current: CurrentPassword }),
]);

export const TokenForm = z.discriminatedUnion('do', [
  z.object({
    do: z.literal('make'),
    ...NewToken.shape,
    // A form without a tick sends nothing at all.
    scopes: z.preprocess((given) => given ?? [], NewToken.shape.scopes),
  }),
  z.object({ do: z.literal('revoke'), id: Id }),
]);
