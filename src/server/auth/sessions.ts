/** Sessions by lucia over MariaDB. The cookie holds the secret; the table holds its hash. */
import { DrizzleMySQLAdapter } from '@lucia-auth/adapter-drizzle';
import { Lucia, TimeSpan, type Adapter, type DatabaseSession } from 'lucia';
import type { Database } from '@/db/client';
import { sessions, users } from '@/db/schema/people';
import type { Role } from '@/domain/people';
import type { Actor } from './actor';
import { hashSecret, newSecret } from './secrets';

declare module 'lucia' {
  interface Register {
    Lucia: SessionKeeper['lucia'];
    UserId: number;
    DatabaseSessionAttributes: { ticketId: number | null };
    DatabaseUserAttributes: {
      email: string;
      name: string;
      role: Role;
      customerId: number | null;
      disabledAt: Date | null;
    };
  }
}

/** Hashes session ids on their way to the table, and gives the caller back the id it knows. */
function hashing(inner: Adapter): Adapter {
  const known = (session: DatabaseSession | null, id: string) =>
    session ? { ...session, id } : null;
  return {
    deleteSession: (id) => inner.deleteSession(hashSecret(id)),
    deleteUserSessions: (userId) => inner.deleteUserSessions(userId),
    async getSessionAndUser(id) {
      const [session, user] = await inner.getSessionAndUser(hashSecret(id));
      return [known(session, id), user];
    },
    getUserSessions: (userId) => inner.getUserSessions(userId),
    setSession: (session) => inner.setSession({ ...session, id: hashSecret(session.id) }),
    updateSessionExpiration: (id, at) => inner.updateSessionExpiration(hashSecret(id), at),
    deleteExpiredSessions: () => inner.deleteExpiredSessions(),
  };
}

const COOKIE = 'mw_session';

/** With the end of a session: the browser lets go of the photos and pages it kept. */
export const FORGET = { 'clear-site-data': '"cache"' } as const;

export type SessionKeeper = ReturnType<typeof sessionKeeper>;

/** Opens, reads and ends sessions. */
export function sessionKeeper(db: Database, secureCookies: boolean) {
  const lucia = new Lucia(
    hashing(new DrizzleMySQLAdapter(db, sessions, users) as unknown as Adapter),
    {
      sessionExpiresIn: new TimeSpan(2, 'w'),
      sessionCookie: {
        name: COOKIE,
        attributes: { secure: secureCookies, sameSite: 'lax', path: '/' },
      },
      getSessionAttributes: (a) => ({ ticketId: a.ticketId }),
      getUserAttributes: (a) => ({
        email: a.email,
        name: a.name,
        role: a.role,
        customerId: a.customerId,
        disabledAt: a.disabledAt,
      }),
    },
  );

  return {
    lucia,
    cookieName: COOKIE,

    /** The `Set-Cookie` value of a new session. A session by claim code sees `ticketId` alone. */
    async open(userId: number, ticketId: number | null = null): Promise<string> {
      const session = await lucia.createSession(userId, { ticketId }, { sessionId: newSecret() });
      return lucia.createSessionCookie(session.id).serialize();
    },

    /** Who the cookie stands for, and a renewed cookie when half its life is over. */
    async read(
      cookie: string | undefined,
    ): Promise<{ actor: Actor | null; renewed: string | null }> {
      if (!cookie || cookie.length > 100) return { actor: null, renewed: null };
      const { user, session } = await lucia.validateSession(cookie);
      if (!user || user.disabledAt) return { actor: null, renewed: null };
      const renewed = session.fresh ? lucia.createSessionCookie(session.id).serialize() : null;
      if (user.role === 'customer') {
        if (user.customerId === null) return { actor: null, renewed: null };
        const { id, name, customerId } = user;
        const actor: Actor = {
          kind: 'customer',
          id,
          name,
          role: 'customer',
          customerId,
          ticketId: session.ticketId,
        };
        return { actor, renewed };
      }
      const { id, name, email, role } = user;
      return { actor: { kind: 'staff', id, name, email, role, scopes: null }, renewed };
    },

    /** Ends the session and returns the cookie that clears it. */
    async end(cookie: string | undefined): Promise<string> {
      if (cookie && cookie.length <= 100) await lucia.invalidateSession(cookie);
      return lucia.createBlankSessionCookie().serialize();
    },

    endAll: (userId: number) => lucia.invalidateUserSessions(userId),
    sweep: () => lucia.deleteExpiredSessions(),
  };
}
