import type { DataSource } from 'typeorm';
import { z } from 'zod';
import type { CheckPool } from './checker/pool.ts';
import { adminRoutes } from './features/admin/admin.routes.ts';
import { createAdminService } from './features/admin/admin.service.ts';
import { classRoutes } from './features/classes/classes.routes.ts';
import { createClassesService } from './features/classes/classes.service.ts';
import { createInvitation, createJoiningService } from './features/classes/joining.service.ts';
import { createMembersService } from './features/classes/members.service.ts';
import { answersRoutes } from './features/answers/answers.routes.ts';
import { createAnswersService } from './features/answers/answers.service.ts';
import { derivationsRoutes } from './features/derivations/derivations.routes.ts';
import { createDerivationsService } from './features/derivations/derivations.service.ts';
import { createMendService } from './features/derivations/mend.service.ts';
import { demoRoutes } from './features/demo/demo.routes.ts';
import { createDemoService, type DemoService } from './features/demo/demo.service.ts';
import { disputesRoutes } from './features/disputes/disputes.routes.ts';
import { createDisputesService } from './features/disputes/disputes.service.ts';
import { healthRoutes } from './features/health/health.routes.ts';
import { mailJobs } from './features/mail/mail.jobs.ts';
import type { QueueMail } from './features/mail/queue-mail.ts';
import { mailRoutes } from './features/mail/mail.routes.ts';
import { createMailService } from './features/mail/mail.service.ts';
import { mailboxRoutes } from './features/mail/mailbox.routes.ts';
import { hashPassword, refuseCommonPassword } from './features/people/passwords.ts';
import { peopleRoutes } from './features/people/people.routes.ts';
import { createPeopleService } from './features/people/people.service.ts';
import { createSessions } from './features/people/sessions.ts';
import { issueSignInCode } from './features/people/tokens.ts';
import { reviewsRoutes } from './features/reviews/reviews.routes.ts';
import { createReviewsService } from './features/reviews/reviews.service.ts';
import { createBoardService } from './features/rounds/board.service.ts';
import { createPeopleInRoundService } from './features/rounds/people-in-round.service.ts';
import type { Round } from './features/rounds/rounds.entity.ts';
import { createRoundMail } from './features/rounds/round-mail.ts';
import { createRoundStages } from './features/rounds/round-stages.ts';
import { createRoundTimeService } from './features/rounds/round-time.service.ts';
import { roundsJobs } from './features/rounds/rounds.jobs.ts';
import { roundsRoutes } from './features/rounds/rounds.routes.ts';
import { createRoundsService } from './features/rounds/rounds.service.ts';
import { createTodayService } from './features/rounds/today.service.ts';
import { createScoringService } from './features/scoring/scoring.service.ts';
import { createSettlingService, type SettlingService } from './features/settling/settling.service.ts';
import { standingsJobs } from './features/standings/standings.jobs.ts';
import { standingsRoutes } from './features/standings/standings.routes.ts';
import { createStandingsService } from './features/standings/standings.service.ts';
import { tasksRoutes } from './features/tasks/tasks.routes.ts';
import { createTasksService } from './features/tasks/tasks.service.ts';
import { CHECKER_VERSION } from './features/verdicts/checker-version.ts';
import { verdictsJobs } from './features/verdicts/verdicts.jobs.ts';
import { verdictsRoutes } from './features/verdicts/verdicts.routes.ts';
import { toCheckInput } from './features/verdicts/check-input.ts';
import { createVerdictsService } from './features/verdicts/verdicts.service.ts';
import { readLine } from '../shared/maths/read.ts';
import { isWithinOneTerm } from '../shared/lib/within-one-term.ts';
import type { Verdict } from '../shared/schemas/verdict.ts';
import type { UniqueConflicts } from './http/problems.ts';
import type { Route, Viewer } from './http/route.ts';
import type { Now } from './lib/clock.ts';
import type { Config } from './lib/config.ts';
import type { Logger } from './lib/logger.ts';
import type { MailCatcher } from './lib/mail-catcher.ts';
import type { Mailer } from './lib/mailer.ts';
import { job, type JobKind, type Queue } from './lib/queue.ts';
import { remember } from './lib/remember.ts';
import type { RateLimiter } from './lib/rate-limit.ts';

/** What every feature may be handed; main opens the real ones, the tests their own. */
export interface Platform {
  readonly config: Config;
  readonly db: DataSource;
  readonly now: Now;
  readonly logger: Logger;
  readonly queue: Queue;
  readonly rateLimiter: RateLimiter;
  readonly mailer: Mailer;
  /** The demo's letters; null in production. */
  readonly mailbox: Pick<MailCatcher, 'list'> | null;
  /** Rules on derivations in worker threads. */
  readonly checks: Pick<CheckPool, 'check' | 'healthy'>;
  /** Names what a round's dealing is drawn from; absent: chance. The demo is dealt alike each time. */
  readonly drawSeed?: (round: Round) => string;
}

/** Everything the application is made of: what createApp and the job queue need. */
export interface Composed {
  readonly routes: readonly Route[];
  readonly jobs: readonly JobKind[];
  /** What to say when a named unique constraint stops a write. */
  readonly conflicts: UniqueConflicts;
  readonly findViewer: (sessionToken: string) => Promise<Viewer | null>;
  /** The people whom anybody may try; null outside the demo. */
  readonly demo: DemoService | null;
}

/**
 * Composes everything in one place: each feature's service, its routes and its jobs, and hands one service's
 * function to another, because features never import each other.
 */
export function composeServices(platform: Platform): Composed {
  const { config, db, now, queue, rateLimiter, mailer } = platform;
  const mail = createMailService({ db, now, queue, mailer, baseUrl: config.baseUrl, secret: config.secret });
  const people = composePeople(platform, mail.queueMail);
  const reviewing = composeReviewing(platform, mail.queueMail);
  const writing = composeWriting(platform);
  const rounds = composeRounds(platform, mail.queueMail, reviewing.settling);
  const demo = config.demo ? createDemoService({ db, getToday: rounds.getToday }) : null;
  return {
    routes: [
      ...people.routes,
      ...reviewing.routes,
      ...writing.routes,
      ...rounds.routes,
      ...healthRoutes({ pingDatabase: () => db.query('select 1'), workersHealthy: () => platform.checks.healthy() }),
      ...mailRoutes(mail),
      ...(platform.mailbox ? mailboxRoutes(platform.mailbox) : []),
      ...(demo ? demoRoutes(demo) : []),
    ],
    jobs: [
      ...people.jobs,
      ...reviewing.jobs,
      ...writing.jobs,
      ...rounds.jobs,
      ...mailJobs(mail),
      job({ name: 'sweep-rate-limits', data: z.object({}), cron: '17 3 * * *', handle: () => rateLimiter.sweep() }),
    ],
    conflicts: {
      uq_person_email: { pointer: '/email', detail: 'There is an account with this address. Sign in instead.' },
      uq_person_school_id_user_name: {
        pointer: '/userName',
        detail: 'This user name is taken in your school. Choose another.',
      },
      uq_class_school_id_name: { pointer: '/name', detail: 'Your school has a class of this name. Choose another.' },
      uq_membership_class_id_alias: { pointer: '/alias', detail: 'Somebody has this alias. Choose another.' },
    },
    findViewer: people.findViewer,
    demo,
  };
}

/** Accounts, sessions, classes and the school's own settings. */
function composePeople({ db, now, rateLimiter }: Platform, queueMail: QueueMail) {
  const sessions = createSessions(db, now);
  const people = createPeopleService({ db, now, sessions, rateLimiter, queueMail });
  const classes = createClassesService({ db, now });
  const joining = createJoiningService({
    db,
    now,
    rateLimiter,
    queueMail,
    beginSession: sessions.begin,
    hashPassword,
    refuseCommonPassword,
  });
  const members = createMembersService({
    db,
    now,
    queueMail,
    issueSignInCode: (manager, userId, createdById) => issueSignInCode(manager, userId, createdById, now()),
  });
  const admin = createAdminService({
    db,
    now,
    queueMail,
    endSessions: sessions.endAll,
    inviteStaff: (manager, order) => createInvitation(manager, { ...order, classId: null, asksToJoin: false }),
  });
  return {
    routes: [...peopleRoutes(people), ...classRoutes({ classes, members, joining }), ...adminRoutes(admin)],
    jobs: [job({ name: 'sweep-sessions', data: z.object({}), cron: '47 3 * * *', handle: () => sessions.sweep() })],
    findViewer: sessions.findViewer,
  };
}

/** Findings, answers, disputes, settling and standings. `settling` is for the stage machine of rounds. */
function composeReviewing({ db, now, checks }: Platform, queueMail: QueueMail) {
  const scoring = createScoringService({ now, isWithinOneTerm });
  const { findCurrentVerdicts, findFindingsInForce } = scoring;
  // What was handed in and its task never change, so however often a page is read, its line is checked once.
  const checkOnce = remember<Pick<Verdict, 'steps'>>(1000);
  const reviews = createReviewsService({
    db,
    now,
    findCurrentVerdicts,
    checkLines: (findingId, task, lines) => checkOnce(findingId, () => checks.check(toCheckInput(task, lines))),
  });
  const answers = createAnswersService({ db, now, findCurrentVerdicts, findFindingsInForce });
  const disputes = createDisputesService({ db, now, scoring, findFindingsInForce, queueMail });
  const standings = createStandingsService({ db, now });
  const settling = createSettlingService({
    now,
    findCurrentVerdicts,
    judge: scoring.judge,
    addScores: scoring.add,
  });
  return {
    settling,
    standings,
    routes: [
      ...reviewsRoutes(reviews),
      ...answersRoutes(answers),
      ...disputesRoutes(disputes),
      ...standingsRoutes(standings),
    ],
    jobs: standingsJobs(standings),
  };
}

/** Sheets, what is handed in, its verdicts, and mends. */
function composeWriting({ db, now, queue, checks }: Platform) {
  const verdicts = createVerdictsService({ db, now, queue, check: checks.check, checkerVersion: CHECKER_VERSION });
  const { queueCheck, currentVerdict } = verdicts;
  const sheets = createDerivationsService({ db, now, queueCheck });
  const mends = createMendService({ db, now, queueCheck, currentVerdict });
  return {
    routes: [...verdictsRoutes(verdicts), ...derivationsRoutes(sheets, mends)],
    jobs: verdictsJobs(verdicts),
  };
}

/** Tasks, rounds and their stages. */
function composeRounds({ db, now, queue, drawSeed }: Platform, queueMail: QueueMail, settling: SettlingService) {
  const { openAnswering, settle } = settling;
  const stages = createRoundStages({
    db,
    now,
    queue,
    mail: createRoundMail(queueMail),
    drawSeed,
    openAnswering,
    settle,
  });
  const today = createTodayService({ db, now, readLine });
  const tasks = createTasksService({ db, now, readLine });
  return {
    stages,
    getToday: today.getToday,
    routes: [
      ...tasksRoutes(tasks),
      ...roundsRoutes({
        rounds: createRoundsService({ db, now, stages }),
        people: createPeopleInRoundService({ db, now }),
        time: createRoundTimeService({ db, now, stages }),
        board: createBoardService({ db, now }),
        today,
      }),
    ],
    jobs: roundsJobs(stages),
  };
}
