import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, type Relation } from 'typeorm';
import { School, User } from '../people/people.entity.ts';
import type { TaskSettings } from '../../../shared/schemas/task.ts';
import type { Goal } from '../../../shared/schemas/verdict.ts';

/** What is to be derived; used in many rounds. */
@Index(['schoolId', 'ownerId'])
@Entity({ name: 'task' })
export class Task {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  schoolId!: string;

  @ManyToOne(() => School, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  school?: Relation<School>;

  @Column({ type: 'uuid' })
  ownerId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  owner?: Relation<User>;

  @Column({ type: 'text' })
  title!: string;

  @Column({ type: 'text', default: '' })
  instructions!: string;

  /** TeX of line 0. */
  @Column({ type: 'text' })
  given!: string;

  @Column({ type: 'jsonb' })
  goal!: Goal;

  /** TeX statements such as `x>0`. */
  @Column({ type: 'jsonb' })
  assumptions!: string[];

  @Column({ type: 'jsonb' })
  settings!: TaskSettings;

  @Column({ type: 'int', default: 1 })
  version!: number;

  @Column({ type: 'timestamptz', nullable: true })
  archivedAt!: Date | null;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  updatedAt!: Date;
}
