import { DEMO_SCHOOL, type DemoPerson, type DemoStudent } from './cast.ts';
import type { Actor, SeedWorld } from './seed-world.ts';

export interface SeededClass {
  readonly id: string;
  readonly teacher: Actor<DemoPerson>;
  readonly students: readonly Actor<DemoStudent>[];
}

export interface ClassPlan {
  readonly name: string;
  readonly hasEmail: boolean;
  readonly teacher: Actor<DemoPerson>;
  readonly assistants: readonly Actor<DemoPerson>[];
  readonly students: readonly Actor<DemoStudent>[];
  /** Shown by no list. */
  readonly optedOut: readonly string[];
}

/** The teacher makes a class and invites everybody; all accept, and choose their aliases. */
export async function openClass(world: SeedWorld, plan: ClassPlan): Promise<SeededClass> {
  const { teacher, students } = plan;
  const { id } = await world.call<{ id: string }>(teacher.viewer, 'post', '/classes', {
    name: plan.name,
    timeZone: DEMO_SCHOOL.timeZone,
    hasEmail: plan.hasEmail,
  });
  await invite(world, id, teacher, 'assistant', plan.assistants);
  await invite(world, id, teacher, 'student', students);
  for (const { viewer, person } of students) {
    await world.call(viewer, 'put', `/classes/${id}/alias`, { alias: person.alias });
    if (plan.optedOut.includes(person.name)) {
      await world.call(viewer, 'put', `/classes/${id}/standings/opt-out`, { optOut: true });
    }
  }
  return { id, teacher, students };
}

async function invite(
  world: SeedWorld,
  classId: string,
  teacher: Actor<DemoPerson>,
  role: 'assistant' | 'student',
  people: readonly Actor<DemoPerson>[],
): Promise<void> {
  if (people.length === 0) return;
  // Without addresses, because a link that is mailed is told to nobody but its reader.
  const lines = people.map(({ person: { name } }) => ({ name }));
  const { links } = await world.call<{ links: { token: string }[] }>(
    teacher.viewer,
    'post',
    `/classes/${classId}/invitations`,
    { role, people: lines },
  );
  for (const [i, { viewer }] of people.entries()) {
    await world.call(viewer, 'post', `/invitations/${links[i]?.token ?? ''}/accept`);
  }
}
