import { School, User, Session, AccountToken } from '../features/people/people.entity.ts';
import {
  Class,
  Membership,
  JoinRequest,
  Invitation,
  RosterEntry,
  ConflictPair,
} from '../features/classes/classes.entity.ts';
import { Task } from '../features/tasks/tasks.entity.ts';
import { Round, Extension, Excuse } from '../features/rounds/rounds.entity.ts';
import { Derivation, Draft, DerivationVersion } from '../features/derivations/derivations.entity.ts';
import { VerdictRecord } from '../features/verdicts/verdicts.entity.ts';
import { Review, Finding, Answer, Score } from '../features/reviews/reviews.entity.ts';
import { Dispute, Ruling } from '../features/disputes/disputes.entity.ts';
import { StandingsSheet } from '../features/standings/standings.entity.ts';
import { OutgoingMail, MailPreference } from '../features/mail/mail.entity.ts';
import { AuditEntry, RateLimit } from '../features/audit/audit.entity.ts';

/** Every table of the product; pg-boss keeps its own schema. */
export const entities = [
  School,
  User,
  Session,
  AccountToken,
  Class,
  Membership,
  JoinRequest,
  Invitation,
  RosterEntry,
  ConflictPair,
  Task,
  Round,
  Extension,
  Excuse,
  Derivation,
  Draft,
  DerivationVersion,
  VerdictRecord,
  Review,
  Finding,
  Answer,
  Score,
  Dispute,
  Ruling,
  StandingsSheet,
  OutgoingMail,
  MailPreference,
  AuditEntry,
  RateLimit,
];
