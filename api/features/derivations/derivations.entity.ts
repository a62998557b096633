import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, Unique, type Relation } from 'typeorm';
import { User } from '../people/people.entity.ts';
import { Round } from '../rounds/rounds.entity.ts';
import type { HandedInLine, SheetDocument } from '../../../shared/schemas/sheet.ts';

/** One author's work in a round; a planted one has no author. */
@Index(['roundId', 'authorId'], { unique: true, where: 'author_id IS NOT NULL' })
@Entity({ name: 'derivation' })
export class Derivation {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  roundId!: string;

  @ManyToOne(() => Round, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  round?: Relation<Round>;

  @Column({ type: 'uuid', nullable: true })
  authorId!: string | null;

  @ManyToOne(() => User, { onDelete: 'SET NULL' })
  @JoinColumn()
  author?: Relation<User>;

  @Column({ type: 'text', default: 'own' })
  kind!: 'own' | 'planted';

  /** The version handed in, null while it is being written or was taken back. */
  @Column({ type: 'uuid', nullable: true })
  currentVersionId!: string | null;

  @Column({ type: 'timestamptz', nullable: true })
  handedInAt!: Date | null;

  @Column({ type: 'boolean', default: false })
  late!: boolean;

  /** First time that the author saw the sheet. */
  @Column({ type: 'timestamptz', nullable: true })
  openedAt!: Date | null;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}

/** What the author typed, saved as it is typed. */
@Unique(['derivationId', 'purpose'])
@Entity({ name: 'draft' })
export class Draft {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  derivationId!: string;

  @ManyToOne(() => Derivation, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  derivation?: Relation<Derivation>;

  @Column({ type: 'text' })
  purpose!: 'submission' | 'mend';

  @Column({ type: 'jsonb' })
  document!: SheetDocument;

  /** Counts up with every save; a save names the version it was made from. */
  @Column({ type: 'int', default: 1 })
  version!: number;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  savedAt!: Date;

  /** When the number of lines last grew: who writes on but gets no further is stuck. */
  @Column({ type: 'timestamptz', nullable: true })
  lineAddedAt!: Date | null;
}

/** What was handed in. Never changed. */
@Unique(['derivationId', 'purpose', 'number'])
@Entity({ name: 'derivation_version' })
export class DerivationVersion {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  derivationId!: string;

  @ManyToOne(() => Derivation, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  derivation?: Relation<Derivation>;

  @Column({ type: 'text' })
  purpose!: 'submission' | 'mend';

  @Column({ type: 'int' })
  number!: number;

  @Column({ type: 'jsonb' })
  document!: SheetDocument;

  /** Line 0 is the given. */
  @Column({ type: 'jsonb' })
  lines!: HandedInLine[];

  @Column({ type: 'timestamptz', default: () => 'now()' })
  handedInAt!: Date;
}
