import type { DataSource, DeepPartial, EntityTarget, ObjectLiteral } from 'typeorm';
import { Class, Membership } from '../../api/features/classes/classes.entity.ts';
import { School, User } from '../../api/features/people/people.entity.ts';
import { Round } from '../../api/features/rounds/rounds.entity.ts';
import { Task } from '../../api/features/tasks/tasks.entity.ts';
import type { TestClock } from './test-clock.ts';

/** Each makes one valid row, with the parents it needs unless they are given, and answers it as stored. */
export interface Factories {
  school(values?: DeepPartial<School>): Promise<School>;
  user(role: User['role'], values?: DeepPartial<User>): Promise<User>;
  /** A class with its teacher and this many students. */
  classWith(options?: { students?: number; teacher?: User; values?: DeepPartial<Class> }): Promise<ClassWithPeople>;
  membership(of: Class, user: User, values?: DeepPartial<Membership>): Promise<Membership>;
  task(owner: User, values?: DeepPartial<Task>): Promise<Task>;
  /** A planned round: opens in one day, then two days for each stage. */
  round(of: Class, task: Task, values?: DeepPartial<Round>): Promise<Round>;
}

export interface ClassWithPeople {
  readonly class: Class;
  readonly teacher: User;
  readonly students: readonly User[];
}

export function createFactories(dataSource: DataSource, clock: TestClock): Factories {
  let count = 0;
  const next = () => (count += 1);

  async function save<T extends ObjectLiteral>(entity: EntityTarget<T>, values: NoInfer<DeepPartial<T>>): Promise<T> {
    const repository = dataSource.getRepository(entity);
    const row: T = repository.create(values);
    return await repository.save(row);
  }

  const create: Factories = {
    school: (values) => save(School, { name: `School ${next()}`, timeZone: 'Europe/Lisbon', ...values }),

    async user(role, values = {}) {
      const n = next();
      const schoolId = values.schoolId ?? (await create.school()).id;
      return await save(User, { role, name: `Person ${n}`, email: `person${n}@school.test`, ...values, schoolId });
    },

    async classWith({ students = 0, teacher: given, values = {} } = {}) {
      const teacher = given ?? (await create.user('teacher'));
      const { schoolId } = teacher;
      const made = await save(Class, {
        name: `Class ${next()}`,
        timeZone: 'Europe/Lisbon',
        joinCode: `JN${String(next()).padStart(8, 'Z')}`,
        aliasTermStartsAt: clock.now(),
        ...values,
        schoolId,
      });
      await create.membership(made, teacher);
      const people: User[] = [];
      for (let i = 0; i < students; i += 1) {
        const student = await create.user('student', { schoolId });
        await create.membership(made, student);
        people.push(student);
      }
      return { class: made, teacher, students: people };
    },

    async membership(of, user, values) {
      const role = user.role === 'student' ? 'student' : 'teacher';
      const alias = role === 'student' ? `Alias ${next()}` : null;
      return await save(Membership, { classId: of.id, userId: user.id, role, alias, ...values });
    },

    task: (owner, values) =>
      save(Task, {
        schoolId: owner.schoolId,
        ownerId: owner.id,
        title: `Task ${next()}`,
        given: '(x+2)(x-3)',
        goal: { kind: 'expanded' },
        assumptions: [],
        settings: {},
        ...values,
      }),

    round: (of, task, values) =>
      save(Round, {
        schoolId: of.schoolId,
        classId: of.id,
        taskId: task.id,
        number: next(),
        opensAt: daysFrom(clock.now(), 1),
        writingEndsAt: daysFrom(clock.now(), 3),
        reviewingEndsAt: daysFrom(clock.now(), 5),
        answeringEndsAt: daysFrom(clock.now(), 7),
        settlesAt: daysFrom(clock.now(), 9),
        createdById: task.ownerId,
        ...values,
      }),
  };
  return create;
}

function daysFrom(instant: Date, days: number): Date {
  return new Date(instant.getTime() + days * 86_400_000);
}
