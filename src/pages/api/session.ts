import { sessionRoutes } from '@/contracts/session';
import { checkAccount, checkCode, openSession } from '@/server/auth/sign-in';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';

export const POST = serve(sessionRoutes.signIn, async (call) => {
  const { app, body, address, now, requestId, sessionCookie } = call;
  const known = await checkAccount(app, body, address);
  if (!known.ok) return known;
  const account = await checkCode(app, known.value, body.totp, now);
  if (!account.ok) return account;
  const cookie = await openSession(
    app,
    account.value,
    { formerCookie: sessionCookie, requestId },
    now,
  );
  return cookie.ok ? done({ json: null, headers: { 'set-cookie': cookie.value } }) : cookie;
});

export const DELETE = serve(sessionRoutes.signOut, async ({ app, sessionCookie }) =>
  done({ json: null, headers: { 'set-cookie': await app.sessions.end(sessionCookie) } }),
);
