import type { ReactNode } from 'react';
import type { AuthorDerivation } from '../../../shared/schemas/review.ts';
import { paths } from '../../lib/paths.ts';
import { LinkButton } from '../../ui/button.tsx';
import { Both, Head } from '../../ui/page.tsx';
import { Time } from '../../ui/time.tsx';
import { Decides } from './decides.tsx';
import { Question } from './question.tsx';
import { VerdictEdge, type WordStep } from './verdict-edge.tsx';
import { headline, leadOf } from './verdict-words.ts';

export interface AuthorVerdictProps {
  readonly derivation: AuthorDerivation;
  readonly wordStep: WordStep;
  /** What the reviewers found. */
  readonly findings: ReactNode;
  /** The author's corrected derivation. */
  readonly mend: ReactNode;
  readonly onContest: (words: string, step: number) => Promise<unknown>;
  readonly onAnswer: (answer: string) => Promise<unknown>;
}

/** The verdict on the own derivation, once the round is settled. */
export function AuthorVerdict({ derivation, wordStep, findings, mend, onContest, onAnswer }: AuthorVerdictProps) {
  const { round, lines, settled } = derivation;
  if (!settled) return null;
  const { verdict, contest } = settled;
  return (
    <>
      <Head
        both
        where={
          <>
            Round {round.number} · settled {round.settledAt ? <Time iso={round.settledAt} style="date" /> : null} · your
            derivation
          </>
        }
        h1={headline(verdict)}
        lead={leadOf(verdict)}
      />
      <VerdictEdge lines={lines} verdict={verdict} wordStep={wordStep} reveal />
      {verdict.reason ? (
        <Both>
          <div className="ruled-words">
            <p className="small muted">Your teacher ruled on this.</p>
            <p>“{verdict.reason}”</p>
          </div>
        </Both>
      ) : null}
      {findings}
      <Both>
        <Decides
          what="this verdict"
          contest={contest}
          steps={{ count: lines.length - 1, proposed: verdict.firstFault ?? 1 }}
          onContest={onContest}
        >
          {contest.mine?.question ? (
            <Question question={contest.mine.question} answer={contest.mine.answer} onAnswer={onAnswer} />
          ) : null}
        </Decides>
      </Both>
      {mend}
      <Both className="mt-6">
        <LinkButton to={paths.today()}>Back to today</LinkButton>
      </Both>
    </>
  );
}
