import type { Runtime } from '../runtime';
import type { Actor } from './actor';
import { readApiToken } from './api-tokens';

export type Read = {
  actor: Actor | null;
  byToken: boolean;
  cookie: string | undefined;
  renewed: string | null;
};

/** Who asks: by bearer token when one is given (a wrong one is nobody), else by session cookie. */
export async function readActor(
  app: Runtime,
  request: Request,
  cookie: string | undefined,
  now: Date,
): Promise<Read> {
  const header = request.headers.get('authorization');
  if (header !== null) {
    const actor = await readApiToken(app.db, header, now);
    return { actor, byToken: true, cookie, renewed: null };
  }
  const { actor, renewed } = await app.sessions.read(cookie);
  return { actor, byToken: false, cookie, renewed };
}
