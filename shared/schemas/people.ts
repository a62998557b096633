import { z } from 'zod';

export const PASSWORD_MIN = 10;
export const PASSWORD_MAX = 200;

/** Letters that end a line or turn the direction of writing would let a name pose as the text around it. */
const PLAIN_TEXT = /^[^\p{Cc}\u2028\u2029\u202a-\u202e\u2066-\u2069]*$/u;
/** A person's name; `missing` is said where there is none. */
export const personName = (missing: string) =>
  z
    .string()
    .trim()
    .min(1, missing)
    .max(80, 'A name holds at most 80 characters.')
    .regex(PLAIN_TEXT, 'A name is written on one line, with letters that can be seen.');
const name = personName('Write your name.');
export const emailSchema = z
  .string()
  .trim()
  .toLowerCase()
  .max(200, 'An e-mail address holds at most 200 characters.')
  .pipe(z.email('Write an e-mail address, such as name@example.org.'));
export const userNameSchema = z
  .string()
  .trim()
  .toLowerCase()
  .regex(/^[a-z0-9][a-z0-9._-]{2,29}$/, 'A user name has 3 to 30 letters, digits, dots or dashes.');
/** Length counts code points; no rules on composition (NIST SP 800-63B, OWASP ASVS 6.2). */
export const newPasswordSchema = z
  .string()
  .refine(
    (value) => [...value].length >= PASSWORD_MIN,
    `A password has at least ${PASSWORD_MIN} characters; a few words in a row do well.`,
  )
  .refine((value) => [...value].length <= PASSWORD_MAX, `A password has at most ${PASSWORD_MAX} characters.`);
const password = z.string().min(1, 'Write your password.').max(1000);
export const classCodeSchema = z
  .string()
  .trim()
  .toUpperCase()
  .transform((value) => value.replace(/[\s-]/g, ''))
  .pipe(z.string().regex(/^[A-Z0-9]{10}$/, 'A class code has 10 letters and digits.'));

export const signInSchema = z.object({
  /** E-mail address or user name. */
  name: z.string().trim().toLowerCase().min(1, 'Write your e-mail address or user name.').max(200),
  password,
});
export type SignIn = z.infer<typeof signInSchema>;

/** Asking to join by e-mail: a link is mailed. */
export const signUpByMailSchema = z.object({ code: classCodeSchema, email: emailSchema });
/** Asking to join a class that has no e-mail. */
export const signUpByNameSchema = z.object({
  code: classCodeSchema,
  name,
  userName: userNameSchema,
  password: newPasswordSchema,
});
export const joinByCodeSchema = z.object({ code: classCodeSchema });

export const acceptInvitationSchema = z.object({
  name,
  /** Only where the invitation has no e-mail address. */
  userName: userNameSchema.optional(),
  password: newPasswordSchema,
});

export const resetRequestSchema = z.object({ email: emailSchema });
export const newPasswordFormSchema = z.object({ password: newPasswordSchema });
/** The one-day code that a teacher hands over. */
export const signInCodeSchema = z.object({
  name: z.string().trim().toLowerCase().min(1, 'Write your user name or e-mail address.').max(200),
  code: classCodeSchema,
  password: newPasswordSchema,
});

export const changePasswordSchema = z.object({ current: password, password: newPasswordSchema });
export const changeEmailSchema = z.object({ email: emailSchema, password });
export const changeNameSchema = z.object({ name });

export interface ViewerAnswer {
  readonly user: {
    id: string;
    name: string;
    role: 'admin' | 'teacher' | 'student';
    email: string | null;
    userName: string | null;
  };
  readonly school: { id: string; name: string };
  readonly classes: readonly {
    id: string;
    name: string;
    timeZone: string;
    role: 'teacher' | 'assistant' | 'student';
    alias: string | null;
  }[];
}

export interface InvitationAnswer {
  readonly schoolName: string;
  readonly className: string | null;
  readonly role: 'admin' | 'teacher' | 'assistant' | 'student';
  readonly name: string;
  readonly email: string | null;
  readonly asksToJoin: boolean;
  /** An account with this address exists already: sign in to accept. */
  readonly hasAccount: boolean;
}
