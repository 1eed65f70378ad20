import { createHash } from 'node:crypto';
import { DrizzleSQLiteAdapter } from '@lucia-auth/adapter-drizzle';
import { eq } from 'drizzle-orm';
import { generateIdFromEntropySize, Lucia, TimeSpan } from 'lucia';
import { sessions, users } from '../db/schema/people.ts';
import type { Deps } from '../deps.ts';

const DAY_MS = 86_400_000;
/** Two weeks without a visit end a session; two months end it whatever happens. Common practice, no source. */
export const IDLE_DAYS = 14;
export const ABSOLUTE_DAYS = 60;
/** How often a visit is written down: often enough for the idle limit, seldom enough to leave reads reads. */
const VISIT_MS = 3_600_000;
/** 25 random bytes, 200 bits. */
const TOKEN_BYTES = 25;

type SessionAttributes = { createdAt: number; lastSeenAt: number };
type UserAttributes = { email: string; name: string };

declare module 'lucia' {
  interface Register {
    Lucia: Lucia<SessionAttributes, UserAttributes>;
    DatabaseSessionAttributes: SessionAttributes;
    DatabaseUserAttributes: UserAttributes & { passwordHash: string; createdAt: string };
  }
}

export type SignedIn = { user: { id: string; name: string; email: string }; sessionId: string };

export type Sessions = {
  /** Opens a session; the value of `Set-Cookie`. Any session the old cookie names ends. */
  open(userId: string, oldCookie: string | null): Promise<string>;
  /** Who the cookie belongs to; `setCookie` is set where its date moved on. */
  read(cookie: string | null): Promise<(SignedIn & { setCookie: string | null }) | null>;
  close(sessionId: string): Promise<void>;
  /** Ends all sessions of a user. */
  closeAll(userId: string): Promise<void>;
  /** The `Set-Cookie` that takes the cookie away. */
  blank(): string;
};

/** The library keeps ids in clear; what it is given as an id is the hash of the token, and only the browser has the token. */
function idOf(token: string): string {
  return createHash('sha256').update(token).digest('hex');
}

/** Sessions over the lucia library, which no other file knows. */
export function createSessions({ db, clock, settings }: Pick<Deps, 'db' | 'clock' | 'settings'>): Sessions {
  const lucia = new Lucia<SessionAttributes, UserAttributes>(new DrizzleSQLiteAdapter(db, sessions, users), {
    sessionExpiresIn: new TimeSpan(IDLE_DAYS, 'd'),
    sessionCookie: {
      name: settings.https ? '__Host-gablebook' : 'gablebook',
      attributes: { secure: settings.https, sameSite: 'lax', path: '/' },
    },
    getSessionAttributes: ({ createdAt, lastSeenAt }) => ({ createdAt, lastSeenAt }),
    getUserAttributes: ({ email, name }) => ({ email, name }),
  });
  const tokenIn = (cookie: string | null) => (cookie === null ? null : lucia.readSessionCookie(cookie));

  return {
    async open(userId, oldCookie) {
      const old = tokenIn(oldCookie);
      if (old !== null) await lucia.invalidateSession(idOf(old));
      const token = generateIdFromEntropySize(TOKEN_BYTES);
      const now = clock().getTime();
      await lucia.createSession(userId, { createdAt: now, lastSeenAt: now }, { sessionId: idOf(token) });
      return lucia.createSessionCookie(token).serialize();
    },

    async read(cookie) {
      const token = tokenIn(cookie);
      if (token === null || token === '') return null;
      const { user, session } = await lucia.validateSession(idOf(token));
      if (session === null) return null;
      const now = clock().getTime();
      const tooIdle = now - session.lastSeenAt > IDLE_DAYS * DAY_MS;
      const tooOld = now - session.createdAt > ABSOLUTE_DAYS * DAY_MS;
      if (tooIdle || tooOld) {
        await lucia.invalidateSession(session.id);
        return null;
      }
      if (now - session.lastSeenAt > VISIT_MS) {
        db.update(sessions).set({ lastSeenAt: now }).where(eq(sessions.id, session.id)).run();
      }
      return {
        user: { id: user.id, name: user.name, email: user.email },
        sessionId: session.id,
        setCookie: session.fresh ? lucia.createSessionCookie(token).serialize() : null,
      };
    },

    close: (sessionId) => lucia.invalidateSession(sessionId),
    closeAll: (userId) => lucia.invalidateUserSessions(userId),
    blank: () => lucia.createBlankSessionCookie().serialize(),
  };
}
