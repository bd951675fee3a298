import { SignInForm } from '@/contracts/session';
import { errorFor, readFormAs, typedText, type FormResult } from '../http/form';
import { REFUSALS, type Refusal } from '../refusal';
import type { Runtime } from '../runtime';
import { readHalf, sealHalf } from './half-sign-in';
import { checkAccount, checkCode, openSession, type Account } from './sign-in';

/** What the sign-in page shows next. */
export type SignInStep = {
  step: 'password' | 'code';
  status: number;
  /** What was typed; a password is never sent back. */
  email: string;
  /** The sealed note of the first step, for the second. */
  note: string;
  problem?: string | undefined;
  errors: Record<string, string | undefined>;
  retryAfter?: number | undefined;
};
type About = { address: string; formerCookie: string | undefined; requestId: string };

/** The page as it is first opened. */
export const FIRST_STEP: SignInStep = {
  step: 'password',
  status: 200,
  email: '',
  note: '',
  errors: {},
};

const refused = (shown: SignInStep, refusal: Refusal): SignInStep => ({
  ...shown,
  status: REFUSALS[refusal.kind].status,
  retryAfter: refusal.retryAfter,
  ...(refusal.errors ? { errors: { totp: refusal.reason } } : { problem: refusal.reason }),
});

const unread = (form: Extract<FormResult<unknown>, { ok: false }>): SignInStep => ({
  step: form.typed['step'] === 'code' ? 'code' : 'password',
  status: form.status,
  email: typedText(form.typed, 'email'),
  note: typedText(form.typed, 'note').slice(0, 1000),
  problem: form.errors.length > 0 ? undefined : form.reason,
  errors: {
    email: errorFor(form.errors, 'email'),
    password: errorFor(form.errors, 'password'),
    totp: errorFor(form.errors, 'totp'),
  },
});

/** Reads the sign-in form: the `Set-Cookie` values once somebody is in, else what the page shows next. */
export async function signInByForm(
  app: Runtime,
  request: Request,
  about: About,
  now: Date,
): Promise<{ cookies: string[] } | SignInStep> {
  const form = await readFormAs(request, SignInForm);
  if (!form.ok) return unread(form);
  const given = form.value;
  const asker = { request, address: about.address, requestId: about.requestId };
  let account: Account | null;
  let shown: SignInStep = FIRST_STEP;
  if (given.step === 'password') {
    shown = { ...FIRST_STEP, email: given.email };
    const known = await checkAccount(app, given, asker, now);
    if (!known.ok) return refused(shown, known);
    account = known.value;
    if (account.totpSecret !== null)
      return { ...FIRST_STEP, step: 'code', note: sealHalf(app, account, now) };
  } else {
    shown = { ...FIRST_STEP, step: 'code', note: given.note };
    account = await readHalf(app, given.note, now);
    if (!account)
      return { ...FIRST_STEP, status: 401, problem: 'Five minutes are over: sign in again.' };
    const right = await checkCode(app, account, given.totp, asker, now);
    if (!right.ok) return refused(shown, right);
  }
  const opened = await openSession(app, account, { ...about, request }, now);
  return opened.ok ? { cookies: opened.value } : refused(FIRST_STEP, opened);
}
