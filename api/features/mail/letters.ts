import type { OptionalMailKind } from '../../../shared/schemas/mail.ts';
import type { MailDataOf, MailKind, RoundMailData } from './queue-mail.ts';

/** What a letter says, before it is set as text and as HTML. */
export interface LetterContent {
  readonly subject: string;
  readonly name: string | null;
  readonly paragraphs: readonly string[];
  readonly action?: { readonly label: string; readonly path: string };
  /** Said after the action, quietly. */
  readonly afterwards?: string;
}

type Writers = { readonly [Kind in MailKind]: (data: MailDataOf[Kind]) => LetterContent };

const NOT_ASKED = 'If you did not ask for this, nothing has changed and you need do nothing.';

const WRITERS: Writers = {
  invitation: ({ name, invitedBy, schoolName, className, token }) => ({
    subject: className ? `${invitedBy} invites you to ${className}` : `${invitedBy} invites you to ${schoolName}`,
    name,
    paragraphs: [
      className
        ? `${invitedBy} invites you to the class ${className} at ${schoolName}. On Slipstone you write derivations line by line and look for the first slip in those of others.`
        : `${invitedBy} invites you to work on Slipstone at ${schoolName}.`,
      'The link below is for you alone, and works once.',
    ],
    action: { label: 'Accept the invitation', path: `/join/${token}` },
  }),
  reset: ({ name, token, hours }) => ({
    subject: 'Choose a new password',
    name,
    paragraphs: [`Somebody, most likely you, asked for a new password. The link works once, within ${hours} hours.`],
    action: { label: 'Choose a new password', path: `/reset/${token}` },
    afterwards: NOT_ASKED,
  }),
  'email-change': ({ name, token }) => ({
    subject: 'Confirm your new address',
    name,
    paragraphs: [
      'You asked to use this address on Slipstone. It takes effect when you follow the link, within one day.',
    ],
    action: { label: 'Use this address', path: `/account/email/${token}` },
    afterwards: NOT_ASKED,
  }),
  'email-changed': ({ name }) => ({
    subject: 'Your address was changed',
    name,
    paragraphs: ['Your account now uses another address, and this one no longer signs you in.'],
    afterwards: 'If it was not you who changed it, tell your teacher today.',
  }),
  'email-in-use': () => ({
    subject: 'This address already has an account',
    name: null,
    paragraphs: [
      'Somebody tried to use this address for another account on Slipstone. It already has one, so nothing was changed.',
    ],
    action: { label: 'Sign in', path: '/signin' },
    afterwards: 'If it was you, sign in with this address; you can ask for a new password there.',
  }),
  'sign-up': ({ className, token }) => ({
    subject: `Make your account for ${className}`,
    name: null,
    paragraphs: [
      `This address was given with the code of the class ${className}. The link below makes your account and asks the teacher to let you in; it works once.`,
    ],
    action: { label: 'Make my account', path: `/join/${token}` },
    afterwards: 'If you do not know this class, you need do nothing.',
  }),
  'already-here': ({ className }) => ({
    subject: 'You already have an account',
    name: null,
    paragraphs: [
      `This address was given with the code of the class ${className}, and it already has an account. Sign in, and join the class with its code from there.`,
    ],
    action: { label: 'Sign in', path: '/signin' },
    afterwards: 'If it was not you, nothing has changed and you need do nothing.',
  }),
  'join-request': ({ name, asker, className, classId }) => ({
    subject: `${asker} asks to join ${className}`,
    name,
    paragraphs: [`${asker} has typed the code of ${className} and waits for you to accept or refuse.`],
    action: { label: 'Answer', path: `/classes/${classId}` },
  }),
  'join-accepted': ({ name, className }) => ({
    subject: `You are in ${className}`,
    name,
    paragraphs: [`Your teacher has accepted you into ${className}.`],
    action: { label: 'See what is due', path: '/' },
  }),
  'writing-opened': (data) => ({
    ...about(data, `Writing is open: ${data.taskTitle}`),
    paragraphs: [
      `A round of ${data.className} has opened. Write your derivation of “${data.taskTitle}” until ${when(data)}.`,
    ],
    action: { label: 'Write your derivation', path: `/rounds/${data.roundId}/write` },
  }),
  'reviewing-opened': (data) => ({
    ...about(data, `Reviewing is open: ${data.taskTitle}`),
    paragraphs: [
      `Derivations of “${data.taskTitle}” are waiting for your eye. Look for the first step that does not follow, until ${when(data)}.`,
    ],
    action: { label: 'Review', path: `/rounds/${data.roundId}` },
  }),
  'review-due': (data) => ({
    ...about(data, `Reviews are due: ${data.taskTitle}`),
    paragraphs: [
      `You have reviews of “${data.taskTitle}” (${data.className}) that are not handed in. Reviewing ends ${when(data)}.`,
    ],
    action: { label: 'Finish reviewing', path: `/rounds/${data.roundId}` },
  }),
  'findings-to-answer': (data) => ({
    ...about(data, `Findings on your derivation: ${data.taskTitle}`),
    paragraphs: [
      `Classmates have looked at your derivation of “${data.taskTitle}” (${data.className}). Read what they found, and accept or contest each finding until ${when(data)}.`,
    ],
    action: { label: 'Answer the findings', path: `/derivations/${data.derivationId}` },
  }),
  'round-settled': (data) => ({
    ...about(data, `Settled: ${data.taskTitle}`),
    paragraphs: [
      `The round on “${data.taskTitle}” (${data.className}) is settled, with all rulings. See the verdict on your derivation and what your findings earned.`,
      'A verdict or points can be contested for a week.',
    ],
    action: { label: 'See the verdict', path: `/rounds/${data.roundId}` },
  }),
  'ruling-after-settling': (data) => ({
    ...about(data, `A ruling has changed: ${data.taskTitle}`),
    paragraphs: [
      `Your teacher has ruled on the settled round “${data.taskTitle}” (${data.className}). The verdict or points you see may have changed.`,
    ],
    action: { label: 'See the ruling', path: `/rounds/${data.roundId}` },
  }),
  'author-asked': (data) => ({
    ...about(data, `Your teacher asks: ${data.taskTitle}`),
    paragraphs: [
      `About your derivation on “${data.taskTitle}” (${data.className}) something is contested, and your teacher asks you about it before ruling.`,
    ],
    action: { label: 'Read and answer', path: `/derivations/${data.derivationId}` },
  }),
};

/** The kinds that nobody needs for their account, in people's words; they can be switched off. */
export const OPTIONAL_KINDS = {
  'join-request': 'Somebody asks to join a class of yours',
  'writing-opened': 'Writing has opened',
  'reviewing-opened': 'Reviewing has opened',
  'review-due': 'A review is due',
  'findings-to-answer': 'Findings to answer',
  'round-settled': 'A round is settled',
  'ruling-after-settling': 'A ruling after settling',
  'author-asked': 'Your teacher asks about your derivation',
} as const satisfies Record<OptionalMailKind, string>;

export function isOptionalKind(kind: string): kind is OptionalMailKind {
  return Object.hasOwn(OPTIONAL_KINDS, kind);
}

/** Words one letter from its facts. */
export function writeLetter<Kind extends MailKind>(kind: Kind, data: MailDataOf[Kind]): LetterContent {
  return WRITERS[kind](data);
}

function about({ name }: RoundMailData, subject: string): Pick<LetterContent, 'subject' | 'name'> {
  return { subject, name };
}

function when({ endsAt, timeZone }: RoundMailData & { readonly endsAt: Date }): string {
  const day = new Intl.DateTimeFormat('en-GB', { timeZone, weekday: 'long', day: 'numeric', month: 'long' }).format(
    endsAt,
  );
  const time = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    hour: '2-digit',
    minute: '2-digit',
    timeZoneName: 'short',
  }).format(endsAt);
  return `${day}, ${time}`;
}
