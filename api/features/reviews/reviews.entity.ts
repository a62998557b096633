import {
  Column,
  Entity,
  Generated,
  Index,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  Unique,
  type Relation,
} from 'typeorm';
import { decimal } from '../../db/decimal.ts';
import { Derivation, DerivationVersion } from '../derivations/derivations.entity.ts';
import { User } from '../people/people.entity.ts';
import { Round } from '../rounds/rounds.entity.ts';
import { VerdictRecord } from '../verdicts/verdicts.entity.ts';
import type { Span } from '../../../shared/maths/expression.ts';
import type { FindingDraft } from '../../../shared/schemas/finding.ts';

/** A derivation dealt to a reviewer. Its id is met by this reviewer alone. */
@Unique(['derivationId', 'reviewerId'])
@Index(['roundId', 'reviewerId'])
@Entity({ name: 'review' })
export class Review {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  roundId!: string;

  @ManyToOne(() => Round, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  round?: Relation<Round>;

  @Column({ type: 'uuid' })
  derivationId!: string;

  @ManyToOne(() => Derivation, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  derivation?: Relation<Derivation>;

  @Index()
  @Column({ type: 'uuid' })
  versionId!: string;

  @ManyToOne(() => DerivationVersion, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  version?: Relation<DerivationVersion>;

  @Index()
  @Column({ type: 'uuid' })
  reviewerId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  reviewer?: Relation<User>;

  /** Order on this reviewer's desk, from 1. */
  @Column({ type: 'int' })
  position!: number;

  @Column({ type: 'text', default: 'main' })
  batch!: 'main' | 'late';

  @Column({ type: 'jsonb', nullable: true })
  draft!: FindingDraft | null;

  @Column({ type: 'int', default: 0 })
  draftVersion!: number;

  @Column({ type: 'timestamptz', nullable: true })
  draftSavedAt!: Date | null;

  @Column({ type: 'timestamptz', nullable: true })
  openedAt!: Date | null;

  @Column({ type: 'text', nullable: true })
  setAside!: 'cannot-read' | 'know-the-author' | null;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}

/** What a reviewer handed in. Never changed; the last one not taken back counts. */
@Index(['reviewId', 'handedInAt'])
@Unique(['authorKey'])
@Entity({ name: 'finding' })
export class Finding {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  reviewId!: string;

  @ManyToOne(() => Review, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  review?: Relation<Review>;

  /** Step number; null with `noFault` false: can't tell. */
  @Column({ type: 'int', nullable: true })
  pick!: number | null;

  @Column({ type: 'boolean' })
  noFault!: boolean;

  /** Tenths, 0 to 8. */
  @Column({ type: 'int' })
  sureness!: number;

  @Column({ type: 'jsonb', nullable: true })
  markedSpan!: Span | null;

  @Column({ type: 'text', nullable: true })
  slipKind!: string | null;

  @Column({ type: 'text', default: '' })
  shouldBe!: string;

  @Column({ type: 'text', default: '' })
  why!: string;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  handedInAt!: Date;

  @Column({ type: 'timestamptz', nullable: true })
  takenBackAt!: Date | null;

  /** The id under which the author meets this finding. */
  @Generated('uuid')
  @Column({ type: 'uuid' })
  authorKey!: string;
}

/** The author's reply to a finding. */
@Unique(['findingId'])
@Entity({ name: 'answer' })
export class Answer {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  findingId!: string;

  @ManyToOne(() => Finding, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  finding?: Relation<Finding>;

  @Column({ type: 'text' })
  kind!: 'accept' | 'contest';

  @Column({ type: 'text', default: '' })
  reason!: string;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  updatedAt!: Date;
}

/** Points of a review. Only ever added; the latest counts. */
@Index(['reviewId', 'createdAt'])
@Entity({ name: 'score' })
export class Score {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  reviewId!: string;

  @ManyToOne(() => Review, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  review?: Relation<Review>;

  @Column({ type: 'uuid', nullable: true })
  findingId!: string | null;

  @ManyToOne(() => Finding, { onDelete: 'SET NULL' })
  @JoinColumn()
  finding?: Relation<Finding>;

  @Column({ type: 'uuid', nullable: true })
  verdictId!: string | null;

  @ManyToOne(() => VerdictRecord, { onDelete: 'SET NULL' })
  @JoinColumn()
  verdict?: Relation<VerdictRecord>;

  @Column({ type: 'numeric', precision: 9, scale: 4, transformer: decimal })
  points!: number;

  /** false: void, does not enter the standing. */
  @Column({ type: 'boolean' })
  counted!: boolean;

  @Column({ type: 'text' })
  outcome!:
    'right' | 'carried' | 'not-first' | 'missed' | 'false-alarm' | 'no-pick' | 'void' | 'not-handed-in' | 'excused';

  @Column({ type: 'boolean', nullable: true })
  slipNamed!: boolean | null;

  @Column({ type: 'boolean', nullable: true })
  termMarked!: boolean | null;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}
