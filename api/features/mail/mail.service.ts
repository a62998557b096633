import type { OptionalMailKind } from '../../../shared/schemas/mail.ts';
import type { DataSource, EntityManager } from 'typeorm';
import type { Viewer } from '../../http/route.ts';
import { notFound } from '../../http/problem-error.ts';
import type { Now } from '../../lib/clock.ts';
import type { Mailer } from '../../lib/mailer.ts';
import type { Queue } from '../../lib/queue.ts';
import { User } from '../people/people.entity.ts';
import { toHtml, toText } from './letter-layout.ts';
import { isOptionalKind, OPTIONAL_KINDS, writeLetter, type LetterContent } from './letters.ts';
import { MailPreference, OutgoingMail } from './mail.entity.ts';
import type { MailOrder } from './queue-mail.ts';
import { readUnsubscribeToken, toUnsubscribeToken, type Unsubscription } from './unsubscribe-token.ts';

export interface MailDeps {
  readonly db: DataSource;
  readonly now: Now;
  readonly queue: Queue;
  readonly mailer: Mailer;
  readonly baseUrl: string;
  readonly secret: string;
}

export const SEND_MAIL = 'send-mail';

const KEPT_DAYS = 90;

export type MailService = ReturnType<typeof createMailService>;

/** The outbox: letters are written with what causes them, and leave by a job. */
export function createMailService(deps: MailDeps) {
  const { db, now, queue } = deps;
  return {
    async queueMail(manager: EntityManager, order: MailOrder): Promise<void> {
      const recipient = await findRecipient(manager, order);
      if (!recipient) return;
      const row = toRow(order, recipient, deps);
      const inserted = await manager
        .createQueryBuilder()
        .insert()
        .into(OutgoingMail)
        .values(row)
        .orIgnore()
        .returning('id')
        .execute();
      const [made] = inserted.raw as { id: string }[];
      if (made) await queue.enqueueInTransaction(manager, SEND_MAIL, { mailId: made.id }, { key: made.id });
    },

    /**
     * Hands one letter to the mail server. Safe to repeat: a letter that has left is locked and skipped, and the
     * Message-ID stays the same should we die between sending and noting it.
     */
    async sendMail(mailId: string): Promise<void> {
      try {
        await db.transaction((manager) => sendLocked(manager, mailId, deps));
      } catch (error) {
        await db.query('update outgoing_mail set attempts = attempts + 1, last_error = $2 where id = $1', [
          mailId,
          String(error).slice(0, 500),
        ]);
        throw error;
      }
    },

    /** Who a link from a letter is about, or 404. */
    readUnsubscription(token: string): { kind: OptionalMailKind; words: string } {
      const { kind } = getUnsubscription(deps.secret, token);
      return { kind, words: OPTIONAL_KINDS[kind] };
    },

    async unsubscribe(token: string): Promise<{ words: string }> {
      const { userId, kind } = getUnsubscription(deps.secret, token);
      if (!(await db.getRepository(User).existsBy({ id: userId }))) throw notFound();
      await refuse(db, userId, kind);
      return { words: OPTIONAL_KINDS[kind] };
    },

    /** The kinds that may reach this person; only teachers are asked to let somebody in. */
    async listPreferences({
      userId,
      role,
    }: Viewer): Promise<{ kind: OptionalMailKind; words: string; wanted: boolean }[]> {
      const refused = new Set((await db.getRepository(MailPreference).findBy({ userId })).map(({ kind }) => kind));
      const reaching = Object.entries(OPTIONAL_KINDS).filter(
        ([kind]) => (kind === 'join-request') === (role === 'teacher'),
      );
      return reaching.map(([kind, words]) => ({
        kind: kind as OptionalMailKind,
        words,
        wanted: !refused.has(kind),
      }));
    },

    async setPreference({ userId }: Viewer, kind: OptionalMailKind, wanted: boolean): Promise<void> {
      if (wanted) await db.getRepository(MailPreference).delete({ userId, kind });
      else await refuse(db, userId, kind);
    },

    /** Old letters hold names and nobody needs them. */
    async sweepMail(): Promise<void> {
      const before = new Date(now().getTime() - KEPT_DAYS * 86_400_000);
      await db.query('delete from outgoing_mail where created_at < $1', [before]);
    },
  };
}

async function findRecipient(manager: EntityManager, { userId, to, kind }: MailOrder): Promise<string | null> {
  if (userId === null) return to ?? null;
  const user = await manager.findOne(User, {
    where: { id: userId },
    select: { id: true, email: true, disabledAt: true },
  });
  if (!user || user.disabledAt) return null;
  if (isOptionalKind(kind) && (await manager.existsBy(MailPreference, { userId, kind }))) return null;
  return to ?? user.email;
}

function toRow(order: MailOrder, recipient: string, { baseUrl, secret, now }: MailDeps) {
  const { kind, userId } = order;
  const content: LetterContent = writeLetter(kind, order.data as never);
  const unsubscribeUrl =
    userId !== null && isOptionalKind(kind)
      ? `${baseUrl}/api/unsubscribe/${toUnsubscribeToken(secret, { userId, kind })}`
      : null;
  const links = { baseUrl, unsubscribeUrl };
  return {
    kind,
    recipient,
    userId,
    subject: content.subject,
    text: toText(content, links),
    html: toHtml(content, links),
    headers: { 'Auto-Submitted': 'auto-generated', ...(unsubscribeUrl && oneClick(unsubscribeUrl)) },
    dedupeKey: order.dedupeKey ?? null,
    createdAt: now(),
  };
}

/** RFC 8058: a mail program's own button posts to the address, without the person's cookies. */
function oneClick(url: string): Record<string, string> {
  return { 'List-Unsubscribe': `<${url}>`, 'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click' };
}

async function sendLocked(manager: EntityManager, mailId: string, { mailer, now, baseUrl }: MailDeps): Promise<void> {
  const mail = await manager.findOne(OutgoingMail, { where: { id: mailId }, lock: { mode: 'pessimistic_write' } });
  if (!mail || mail.sentAt) return;
  const { subject, text, html } = mail;
  const messageId = `<${mail.id}@${new URL(baseUrl).hostname}>`;
  await mailer.send({ to: mail.recipient, subject, text, html, headers: { ...mail.headers, 'Message-ID': messageId } });
  // What has left is not kept: links in it would be good for whoever reads the table.
  await manager.update(
    OutgoingMail,
    { id: mailId },
    { sentAt: now(), text: '', html: '', headers: {}, lastError: null },
  );
}

function getUnsubscription(secret: string, token: string): Unsubscription {
  const read = readUnsubscribeToken(secret, token);
  if (!read) throw notFound();
  return read;
}

async function refuse(db: DataSource, userId: string, kind: OptionalMailKind): Promise<void> {
  await db.createQueryBuilder().insert().into(MailPreference).values({ userId, kind }).orIgnore().execute();
}
