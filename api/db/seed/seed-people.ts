import type { DataSource } from 'typeorm';
import { hashPassword } from '../../features/people/passwords.ts';
import { School, User } from '../../features/people/people.entity.ts';
import { DEMO_PASSWORD, DEMO_SCHOOL, type DemoPerson } from './cast.ts';
import { idOf, type Actor } from './seed-world.ts';

/** The school and its people's accounts, as they have had them for some time. */
export async function openSchool(db: DataSource, createdAt: Date): Promise<School> {
  const schools = db.getRepository(School);
  return await schools.save(schools.create({ ...DEMO_SCHOOL, createdAt }));
}

/** Accounts for these people; hashing one password once, because argon2 is slow on purpose. */
export async function openAccounts<Person extends DemoPerson>(
  db: DataSource,
  school: School,
  people: readonly Person[],
  createdAt: Date,
): Promise<Actor<Person>[]> {
  const passwordHash = await (hashed ??= hashPassword(DEMO_PASSWORD));
  const rows = people.map(({ name, role, signInName }) => ({
    id: idOf('person', signInName),
    schoolId: school.id,
    role,
    name,
    email: signInName.includes('@') ? signInName : null,
    userName: signInName.includes('@') ? null : signInName,
    passwordHash,
    createdAt,
  }));
  await db.getRepository(User).insert(rows);
  return people.map((person, i) => ({
    person,
    viewer: { userId: rows[i]?.id ?? '', schoolId: school.id, role: person.role, sessionId: 'demo' },
  }));
}
let hashed: Promise<string> | undefined;
