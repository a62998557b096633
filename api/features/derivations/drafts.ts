import type { EntityManager } from 'typeorm';
import type { SaveAnswer, SaveSheet } from '../../../shared/schemas/derivation.ts';
import { EMPTY_SHEET, linesOf, type SheetDocument } from '../../../shared/schemas/sheet.ts';
import { ProblemError } from '../../http/problem-error.ts';
import { Derivation, DerivationVersion, Draft } from './derivations.entity.ts';
import { toSavedDraft } from './sheet.presenter.ts';

type Purpose = Draft['purpose'];

/** The student's derivation in a round, made when the sheet is first seen; two first looks at once make one. */
export async function openDerivation(
  manager: EntityManager,
  roundId: string,
  authorId: string,
  now: Date,
  mayBegin: boolean,
): Promise<Derivation> {
  const known = await manager.findOneBy(Derivation, { roundId, authorId });
  if (known) return known;
  if (!mayBegin) throw tooLate();
  await manager
    .createQueryBuilder()
    .insert()
    .into(Derivation)
    .values({ roundId, authorId, kind: 'own', openedAt: now })
    .orIgnore()
    .execute();
  return await manager.findOneByOrFail(Derivation, { roundId, authorId });
}

export function tooLate(): ProblemError {
  return new ProblemError('too-late', { detail: 'The time for writing is over.' });
}

export function nothingWritten(): ProblemError {
  const detail = 'Write at least one line before handing in.';
  return new ProblemError('invalid-fields', { detail, errors: [{ pointer: '/draftVersion', detail }] });
}

/** The draft for a purpose, begun with `first` where there is none. */
export async function openDraft(
  manager: EntityManager,
  derivationId: string,
  purpose: Purpose,
  now: Date,
  first: SheetDocument = EMPTY_SHEET,
): Promise<Draft> {
  await manager
    .createQueryBuilder()
    .insert()
    .into(Draft)
    .values({ derivationId, purpose, document: first as object, version: 1, savedAt: now })
    .orIgnore()
    .execute();
  return await manager.findOneByOrFail(Draft, { derivationId, purpose });
}

/** The derivation's row, held until the transaction ends; every change to its draft and versions goes through it. */
export async function holdDerivation(manager: EntityManager, derivationId: string): Promise<Derivation> {
  return await manager.findOneOrFail(Derivation, {
    where: { id: derivationId },
    lock: { mode: 'pessimistic_write' },
  });
}

/**
 * Saves over the version that the change was made from.
 * @throws {ProblemError} conflict, with the saved draft in `extra.draft`, when another tab saved in between.
 */
export async function saveDraft(
  manager: EntityManager,
  draft: Draft,
  { document, baseVersion }: SaveSheet,
  now: Date,
): Promise<SaveAnswer> {
  refuseStale(draft, baseVersion);
  const version = draft.version + 1;
  const grew = linesOf(document, []).length > linesOf(draft.document, []).length;
  const lineAddedAt = grew ? now : draft.lineAddedAt;
  await manager.update(Draft, { id: draft.id }, { document: document as object, version, savedAt: now, lineAddedAt });
  return { version, savedAt: now.toISOString() };
}

/** @throws {ProblemError} conflict, when what was shown is not what is saved. */
export function refuseStale(draft: Draft, shownVersion: number): void {
  if (draft.version === shownVersion) return;
  throw new ProblemError('conflict', {
    detail: 'This sheet was changed in another window.',
    extra: { draft: toSavedDraft(draft) },
  });
}

export async function addVersion(
  manager: EntityManager,
  version: Pick<DerivationVersion, 'derivationId' | 'purpose' | 'document' | 'lines' | 'handedInAt'>,
): Promise<DerivationVersion> {
  const { derivationId, purpose } = version;
  const last = await manager.maximum(DerivationVersion, 'number', { derivationId, purpose });
  return await manager.save(manager.create(DerivationVersion, { ...version, number: (last ?? 0) + 1 }));
}
