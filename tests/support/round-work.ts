import { randomUUID } from 'node:crypto';
import type { DataSource } from 'typeorm';
import { Derivation, DerivationVersion, Draft } from '../../api/features/derivations/derivations.entity.ts';
import { Finding, Review } from '../../api/features/reviews/reviews.entity.ts';
import type { HandedInLine, SheetDocument } from '../../shared/schemas/sheet.ts';

/** A sheet with these lines, one block each. */
export function sheetOf(lines: readonly string[]): SheetDocument {
  return {
    type: 'doc',
    content: lines.map((tex) => ({ type: 'step', attrs: { stepId: randomUUID(), tex, reason: '', uses: null } })),
  };
}

/** What a student has written and not handed in. */
export async function write(
  db: DataSource,
  of: { roundId: string; authorId: string; at: Date; lineAddedAt?: Date; lines: readonly string[] },
): Promise<Derivation> {
  const { roundId, authorId, at, lines } = of;
  const derivation = await db.getRepository(Derivation).save({ roundId, authorId, kind: 'own', openedAt: at });
  const document = sheetOf(lines) as object;
  await db.getRepository(Draft).save({
    derivationId: derivation.id,
    purpose: 'submission',
    document,
    savedAt: at,
    lineAddedAt: of.lineAddedAt ?? at,
  });
  return await db.getRepository(Derivation).findOneByOrFail({ id: derivation.id });
}

/** A derivation as its author handed it in at `at`; `lines` are those after the given. */
export async function handIn(
  db: DataSource,
  of: { roundId: string; authorId: string; at: Date; lines?: readonly string[]; late?: boolean },
): Promise<Derivation> {
  const { at, late = false, lines = ['x^2-3x+2x-6', 'x^2-x-6'] } = of;
  const derivation = await write(db, { ...of, lines });
  const handedIn = ['(x+2)(x-3)', ...lines].map((tex, i): HandedInLine => ({
    stepId: i === 0 ? 'given' : randomUUID(),
    tex,
    reason: '',
    uses: null,
    prose: '',
  }));
  const version = await db.getRepository(DerivationVersion).save({
    derivationId: derivation.id,
    purpose: 'submission',
    number: 1,
    document: sheetOf(lines) as object,
    lines: handedIn as object[],
    handedInAt: at,
  });
  const row = { ...derivation, currentVersionId: version.id, handedInAt: at, late };
  return await db.getRepository(Derivation).save(row);
}

/** Hands in a finding for a review. */
export async function find(
  db: DataSource,
  review: Pick<Review, 'id'>,
  at: Date,
  values: Partial<Finding> = {},
): Promise<Finding> {
  const finding = { reviewId: review.id, pick: 2, noFault: false, sureness: 5, handedInAt: at, ...values };
  return await db.getRepository(Finding).save(finding);
}

/** Everything that is dealt in a round. */
export async function listReviews(db: DataSource, roundId: string): Promise<(Review & { derivation: Derivation })[]> {
  const reviews = await db.getRepository(Review).find({ where: { roundId }, relations: { derivation: true } });
  return reviews as (Review & { derivation: Derivation })[];
}
