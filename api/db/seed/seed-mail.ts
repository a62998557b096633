import type { DataSource } from 'typeorm';
import type { Queue } from '../../lib/queue.ts';

/** Letters younger than this go out, so that the mailbox is not empty. */
const RECENT_MS = 2 * 86_400_000;

/** Letters of the past count as sent; the latest ones to these addresses leave for the demo's own mailbox. */
export async function postLetters(
  db: DataSource,
  queue: Queue | null,
  addresses: readonly string[],
  present: Date,
): Promise<void> {
  const since = new Date(present.getTime() - RECENT_MS);
  await db.transaction(async (manager) => {
    await manager.query(
      `update outgoing_mail set sent_at = created_at, text = '', html = '', headers = '{}'
        where sent_at is null and ($1 or created_at < $2 or recipient <> all($3))`,
      [queue === null, since, [...addresses]],
    );
    const letters: { id: string }[] = await manager.query(
      'select id from outgoing_mail where sent_at is null order by created_at, id',
    );
    for (const { id } of letters) {
      await queue?.enqueueInTransaction(manager, 'send-mail', { mailId: id }, { key: id });
    }
  });
}
