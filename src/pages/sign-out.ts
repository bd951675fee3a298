import type { APIRoute } from 'astro';
import { FORGET } from '@/server/auth/sessions';

/** Ends the session of whoever asks, staff or customer, and goes to the front page. */
export const POST: APIRoute = async ({ locals }) =>
  new Response(null, {
    status: 303,
    headers: {
      location: '/',
      'set-cookie': await locals.app.sessions.end(locals.sessionCookie),
      ...FORGET,
    },
  });
