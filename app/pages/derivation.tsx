import { useQuery, useQueryClient } from '@tanstack/react-query';
import { lazy, Suspense } from 'react';
import { useParams } from 'react-router-dom';
import type { AuthorDerivation, TeacherDerivation } from '../../shared/schemas/review.ts';
import { stepWords } from '../../shared/lib/step-words.ts';
import { AnswerDesk } from '../features/findings/answer-desk.tsx';
import { derivationQuery } from '../features/findings/findings.queries.ts';
import { FoundList } from '../features/findings/found-list.tsx';
import { viewerQuery } from '../features/people/viewer.queries.ts';
import { mendQuery } from '../features/sheet/sheet.queries.ts';
import { AuthorVerdict } from '../features/verdict/author-verdict.tsx';
import { MendSection } from '../features/verdict/mend-section.tsx';
import { MendVerdict } from '../features/verdict/mend-verdict.tsx';
import { TeacherDerivationView } from '../features/verdict/teacher-derivation.tsx';
import { answerQuestion, contestVerdict, overrule } from '../features/verdict/verdict.queries.ts';
import { ApiProblem } from '../lib/api.ts';
import { Page } from '../ui/page.tsx';
import { ErrorState, Waiting } from '../ui/states.tsx';
import { ZoneProvider } from '../ui/time.tsx';
import { NotFound } from './not-found.tsx';

/** A derivation: to its author with findings to answer, then the verdict and the mend; to the teacher from both sides. */
export function Component() {
  const { derivationId = '' } = useParams();
  const derivation = useQuery(derivationQuery(derivationId));
  if (derivation.error instanceof ApiProblem && derivation.error.type === 'not-found') return <NotFound />;
  if (!derivation.data) {
    return (
      <Page>
        <div className="head">
          {derivation.isError ? (
            <ErrorState error={derivation.error} onRetry={() => void derivation.refetch()} />
          ) : (
            <Waiting />
          )}
        </div>
      </Page>
    );
  }
  const { data } = derivation;
  return (
    <ZoneProvider zone={data.round.timeZone}>
      <Page>{data.as === 'teacher' ? <AsTeacher derivation={data} /> : <AsAuthor derivation={data} />}</Page>
    </ZoneProvider>
  );
}

function AsAuthor({ derivation }: { derivation: AuthorDerivation }) {
  const client = useQueryClient();
  const { derivationId } = derivation;
  if (!derivation.settled) return <AnswerDesk derivation={derivation} />;
  const keep = (answer: AuthorDerivation) => client.setQueryData(derivationQuery(derivationId).queryKey, answer);
  return (
    <AuthorVerdict
      derivation={derivation}
      wordStep={stepWords}
      findings={<FoundList derivation={derivation} />}
      mend={derivation.settled.verdict.firstFault === null ? null : <Mend derivationId={derivationId} />}
      onContest={async (words, step) => keep(await contestVerdict(derivationId, step, words))}
      onAnswer={async (answer) => keep(await answerQuestion(derivationId, answer))}
    />
  );
}

const MendSheet = lazy(async () => ({ default: (await import('../features/sheet/mend-sheet.tsx')).MendSheet }));

function Mend({ derivationId }: { derivationId: string }) {
  const viewer = useQuery(viewerQuery);
  const mend = useQuery(mendQuery(derivationId));
  if (!viewer.data) return null;
  return (
    <MendSection isBegun={mend.data?.handedIn != null}>
      <Suspense fallback={<Waiting>Your mend…</Waiting>}>
        <MendSheet
          derivationId={derivationId}
          userId={viewer.data.user.id}
          showVerdict={({ lines, verdict }) => (
            <MendVerdict lines={lines} verdict={{ ...verdict, steps: [...verdict.steps] }} wordStep={stepWords} />
          )}
        />
      </Suspense>
    </MendSection>
  );
}

function AsTeacher({ derivation }: { derivation: TeacherDerivation }) {
  const client = useQueryClient();
  const { derivationId } = derivation;
  return (
    <TeacherDerivationView
      derivation={derivation}
      wordStep={stepWords}
      onOverrule={async (firstFault, reason) => {
        await overrule(derivationId, firstFault, reason);
        await client.invalidateQueries({ queryKey: derivationQuery(derivationId).queryKey });
        await client.invalidateQueries({ queryKey: ['disputes'] });
      }}
    />
  );
}
