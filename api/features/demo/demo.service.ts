import { In, type DataSource } from 'typeorm';
import type { TodayAnswer } from '../../../shared/schemas/today.ts';
import { DEMO_ACCOUNTS, DEMO_PASSWORD, DEMO_SCHOOL } from '../../db/seed/cast.ts';
import type { Viewer } from '../../http/route.ts';
import { Membership } from '../classes/classes.entity.ts';
import { User } from '../people/people.entity.ts';
import { sayWhat } from './say-what.ts';

/** A person whom anybody may try, and what there is to do for them now. */
export interface DemoAccount {
  readonly name: string;
  readonly signInName: string;
  readonly password: string;
  readonly what: string;
}

export interface DemoDeps {
  readonly db: DataSource;
  readonly getToday: (viewer: Viewer) => Promise<TodayAnswer>;
}
export type DemoService = ReturnType<typeof createDemoService>;

/** Whom one can try in the demo. Says for each what waits at this moment, so that it stays true while people play. */
export function createDemoService({ db, getToday }: DemoDeps) {
  return {
    /** Empty where the database holds no demo. */
    async listAccounts(): Promise<DemoAccount[]> {
      const people = await db.getRepository(User).find({ where: { school: { name: DEMO_SCHOOL.name } } });
      const known = new Map(people.map((person) => [person.email ?? person.userName, person]));
      const memberships = await db.getRepository(Membership).find({
        where: { userId: In(people.map(({ id }) => id)) },
        relations: { class: true },
      });
      const accounts: DemoAccount[] = [];
      for (const { signInName } of DEMO_ACCOUNTS) {
        const user = known.get(signInName);
        if (!user || user.disabledAt) continue;
        const places = memberships.filter(({ userId, removedAt }) => userId === user.id && removedAt === null);
        const { id: userId, schoolId, role, name } = user;
        const today = await getToday({ userId, schoolId, role, sessionId: 'demo' });
        accounts.push({ name, signInName, password: DEMO_PASSWORD, what: sayWhat(role, places, today) });
      }
      return accounts;
    },
  };
}
