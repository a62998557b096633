import type { DataSource } from 'typeorm';
import type { Platform } from '../services.ts';
import { recordAudit } from '../features/audit/record.ts';
import { School } from '../features/people/people.entity.ts';
import { ADMIN, DEMO_ACCOUNTS, DEMO_SCHOOL, ILSE, MIRA, STUDENTS_10C, STUDENTS_9A, TOBIAS } from './seed/cast.ts';
import { ROUNDS_10C, ROUNDS_9A, SPARE_TASKS_10C, SPARE_TASKS_9A } from './seed/class-plans.ts';
import { playRound } from './seed/play-round.ts';
import type { DemoTask } from './seed/demo-task.ts';
import type { RoundPlan } from './seed/round-plan.ts';
import { openClass, type ClassPlan } from './seed/seed-class.ts';
import { postLetters } from './seed/seed-mail.ts';
import { openAccounts, openSchool } from './seed/seed-people.ts';
import { instantOf } from './seed/seed-times.ts';
import { createSeedWorld } from './seed/seed-world.ts';

/** Any number that is ours alone: two processes that start together must not seed at once. */
const SEED_LOCK = 4_600_002;

/** How long the school has been there. */
const FIRST_DAY = { day: -60, hour: 9 };

/**
 * Fills an empty database with the demo: the product itself is played through two months, with a clock that is set.
 * A seeding that was broken off is cleared away and done again. Answers whether anything was done.
 */
export async function seedDemo(platform: Platform): Promise<boolean> {
  const { db } = platform;
  const holder = db.createQueryRunner();
  try {
    await holder.query('select pg_advisory_lock($1)', [SEED_LOCK]);
    if (!(await isToBeSeeded(db))) return false;
    await clearBrokenOff(db);
    await seed(platform);
    return true;
  } finally {
    await holder.query('select pg_advisory_unlock($1)', [SEED_LOCK]);
    await holder.release();
  }
}

async function seed(platform: Platform): Promise<void> {
  const { db } = platform;
  const present = platform.now();
  const firstDay = instantOf(present, DEMO_SCHOOL.timeZone, FIRST_DAY);
  const school = await openSchool(db, firstDay);
  const [[admin], [mira], [ilse], [tobias], older, younger] = await Promise.all([
    openAccounts(db, school, [ADMIN], firstDay),
    openAccounts(db, school, [MIRA], firstDay),
    openAccounts(db, school, [ILSE], firstDay),
    openAccounts(db, school, [TOBIAS], firstDay),
    openAccounts(db, school, STUDENTS_10C, firstDay),
    openAccounts(db, school, STUDENTS_9A, firstDay),
  ]);
  if (!admin || !mira || !ilse || !tobias) throw new Error('Somebody has no account');
  // Two worlds side by side, because the classes have nothing to do with each other.
  await Promise.all([
    playClass(
      platform,
      { name: '10C', hasEmail: true, teacher: mira, assistants: [tobias], students: older, optedOut: ['Vy Truong'] },
      ROUNDS_10C,
      SPARE_TASKS_10C,
    ),
    playClass(
      platform,
      { name: '9A', hasEmail: false, teacher: ilse, assistants: [], students: younger, optedOut: [] },
      ROUNDS_9A,
      SPARE_TASKS_9A,
    ),
  ]);
  await makeStandings(platform);
  await postLetters(
    db,
    platform.config.smtpUrl === null ? platform.queue : null,
    DEMO_ACCOUNTS.map(({ signInName }) => signInName),
    present,
  );
  await recordAudit(db.manager, {
    schoolId: school.id,
    actorId: null,
    at: present,
    action: 'demo.seeded',
    objectKind: 'school',
    objectId: school.id,
  });
}

async function playClass(
  platform: Platform,
  plan: ClassPlan,
  rounds: readonly RoundPlan[],
  spareTasks: readonly DemoTask[],
): Promise<void> {
  const world = await createSeedWorld(platform, platform.now());
  const time = (day: number, hour: number) => instantOf(world.present, DEMO_SCHOOL.timeZone, { day, hour });
  const of = await world.clock.at(time(-58, 11), () => openClass(world, plan));
  const write = async ({ form }: DemoTask, at: Date) =>
    await world.clock.at(at, () => world.call<{ id: string }>(plan.teacher.viewer, 'post', '/tasks', form));
  for (const [i, task] of spareTasks.entries()) await write(task, time(-56 + i, 16));
  for (const [i, round] of rounds.entries()) {
    const { id } = await write(round.task, time(-54 + i, 16));
    await playRound(world, of, round, id);
  }
  await world.clock.at(time(-2, 15), () => world.call(plan.teacher.viewer, 'post', `/classes/${of.id}/term`));
}

/** The weekly sheets of the last weeks, each on the first day on which the rules let it be made. */
async function makeStandings(platform: Platform): Promise<void> {
  const world = await createSeedWorld(platform, platform.now());
  for (let day = -15; day <= 0; day += 1) {
    const at = instantOf(world.present, DEMO_SCHOOL.timeZone, { day, hour: 7.4 });
    if (at < world.present) await world.clock.at(at, () => world.runJob('standings-sheets'));
  }
}

/** Nothing is there, or only what a broken-off seeding has left. */
async function isToBeSeeded(db: DataSource): Promise<boolean> {
  const schools = await db.getRepository(School).find({ take: 2 });
  const [only] = schools;
  if (!only) return true;
  if (schools.length > 1 || only.name !== DEMO_SCHOOL.name) return false;
  const done: unknown[] = await db.query(`select 1 from audit_entry where action = 'demo.seeded' limit 1`);
  return done.length === 0;
}

async function clearBrokenOff(db: DataSource): Promise<void> {
  await db.getRepository(School).delete({ name: DEMO_SCHOOL.name });
  await db.query('delete from outgoing_mail');
  await db.query(`delete from pgboss.job where name in ('round-due', 'round-reminder', 'send-mail')`);
}
