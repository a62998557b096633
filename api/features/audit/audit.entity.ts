import {
  Column,
  Entity,
  Index,
  JoinColumn,
  ManyToOne,
  PrimaryColumn,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import { School } from '../people/people.entity.ts';

/** Who did what, when, with what before and after, and why. Never changed. */
@Index(['schoolId', 'at'])
@Index(['objectId'])
@Entity({ name: 'audit_entry' })
export class AuditEntry {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  schoolId!: string;

  @ManyToOne(() => School, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  school?: Relation<School>;

  @Column({ type: 'uuid', nullable: true })
  actorId!: string | null;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  at!: Date;

  @Column({ type: 'text' })
  action!: string;

  @Column({ type: 'text' })
  objectKind!: string;

  @Column({ type: 'uuid' })
  objectId!: string;

  @Column({ type: 'jsonb', nullable: true })
  before!: unknown;

  @Column({ type: 'jsonb', nullable: true })
  after!: unknown;

  @Column({ type: 'text', default: '' })
  reason!: string;
}

/** Tries from one source within a window. */
@Entity({ name: 'rate_limit' })
export class RateLimit {
  @PrimaryColumn({ type: 'text' })
  key!: string;

  @Column({ type: 'timestamptz' })
  windowStartsAt!: Date;

  @Column({ type: 'int', default: 0 })
  count!: number;
}
