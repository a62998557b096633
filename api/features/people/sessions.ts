import { Lucia, TimeSpan, type Adapter, type DatabaseSession } from 'lucia';
import { LessThan, type DataSource } from 'typeorm';
import type { Now } from '../../lib/clock.ts';
import { createToken, sha256 } from '../../lib/secrets.ts';
import type { Viewer } from '../../http/route.ts';
import { Session, User } from './people.entity.ts';

const IDLE_DAYS = 7;
const LONGEST_DAYS = 60;
const DAY_MS = 86_400_000;

declare module 'lucia' {
  interface Register {
    Lucia: Lucia<Record<never, never>, { schoolId: string; role: Viewer['role'] }>;
    DatabaseUserAttributes: { schoolId: string; role: Viewer['role'] };
    DatabaseSessionAttributes: { endsAt: Date; createdAt: Date; userAgent: string };
  }
}

export interface Sessions {
  /** Signs in; returns the token for the cookie. Only its hash is stored. */
  begin(userId: string, userAgent: string): Promise<string>;
  findViewer(token: string): Promise<Viewer | null>;
  end(sessionId: string): Promise<void>;
  endAll(userId: string): Promise<void>;
  sweep(): Promise<void>;
}

/** Sessions by Lucia over our own table; nothing else of the product knows Lucia. */
export function createSessions(db: DataSource, now: Now): Sessions {
  const lucia = new Lucia(createAdapter(db, now), {
    sessionExpiresIn: new TimeSpan(IDLE_DAYS, 'd'),
    getUserAttributes: ({ schoolId, role }) => ({ schoolId, role }),
  });
  return {
    async begin(userId, userAgent) {
      const token = createToken();
      const createdAt = now();
      const attributes = {
        createdAt,
        endsAt: new Date(createdAt.getTime() + LONGEST_DAYS * DAY_MS),
        userAgent: userAgent.slice(0, 200),
      };
      await lucia.createSession(userId, attributes, { sessionId: token });
      return token;
    },
    async findViewer(token) {
      const { user } = await lucia.validateSession(token);
      return user && { userId: user.id, schoolId: user.schoolId, role: user.role, sessionId: sha256(token) };
    },
    end: async (sessionId) => void (await db.getRepository(Session).delete({ id: sessionId })),
    endAll: (userId) => lucia.invalidateUserSessions(userId),
    sweep: () => lucia.deleteExpiredSessions(),
  };
}

/** Stores the SHA-256 of the id and reads no column of a person that a session does not need. */
function createAdapter(db: DataSource, now: Now): Adapter {
  const sessions = db.getRepository(Session);
  return {
    async getSessionAndUser(token) {
      const row = await sessions.findOneBy({ id: sha256(token) });
      if (!row || row.endsAt <= now()) return [null, null];
      const user = await db.getRepository(User).findOne({
        where: { id: row.userId },
        select: { id: true, schoolId: true, role: true, disabledAt: true },
      });
      if (!user || user.disabledAt) return [null, null];
      return [toLucia(row, token), { id: user.id, attributes: { schoolId: user.schoolId, role: user.role } }];
    },
    async getUserSessions(userId) {
      return (await sessions.findBy({ userId })).map((row) => toLucia(row, row.id));
    },
    async setSession({ id, userId, expiresAt, attributes }) {
      await sessions.insert({ id: sha256(id), userId, expiresAt, ...attributes });
    },
    updateSessionExpiration: async (token, expiresAt) =>
      void (await sessions.update({ id: sha256(token) }, { expiresAt })),
    deleteSession: async (token) => void (await sessions.delete({ id: sha256(token) })),
    deleteUserSessions: async (userId) => void (await sessions.delete({ userId })),
    async deleteExpiredSessions() {
      await sessions.delete({ expiresAt: LessThan(now()) });
      await sessions.delete({ endsAt: LessThan(now()) });
    },
  };
}

function toLucia(row: Session, id: string): DatabaseSession {
  const { endsAt, createdAt, userAgent } = row;
  return { id, userId: row.userId, expiresAt: row.expiresAt, attributes: { endsAt, createdAt, userAgent } };
}
