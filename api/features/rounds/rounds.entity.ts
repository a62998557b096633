import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, Unique, type Relation } from 'typeorm';
import { Class } from '../classes/classes.entity.ts';
import { School, User } from '../people/people.entity.ts';
import { Task } from '../tasks/tasks.entity.ts';
import type { FrozenTask } from '../../../shared/schemas/task.ts';

/** One run of a task with a class. */
@Unique(['classId', 'number'])
@Entity({ name: 'round' })
export class Round {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  schoolId!: string;

  @ManyToOne(() => School, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  school?: Relation<School>;

  @Index()
  @Column({ type: 'uuid' })
  classId!: string;

  @ManyToOne(() => Class, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  class?: Relation<Class>;

  @Column({ type: 'uuid' })
  taskId!: string;

  @ManyToOne(() => Task, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  task?: Relation<Task>;

  /** Counts up within the class from 1. */
  @Column({ type: 'int' })
  number!: number;

  @Column({ type: 'text', default: 'planned' })
  stage!: 'planned' | 'writing' | 'reviewing' | 'answering' | 'settled';

  @Column({ type: 'timestamptz' })
  opensAt!: Date;

  @Column({ type: 'timestamptz' })
  writingEndsAt!: Date;

  @Column({ type: 'timestamptz' })
  reviewingEndsAt!: Date;

  @Column({ type: 'timestamptz' })
  answeringEndsAt!: Date;

  @Column({ type: 'timestamptz' })
  settlesAt!: Date;

  @Column({ type: 'int', default: 2 })
  reviewsPerDerivation!: number;

  @Column({ type: 'int', default: 0 })
  plantedPerReviewer!: number;

  @Column({ type: 'text', default: 'closed' })
  lateRule!: 'closed' | 'until-reviewing' | 'late-batch';

  /** The task as it was when the round opened. */
  @Column({ type: 'jsonb', nullable: true })
  frozen!: FrozenTask | null;

  @Column({ type: 'text', nullable: true })
  dealSeed!: string | null;

  @Column({ type: 'timestamptz', nullable: true })
  dealtAt!: Date | null;

  @Column({ type: 'timestamptz', nullable: true })
  lateDealtAt!: Date | null;

  /** Past `settlesAt` with disputes open. */
  @Column({ type: 'boolean', default: false })
  waitingForRulings!: boolean;

  @Column({ type: 'timestamptz', nullable: true })
  settledAt!: Date | null;

  @Column({ type: 'uuid' })
  createdById!: string;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;

  @Column({ type: 'int', default: 1 })
  version!: number;
}

/** More time for one person. */
@Unique(['roundId', 'userId'])
@Entity({ name: 'extension' })
export class Extension {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  roundId!: string;

  @ManyToOne(() => Round, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  round?: Relation<Round>;

  @Column({ type: 'uuid' })
  userId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  user?: Relation<User>;

  @Column({ type: 'timestamptz', nullable: true })
  writingEndsAt!: Date | null;

  @Column({ type: 'timestamptz', nullable: true })
  reviewingEndsAt!: Date | null;

  @Column({ type: 'text', default: '' })
  reason!: string;

  @Column({ type: 'uuid' })
  createdById!: string;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}

/** A person whose missing work in this round counts for nothing. */
@Unique(['roundId', 'userId'])
@Entity({ name: 'excuse' })
export class Excuse {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  roundId!: string;

  @ManyToOne(() => Round, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  round?: Relation<Round>;

  @Column({ type: 'uuid' })
  userId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  user?: Relation<User>;

  @Column({ type: 'text', default: '' })
  reason!: string;

  @Column({ type: 'uuid' })
  createdById!: string;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}
