import * as z from 'zod/v4';
import { defineRoute } from './route';
import { Email } from './common';

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
