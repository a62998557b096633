import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, type Relation } from 'typeorm';
import { decimal } from '../../db/decimal.ts';
import { DerivationVersion } from '../derivations/derivations.entity.ts';
import { Ruling } from '../disputes/disputes.entity.ts';
import type { StepRuling } from '../../../shared/schemas/verdict.ts';

/** A verdict on a version: of the checker, or of a ruling. Only ever added; the current one is the latest ruling, else the latest of the checker. */
@Index(['versionId', 'createdAt'])
@Entity({ name: 'verdict' })
export class VerdictRecord {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  versionId!: string;

  @ManyToOne(() => DerivationVersion, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  version?: Relation<DerivationVersion>;

  @Column({ type: 'text' })
  source!: 'checker' | 'ruling';

  @Column({ type: 'uuid', nullable: true })
  rulingId!: string | null;

  @ManyToOne(() => Ruling, { onDelete: 'SET NULL' })
  @JoinColumn()
  ruling?: Relation<Ruling>;

  @Column({ type: 'text' })
  outcome!: 'sound' | 'faulty' | 'undecided';

  @Column({ type: 'int', nullable: true })
  firstFault!: number | null;

  @Column({ type: 'jsonb' })
  steps!: StepRuling[];

  @Column({ type: 'text' })
  checkerVersion!: string;

  @Column({ type: 'numeric', precision: 10, scale: 3, transformer: decimal })
  ms!: number;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}
