import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, Unique, type Relation } from 'typeorm';
import { User } from '../people/people.entity.ts';

/** Written in the transaction of what caused it, sent by a job. */
@Unique(['dedupeKey'])
@Index(['sentAt'])
@Entity({ name: 'outgoing_mail' })
export class OutgoingMail {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'text' })
  kind!: string;

  @Column({ type: 'text' })
  recipient!: string;

  @Column({ type: 'uuid', nullable: true })
  userId!: string | null;

  @Column({ type: 'text' })
  subject!: string;

  @Column({ type: 'text' })
  text!: string;

  @Column({ type: 'text' })
  html!: string;

  @Column({ type: 'jsonb' })
  headers!: Record<string, string>;

  /** Two mails with one key are one mail. */
  @Column({ type: 'text', nullable: true })
  dedupeKey!: string | null;

  @Column({ type: 'int', default: 0 })
  attempts!: number;

  @Column({ type: 'text', nullable: true })
  lastError!: string | null;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;

  @Column({ type: 'timestamptz', nullable: true })
  sentAt!: Date | null;
}

/** A kind of mail that somebody does not want. */
@Unique(['userId', 'kind'])
@Entity({ name: 'mail_preference' })
export class MailPreference {
  @PrimaryGeneratedColumn('uuid')
  id!: string;

  @Column({ type: 'uuid' })
  userId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE', nullable: false })
  @JoinColumn()
  user?: Relation<User>;

  @Column({ type: 'text' })
  kind!: string;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  createdAt!: Date;
}
