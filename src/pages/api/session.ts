import { sessionRoutes } from '@/contracts/session';
import { checkAccount, checkCode, openSession } from '@/server/auth/sign-in';
import { FORGET } from '@/server/auth/sessions';
import { serve } from '@/server/http/endpoint';
import { done } from '@/server/refusal';

export const POST = serve(sessionRoutes.signIn, async (call) => {
  const { app, body, address, now, request, requestId, sessionCookie } = call;
  const asker = { request, address, requestId };
  const known = await checkAccount(app, body, asker, now);
  if (!known.ok) return known;
  const account = await checkCode(app, known.value, body.totp, asker, now);
  if (!account.ok) return account;
  const about = { formerCookie: sessionCookie, request, requestId };
  const opened = await openSession(app, account.value, about, now);
  if (!opened.ok) return opened;
  const headers = new Headers();
  for (const cookie of opened.value) headers.append('set-cookie', cookie);
  return done({ json: null, headers });
});

export const DELETE = serve(sessionRoutes.signOut, async ({ app, sessionCookie }) =>
  done({
    json: null,
    headers: { 'set-cookie': await app.sessions.end(sessionCookie), ...FORGET },
  }),
);
