import { z } from 'zod';
import { isAlias } from '../lib/aliases.ts';
import { emailSchema, personName, userNameSchema } from './people.ts';

function isTimeZone(zone: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: zone });
    return true;
  } catch {
    return false;
  }
}

export const timeZoneSchema = z.string().refine(isTimeZone, 'Choose a time zone, such as Europe/Vienna.');
const className = z
  .string()
  .trim()
  .min(1, 'Give the class a name.')
  .max(60, 'A class name holds at most 60 characters.');

export const newClassSchema = z.object({
  name: className,
  timeZone: timeZoneSchema,
  hasEmail: z.boolean().default(true),
});
export const classSettingsSchema = z
  .object({
    name: className,
    timeZone: timeZoneSchema,
    hasEmail: z.boolean(),
    joinOpen: z.boolean(),
    standingsOn: z.boolean(),
    assistantsSeeNames: z.boolean(),
  })
  .partial();

export const personLineSchema = z.object({
  name: personName('A name is missing.'),
  email: emailSchema.optional(),
  userName: userNameSchema.optional(),
});
export type PersonLine = z.infer<typeof personLineSchema>;

export const invitationsSchema = z.object({
  role: z.enum(['teacher', 'assistant', 'student']),
  people: z.array(personLineSchema).min(1, 'Name at least one person.').max(200, 'At most 200 people at once.'),
});
export const rosterCsvSchema = z.object({
  csv: z.string().min(1, 'The file is empty.').max(200_000, 'The file is larger than 200 kB.'),
});

export const decideSchema = z.object({ accept: z.boolean() });
export const memberRoleSchema = z.object({ role: z.enum(['teacher', 'assistant', 'student']) });
export const conflictPairSchema = z.object({
  firstId: z.uuid(),
  secondId: z.uuid(),
  note: z.string().max(300).default(''),
});
export const aliasSchema = z.object({
  alias: z.string().refine(isAlias, 'Choose one of the aliases that are offered.'),
});

/** A line of a class list that could not be read. */
export interface RosterProblem {
  readonly line: number;
  readonly detail: string;
}

export interface ClassListItem {
  readonly id: string;
  readonly name: string;
  readonly timeZone: string;
  readonly role: 'teacher' | 'assistant' | 'student';
  readonly students: number | null;
  readonly waiting: number | null;
  readonly archived: boolean;
}

export interface MemberAnswer {
  readonly membershipId: string;
  readonly userId: string;
  readonly name: string;
  readonly email: string | null;
  readonly userName: string | null;
  readonly role: 'teacher' | 'assistant' | 'student';
  readonly alias: string | null;
  readonly joinedAt: string;
}

/** A class as its teacher sees it; names are null for assistants who may not see them. */
export interface ClassAnswer {
  readonly id: string;
  readonly name: string;
  readonly timeZone: string;
  readonly joinCode: string;
  readonly joinOpen: boolean;
  readonly hasEmail: boolean;
  readonly standingsOn: boolean;
  readonly standingsAllowed: boolean;
  readonly assistantsSeeNames: boolean;
  readonly members: readonly MemberAnswer[];
  readonly requests: readonly { id: string; name: string; createdAt: string }[];
  readonly invitations: readonly { id: string; name: string; email: string | null; role: string; expiresAt: string }[];
  readonly pairs: readonly { id: string; firstId: string; secondId: string; note: string }[];
  readonly roster: readonly { id: string; name: string; email: string | null; userName: string | null }[];
}

/** A class as a student or a nameless assistant sees it. */
export interface OwnPlaceAnswer {
  readonly id: string;
  readonly name: string;
  readonly timeZone: string;
  readonly role: 'assistant' | 'student';
  readonly alias: string | null;
  readonly aliasChangeable: boolean;
  readonly standingsOn: boolean;
  readonly standingsOptOut: boolean;
}
