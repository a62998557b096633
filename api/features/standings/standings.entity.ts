import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, type Relation } from 'typeorm';
import { Class } from '../classes/classes.entity.ts';
import type { StandingsBody } from '../../../shared/schemas/standings.ts';

/** What the class is shown, made anew once a week. */
@Index(['classId', 'madeAt'])
@Entity({ name: 'standings_sheet' })
export class StandingsSheet {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  classId!: string;

  @ManyToOne(() => Class, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  class?: Relation<Class>;

  @Column({ type: 'timestamptz' })
  madeAt!: Date;

  @Column({ type: 'jsonb' })
  body!: StandingsBody;
}
