import {
  Column,
  Entity,
  Index,
  JoinColumn,
  ManyToOne,
  PrimaryColumn,
  PrimaryGeneratedColumn,
  Unique,
  type Relation,
} from 'typeorm';

/** A school; every root table carries it. */
@Unique(['name'])
@Entity({ name: 'school' })
export class School {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'text' })
  name!: string;

  @Column({ type: 'text' })
  timeZone!: string;

  @Column({ type: 'boolean', default: true })
  standingsAllowed!: boolean;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}

/** A person. Students of a class without e-mail have a user name instead of an address. */
@Unique(['email'])
@Unique(['schoolId', 'userName'])
@Entity({ name: 'person' })
export class User {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  schoolId!: string;

  @ManyToOne(() => School, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  school?: Relation<School>;

  @Column({ type: 'text' })
  role!: 'admin' | 'teacher' | 'student';

  @Column({ type: 'text' })
  name!: string;

  /** Lower case. */
  @Column({ type: 'text', nullable: true })
  email!: string | null;

  /** Lower case, unique within the school. */
  @Column({ type: 'text', nullable: true })
  userName!: string | null;

  /** Argon2id, PHC string. */
  @Column({ type: 'text', nullable: true })
  passwordHash!: string | null;

  @Column({ type: 'timestamptz', nullable: true })
  disabledAt!: Date | null;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}

/** A signed-in browser. The key is the SHA-256 of the cookie, never the cookie itself. */
@Entity({ name: 'session' })
export class Session {
  @PrimaryColumn({ type: 'text' })
  id!: string;

  @Index()
  @Column({ type: 'uuid' })
  userId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  user?: Relation<User>;

  /** Moves on with use (idle limit). */
  @Column({ type: 'timestamptz' })
  expiresAt!: Date;

  /** Never moves (absolute limit). */
  @Column({ type: 'timestamptz' })
  endsAt!: Date;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;

  @Column({ type: 'text', default: '' })
  userAgent!: string;
}

/** A single-use secret sent by mail or handed over by a teacher; only its hash is kept. */
@Unique(['tokenHash'])
@Entity({ name: 'account_token' })
export class AccountToken {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Index()
  @Column({ type: 'uuid' })
  userId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  user?: Relation<User>;

  @Column({ type: 'text' })
  kind!: 'reset' | 'email-change' | 'one-day-code';

  @Column({ type: 'text' })
  tokenHash!: string;

  /** The new address of an e-mail change. */
  @Column({ type: 'text', nullable: true })
  email!: string | null;

  @Column({ type: 'int', default: 0 })
  tries!: number;

  @Column({ type: 'timestamptz' })
  expiresAt!: Date;

  @Column({ type: 'timestamptz', nullable: true })
  usedAt!: Date | null;

  @Column({ type: 'uuid', nullable: true })
  createdById!: string | null;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}
