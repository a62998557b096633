import type { EntityManager } from 'typeorm';

/** What stands in a mail about a round. */
export interface RoundMailData {
  readonly name: string;
  readonly className: string;
  readonly taskTitle: string;
  readonly roundId: string;
  /** IANA name; instants are worded in it. */
  readonly timeZone: string;
}

/** Every kind of mail with the facts that its template needs. */
export interface MailDataOf {
  readonly invitation: {
    readonly name: string;
    readonly invitedBy: string;
    readonly schoolName: string;
    readonly className: string | null;
    readonly token: string;
  };
  readonly reset: { readonly name: string; readonly token: string; readonly hours: number };
  readonly 'email-change': { readonly name: string; readonly token: string };
  readonly 'email-changed': { readonly name: string };
  readonly 'email-in-use': Readonly<Record<string, never>>;
  /** The link that makes an account for somebody who typed the class code. */
  readonly 'sign-up': { readonly className: string; readonly token: string };
  /** To the owner of an address with which somebody tried to sign up again: sign in and join with the code. */
  readonly 'already-here': { readonly className: string };
  /** To the teacher: somebody asks to join. */
  readonly 'join-request': {
    readonly name: string;
    readonly asker: string;
    readonly className: string;
    readonly classId: string;
  };
  readonly 'join-accepted': { readonly name: string; readonly className: string };
  readonly 'writing-opened': RoundMailData & { readonly endsAt: Date };
  readonly 'reviewing-opened': RoundMailData & { readonly endsAt: Date };
  readonly 'review-due': RoundMailData & { readonly endsAt: Date };
  readonly 'findings-to-answer': RoundMailData & { readonly derivationId: string; readonly endsAt: Date };
  readonly 'round-settled': RoundMailData;
  readonly 'ruling-after-settling': RoundMailData;
  /** The teacher asks the author of a settled derivation something. */
  readonly 'author-asked': RoundMailData & { readonly derivationId: string };
}
export type MailKind = keyof MailDataOf;

export type MailOrder = {
  [Kind in MailKind]: {
    readonly kind: Kind;
    /** null: nobody of ours. */
    readonly userId: string | null;
    /** Absent: the person's own address; nothing is sent to a person who has none. */
    readonly to?: string;
    readonly data: MailDataOf[Kind];
    /** Two orders with one key are one mail. */
    readonly dedupeKey?: string;
  };
}[MailKind];

/** Writes the mail, and the job that sends it, in the caller's transaction. */
export type QueueMail = (manager: EntityManager, order: MailOrder) => Promise<void>;
