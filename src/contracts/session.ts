import * as z from 'zod/v4';
import { defineRoute } from './route';
import { Email, line } from './common';

export const Password = z
  .string()
  .min(12, 'Shorter than 12 characters: a longer one is needed.')
  .max(200, 'Longer than 200 characters: shorten it.');

export const SignIn = z.object({
  email: Email,
  password: z.string().min(1, 'Nothing was given: the password is needed.').max(200),
  totp: z
    .string()
    .trim()
    .regex(/^\d{6}$/, 'Not a six-digit code.')
    .or(z.literal('').transform(() => undefined))
    .optional(),
});

/** A code as typed: authenticators show it in two halves. */
export const Code = z
  .string()
  .transform((code) => code.replace(/\s/g, ''))
  .pipe(z.string().regex(/^\d{6}$/, 'Not a six-digit code: type the one your app shows now.'));

/** The sign-in page in its two steps. */
export const SignInForm = z.discriminatedUnion('step', [
  z.object({ step: z.literal('password'), ...SignIn.pick({ email: true, password: true }).shape }),
  z.object({ step: z.literal('code'), note: z.string().min(1).max(1000), totp: Code }),
]);

export const ForgotForm = z.object({ email: Email });

export const sameTwice = {
  path: ['again'],
  message: 'Not the same as above: type the new password once more.',
};
export const twice = (form: { password: string; again: string }) => form.password === form.again;

/** A new password, typed twice because it does not show. */
export const NewPasswordForm = z
  .object({ password: Password, again: z.string().max(200) })
  .refine(twice, sameTwice);

export const InvitationForm = z
  .object({ name: line(120, 1), password: Password, again: z.string().max(200) })
  .refine(twice, sameTwice);

/** The password one signs in with, asked again before a change that a borrowed screen must not make. */
export const CurrentPassword = z
  .string()
  .min(1, 'Nothing was given: the password you sign in with is needed.')
  .max(200);

export const sessionRoutes = {
  signIn: defineRoute({
    method: 'POST',
    path: '/api/session',
    summary: 'Sign in with e-mail and password; answers with the session cookie.',
    who: 'public',
    body: SignIn,
    bodyLimit: 4096,
    answer: null,
    status: 204,
  }),
  signOut: defineRoute({
    method: 'DELETE',
    path: '/api/session',
    summary: 'Sign out: the session ends everywhere it was used.',
    who: 'public',
    answer: null,
    status: 204,
  }),
};
