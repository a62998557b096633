import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, Unique, type Relation } from 'typeorm';
import { School, User } from '../people/people.entity.ts';

/** A class of a school. */
@Unique(['schoolId', 'name'])
@Unique(['joinCode'])
@Entity({ name: 'class' })
export class Class {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  schoolId!: string;

  @ManyToOne(() => School, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  school?: Relation<School>;

  @Column({ type: 'text' })
  name!: string;

  /** IANA name. */
  @Column({ type: 'text' })
  timeZone!: string;

  /** Ten characters; renewed by the teacher. */
  @Column({ type: 'text' })
  joinCode!: string;

  @Column({ type: 'boolean', default: true })
  joinOpen!: boolean;

  /** false: students have user names and sign-in codes. */
  @Column({ type: 'boolean', default: true })
  hasEmail!: boolean;

  @Column({ type: 'boolean', default: true })
  standingsOn!: boolean;

  @Column({ type: 'boolean', default: false })
  assistantsSeeNames!: boolean;

  /** An alias may be changed once after this instant. */
  @Column({ type: 'timestamptz' })
  aliasTermStartsAt!: Date;

  @Column({ type: 'timestamptz', nullable: true })
  archivedAt!: Date | null;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}

/** A person in a class. */
@Unique(['classId', 'userId'])
@Unique(['classId', 'alias'])
@Entity({ name: 'membership' })
export class Membership {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  classId!: string;

  @ManyToOne(() => Class, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  class?: Relation<Class>;

  @Index()
  @Column({ type: 'uuid' })
  userId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  user?: Relation<User>;

  @Column({ type: 'text' })
  role!: 'teacher' | 'assistant' | 'student';

  @Column({ type: 'text', nullable: true })
  alias!: string | null;

  @Column({ type: 'timestamptz', nullable: true })
  aliasChangedAt!: Date | null;

  @Column({ type: 'boolean', default: false })
  standingsOptOut!: boolean;

  @Column({ type: 'timestamptz', nullable: true })
  removedAt!: Date | null;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  joinedAt!: Date;
}

/** Somebody with the class code asks to join. */
@Index(['classId', 'userId'], { unique: true, where: 'decided_at IS NULL' })
@Entity({ name: 'join_request' })
export class JoinRequest {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  classId!: string;

  @ManyToOne(() => Class, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  class?: Relation<Class>;

  @Column({ type: 'uuid' })
  userId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  user?: Relation<User>;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;

  @Column({ type: 'timestamptz', nullable: true })
  decidedAt!: Date | null;

  @Column({ type: 'boolean', nullable: true })
  accepted!: boolean | null;

  @Column({ type: 'uuid', nullable: true })
  decidedById!: string | null;
}

/** A single-use link into a school, and into a class unless it makes a teacher's or admin's account; only the hash of its secret is kept. */
@Unique(['tokenHash'])
@Entity({ name: 'invitation' })
export class Invitation {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  schoolId!: string;

  @ManyToOne(() => School, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  school?: Relation<School>;

  @Index()
  @Column({ type: 'uuid', nullable: true })
  classId!: string | null;

  @ManyToOne(() => Class, { onDelete: 'CASCADE' })
  @JoinColumn()
  class?: Relation<Class>;

  @Column({ type: 'text' })
  role!: 'admin' | 'teacher' | 'assistant' | 'student';

  /** true: came from the class code; who accepts it asks to join and the teacher decides. */
  @Column({ type: 'boolean', default: false })
  asksToJoin!: boolean;

  @Column({ type: 'text' })
  tokenHash!: string;

  @Column({ type: 'text' })
  name!: string;

  @Column({ type: 'text', nullable: true })
  email!: string | null;

  @Column({ type: 'uuid', nullable: true })
  createdById!: string | null;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;

  @Column({ type: 'timestamptz' })
  expiresAt!: Date;

  @Column({ type: 'timestamptz', nullable: true })
  acceptedAt!: Date | null;

  @Column({ type: 'uuid', nullable: true })
  acceptedById!: string | null;

  @Column({ type: 'timestamptz', nullable: true })
  revokedAt!: Date | null;
}

/** A name from the class list; a matching request to join is accepted at once. */
@Unique(['classId', 'name'])
@Entity({ name: 'roster_entry' })
export class RosterEntry {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  classId!: string;

  @ManyToOne(() => Class, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  class?: Relation<Class>;

  @Column({ type: 'text' })
  name!: string;

  @Column({ type: 'text', nullable: true })
  email!: string | null;

  @Column({ type: 'text', nullable: true })
  userName!: string | null;
}

/** Two people who are never dealt to each other; the note is for teachers only. First id < second id. */
@Unique(['classId', 'firstId', 'secondId'])
@Entity({ name: 'conflict_pair' })
export class ConflictPair {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  classId!: string;

  @ManyToOne(() => Class, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  class?: Relation<Class>;

  @Column({ type: 'uuid' })
  firstId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  first?: Relation<User>;

  @Column({ type: 'uuid' })
  secondId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  second?: Relation<User>;

  @Column({ type: 'text', default: '' })
  note!: string;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}
