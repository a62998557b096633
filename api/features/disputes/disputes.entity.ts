import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, type Relation } from 'typeorm';
import { DerivationVersion } from '../derivations/derivations.entity.ts';
import { User } from '../people/people.entity.ts';
import { Finding } from '../reviews/reviews.entity.ts';
import { Round } from '../rounds/rounds.entity.ts';
import type { RulingTrail } from '../../../shared/schemas/ruling.ts';

/** Something a teacher has to settle. */
@Index(['roundId', 'closedAt'])
@Index(['findingId'], { unique: true, where: 'finding_id IS NOT NULL AND closed_at IS NULL' })
@Entity({ name: 'dispute' })
export class Dispute {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  roundId!: string;

  @ManyToOne(() => Round, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  round?: Relation<Round>;

  @Index()
  @Column({ type: 'uuid' })
  versionId!: string;

  @ManyToOne(() => DerivationVersion, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  version?: Relation<DerivationVersion>;

  @Column({ type: 'text' })
  kind!: 'undecided' | 'contested-finding' | 'contested-verdict' | 'contested-points';

  @Column({ type: 'int', nullable: true })
  step!: number | null;

  @Column({ type: 'uuid', nullable: true })
  findingId!: string | null;

  @ManyToOne(() => Finding, { onDelete: 'SET NULL' })
  @JoinColumn()
  finding?: Relation<Finding>;

  @Column({ type: 'uuid', nullable: true })
  raisedById!: string | null;

  @Column({ type: 'text', default: '' })
  words!: string;

  /** What the teacher asks the author; possible after settling only. */
  @Column({ type: 'text', nullable: true })
  question!: string | null;

  @Column({ type: 'text', nullable: true })
  questionAnswer!: string | null;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  openedAt!: Date;

  @Column({ type: 'timestamptz', nullable: true })
  closedAt!: Date | null;

  @Column({ type: 'text', nullable: true })
  closedBy!: 'ruling' | 'void' | 'withdrawn' | null;
}

/** The teacher's decision. Only ever added. */
@Index(['versionId', 'createdAt'])
@Entity({ name: 'ruling' })
export class Ruling {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  roundId!: string;

  @ManyToOne(() => Round, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  round?: Relation<Round>;

  @Column({ type: 'uuid' })
  versionId!: string;

  @ManyToOne(() => DerivationVersion, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  version?: Relation<DerivationVersion>;

  @Column({ type: 'uuid', nullable: true })
  disputeId!: string | null;

  @ManyToOne(() => Dispute, { onDelete: 'SET NULL' })
  @JoinColumn()
  dispute?: Relation<Dispute>;

  @Column({ type: 'uuid' })
  ruledById!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  ruledBy?: Relation<User>;

  @Column({ type: 'int', nullable: true })
  step!: number | null;

  @Column({ type: 'text' })
  decision!: 'holds' | 'fails' | 'presentation' | 'stands';

  @Column({ type: 'text' })
  outcome!: 'sound' | 'faulty' | 'undecided';

  @Column({ type: 'int', nullable: true })
  firstFault!: number | null;

  @Column({ type: 'text' })
  reason!: string;

  @Column({ type: 'jsonb' })
  before!: RulingTrail;

  @Column({ type: 'jsonb' })
  after!: RulingTrail;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}
