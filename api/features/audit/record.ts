import type { EntityManager } from 'typeorm';
import { AuditEntry } from './audit.entity.ts';

export interface AuditRecord {
  readonly schoolId: string;
  /** null: the program itself. */
  readonly actorId: string | null;
  readonly at: Date;
  /** A verb with its object, such as `class.code-renewed`. */
  readonly action: string;
  readonly objectKind: string;
  readonly objectId: string;
  readonly before?: unknown;
  readonly after?: unknown;
  readonly reason?: string;
}

/** Adds to the trail, in the caller's transaction. */
export async function recordAudit(manager: EntityManager, record: AuditRecord): Promise<void> {
  await manager.insert(AuditEntry, {
    ...record,
    before: (record.before ?? null) as object,
    after: (record.after ?? null) as object,
    reason: record.reason ?? '',
  });
}
