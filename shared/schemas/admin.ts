import { z } from 'zod';
import { timeZoneSchema } from './class.ts';
import { emailSchema, personName } from './people.ts';

export const schoolSettingsSchema = z.object({
  name: z.string().trim().min(1, 'Write the name of the school.').max(120),
  timeZone: timeZoneSchema,
  standingsAllowed: z.boolean(),
});
export type SchoolSettings = z.infer<typeof schoolSettingsSchema>;

export const staffInvitationSchema = z.object({
  name: personName('Write a name.'),
  email: emailSchema,
  role: z.enum(['teacher', 'admin']),
});
export const personStateSchema = z.object({
  disabled: z.boolean(),
  reason: z.string().trim().min(1, 'Say why.').max(300),
});
export const trailQuerySchema = z.object({
  before: z.iso.datetime().optional(),
  search: z.string().trim().max(80).optional(),
});
export const peopleQuerySchema = z.object({ search: z.string().trim().max(80).default('') });

export interface PersonAnswer {
  readonly id: string;
  readonly name: string;
  readonly role: 'admin' | 'teacher' | 'student';
  readonly email: string | null;
  readonly userName: string | null;
  readonly disabled: boolean;
  readonly classes: readonly string[];
}

export interface TrailAnswer {
  readonly entries: readonly {
    id: string;
    at: string;
    actor: string | null;
    action: string;
    objectKind: string;
    before: unknown;
    after: unknown;
    reason: string;
  }[];
  readonly more: boolean;
}

export interface MailStateAnswer {
  readonly waiting: number;
  readonly failed: readonly { id: string; kind: string; createdAt: string; attempts: number; lastError: string }[];
}
