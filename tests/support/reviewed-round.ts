import { randomUUID } from 'node:crypto';
import { createScoringService } from '../../api/features/scoring/scoring.service.ts';
import { createSettlingService } from '../../api/features/settling/settling.service.ts';
import { Derivation, DerivationVersion } from '../../api/features/derivations/derivations.entity.ts';
import type { User } from '../../api/features/people/people.entity.ts';
import { Review } from '../../api/features/reviews/reviews.entity.ts';
import { Round } from '../../api/features/rounds/rounds.entity.ts';
import { VerdictRecord } from '../../api/features/verdicts/verdicts.entity.ts';
import { concludeSteps } from '../../shared/lib/judge-finding.ts';
import { isWithinOneTerm } from '../../shared/lib/within-one-term.ts';
import type { FindingDraft } from '../../shared/schemas/finding.ts';
import type { StepRuling } from '../../shared/schemas/verdict.ts';
import type { ClassWithPeople } from './factories.ts';
import type { TestServer } from './test-server.ts';

/** (x-5)(x+1)-2x(x+3): the middle product takes a wrong sign in step 2, and steps 3 and 4 carry it. */
export const LINES = [
  '(x-5)(x+1)-2x(x+3)',
  '(x-5)(x+1)-2x^2-6x',
  'x^2+x-5x+5-2x^2-6x',
  'x^2-2x^2+x-5x-6x+5',
  '-x^2-10x+5',
] as const;

export type Ruled = 'holds' | 'fails' | 'undecided' | Partial<StepRuling>;

export const FAULT: Partial<StepRuling> = {
  ruling: 'fails',
  reached: 'proved',
  evidence: {
    witness: { at: { x: '0' }, above: '-5', below: '5' },
    wrongPart: { span: { start: 8, end: 10 }, is: '+5', shouldBe: '-5' },
    slip: { id: 'sign-of-a-product', kind: 'sign' },
    mended: { line: 'x^2+x-5x-5-2x^2-6x', changed: [{ start: 8, end: 9 }] },
  },
};
export const FAULTY: readonly Ruled[] = ['holds', FAULT, 'holds', 'holds'];
export const SOUND: readonly Ruled[] = ['holds', 'holds', 'holds', 'holds'];
export const OPEN: readonly Ruled[] = ['holds', 'undecided', 'holds', 'holds'];

export interface ReviewedRound extends ClassWithPeople {
  readonly round: Round;
  /** One for each author: the student of the same index. */
  readonly derivations: readonly { readonly derivation: Derivation; readonly version: DerivationVersion }[];
  /** The review of `derivations[author]` by `students[reviewer]`. */
  review(author: number, reviewer: number): Promise<Review>;
  move(stage: Round['stage']): Promise<void>;
}

export interface RoundOptions {
  readonly students?: number;
  /** Verdict of each derivation, author 0 first; null: not checked yet. */
  readonly verdicts?: readonly (readonly Ruled[] | null)[];
  readonly lines?: readonly (readonly string[])[];
  /** Which student reviews whose derivation. */
  readonly deal?: readonly (readonly [author: number, reviewer: number])[];
  readonly people?: ClassWithPeople;
}

/** A round in reviewing, dealt as told. */
export async function reviewedRound(server: TestServer, options: RoundOptions = {}): Promise<ReviewedRound> {
  const { create, dataSource, clock } = server;
  const people = options.people ?? (await create.classWith({ students: options.students ?? 3 }));
  const task = await create.task(people.teacher, { title: 'Two products', given: LINES[0] });
  const day = 86_400_000;
  const at = clock.now().getTime();
  const round = await create.round(people.class, task, {
    stage: 'reviewing',
    opensAt: new Date(at - 2 * day),
    writingEndsAt: new Date(at - day),
    reviewingEndsAt: new Date(at + 2 * day),
    answeringEndsAt: new Date(at + 4 * day),
    settlesAt: new Date(at + 5 * day),
    frozen: {
      title: task.title,
      instructions: '',
      given: LINES[0],
      goal: { kind: 'expanded' },
      assumptions: [],
      settings: {
        numbers: 'real',
        reversible: false,
        presentationCounts: false,
        constantNeeded: false,
        decimal: 'point',
      },
      taskId: task.id,
      taskVersion: 1,
      pointsRule: 'quadratic-1',
    },
  });
  const verdicts = options.verdicts ?? [FAULTY];
  const derivations: { derivation: Derivation; version: DerivationVersion }[] = [];
  for (const [i, verdict] of verdicts.entries()) {
    derivations.push(await handIn(server, round, people.students[i], options.lines?.[i] ?? LINES, verdict));
  }
  const deal = options.deal ?? [
    [0, 1],
    [0, 2],
  ];
  const seen = new Map<number, number>();
  for (const [author, reviewer] of deal) {
    const position = (seen.get(reviewer) ?? 0) + 1;
    seen.set(reviewer, position);
    await dataSource.getRepository(Review).save({
      roundId: round.id,
      derivationId: derivations[author]!.derivation.id,
      versionId: derivations[author]!.version.id,
      reviewerId: people.students[reviewer]!.id,
      position,
      createdAt: clock.now(),
    });
  }
  return {
    ...people,
    round,
    derivations,
    review: (author, reviewer) =>
      dataSource.getRepository(Review).findOneByOrFail({
        derivationId: derivations[author]!.derivation.id,
        reviewerId: people.students[reviewer]!.id,
      }),
    async move(stage) {
      await moveStage(server, round.id, stage);
    },
  };
}

/** What the stage machine does, without its times and mails. Forces the settling. */
async function moveStage(server: TestServer, roundId: string, stage: Round['stage']): Promise<void> {
  const { dataSource, clock } = server;
  await dataSource.transaction(async (manager) => {
    const round = await manager.findOneOrFail(Round, { where: { id: roundId }, lock: { mode: 'pessimistic_write' } });
    const settling = settlingOf(server);
    if (stage === 'answering') await settling.openAnswering(manager, round);
    if (stage === 'settled') await settling.settle(manager, round, { force: true });
    await manager.update(Round, roundId, { stage, ...(stage === 'settled' && { settledAt: clock.now() }) });
  });
}

export function settlingOf({ clock }: Pick<TestServer, 'clock'>) {
  const now = () => clock.now();
  const scoring = createScoringService({ now, isWithinOneTerm });
  return createSettlingService({
    now,
    findCurrentVerdicts: scoring.findCurrentVerdicts,
    judge: scoring.judge,
    addScores: scoring.add,
  });
}

async function handIn(
  { dataSource, clock }: TestServer,
  round: Round,
  author: User | undefined,
  lines: readonly string[],
  verdict: readonly Ruled[] | null,
) {
  const versionId = randomUUID();
  const derivation = await dataSource.getRepository(Derivation).save({
    roundId: round.id,
    authorId: author?.id ?? null,
    kind: author ? 'own' : 'planted',
    currentVersionId: versionId,
    handedInAt: new Date(clock.now().getTime() - 90_000_000),
  } as object as Derivation);
  const version = await dataSource.getRepository(DerivationVersion).save({
    id: versionId,
    derivationId: derivation.id,
    purpose: 'submission',
    number: 1,
    document: { type: 'doc', content: [] },
    lines: lines.map((tex, i) => ({
      stepId: i === 0 ? 'given' : randomUUID(),
      tex,
      reason: i === 1 ? 'second product out' : '',
      uses: null,
      prose: '',
    })),
    handedInAt: new Date(clock.now().getTime() - 90_000_000),
  } as object as DerivationVersion);
  if (verdict) await addVerdict(dataSource.getRepository(VerdictRecord), versionId, verdict, clock.now());
  return { derivation, version };
}

async function addVerdict(
  repository: { insert(row: object): Promise<unknown> },
  versionId: string,
  verdict: readonly Ruled[],
  at: Date,
): Promise<void> {
  const steps = verdict.map((ruled, i): StepRuling => {
    const given = typeof ruled === 'string' ? { ruling: ruled } : ruled;
    const reached = given.ruling === 'undecided' ? null : 'proved';
    return {
      step: i + 1,
      ruling: 'holds',
      reached,
      notes: [],
      evidence: given.ruling === 'undecided' ? { reason: 'not-covered' } : {},
      ...given,
    };
  });
  await repository.insert({
    versionId,
    source: 'checker',
    ...concludeSteps(steps),
    steps,
    checkerVersion: 'test',
    ms: 1,
    createdAt: new Date(at.getTime() - 80_000_000),
  });
}

/** A finding to hand in; step 2 with middling sureness unless told otherwise. */
export function finding(values: Partial<FindingDraft> = {}): FindingDraft {
  return {
    pick: 2,
    markedSpan: null,
    slipKind: null,
    shouldBe: '',
    why: 'Minus five times one stays negative.',
    sureness: 5,
    ...values,
  };
}
