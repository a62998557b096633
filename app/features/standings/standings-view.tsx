import './standings.css';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { OwnStanding, StandingsAnswer, Withheld } from '../../../shared/schemas/standings.ts';
import { counted } from './standing-words.ts';
import { paths } from '../../lib/paths.ts';
import { Button } from '../../ui/button.tsx';
import { figure } from '../../ui/num.tsx';
import { Head } from '../../ui/page.tsx';
import { Time } from '../../ui/time.tsx';
import { ProgressChart } from './progress-chart.tsx';
import { standingHeadline } from './standing-words.ts';
import { setOptOut, standingsQuery } from './standings.queries.ts';
import { SurenessFigure } from './sureness-figure.tsx';

/** Own line first, then the upper third by alias, and the own row without a place. */
export function StandingsView({
  standings,
  chooser,
}: {
  readonly standings: StandingsAnswer;
  readonly chooser?: ReactNode;
}) {
  const { own, className } = standings;
  return (
    <>
      <Head
        where={
          <>
            {className} · findings of the last 90 days {chooser}
          </>
        }
        h1={own ? standingHeadline(own) : 'How well the class reviews'}
      />
      {own && own.rounds.length > 0 ? <ProgressChart rounds={own.rounds} /> : null}
      {own ? <SurenessFigure sureness={own.sureness} /> : null}
      <section className="upper">
        <h2>The upper third</h2>
        <p className="small muted">By mean points, not by how many. Under aliases only; new every week.</p>
        <Listed standings={standings} />
        {own ? <OwnRow own={own} standings={standings} /> : null}
      </section>
      <div className="decides mt-10">
        <p>
          The checker advises, {own ? 'your teacher decides' : 'you decide'}.{' '}
          {own ? 'Points can be contested for a week, from the review itself.' : null}{' '}
          <span className="muted">School rules and local law on pupils’ data and marks stand above this list.</span>
        </p>
      </div>
    </>
  );
}

function Listed({ standings }: { standings: StandingsAnswer }) {
  const { listed, withheld, madeAt } = standings;
  if (withheld) return <p className="withheld">{WITHHELD[withheld]}</p>;
  if (listed.length === 0) return <p className="withheld">Nobody of the upper third wishes to be shown.</p>;
  return (
    <>
      <table className="list">
        <caption className="sr-only">The upper third of the class</caption>
        <thead>
          <tr>
            <th scope="col" className="pl">
              <span className="sr-only">Place</span>
            </th>
            <th scope="col">Alias</th>
            <th scope="col" className="n">
              Standing
            </th>
          </tr>
        </thead>
        <tbody>
          {listed.map(({ place, alias, standing }) => (
            <tr key={alias}>
              <td className="pl num">{place}</td>
              <th scope="row">{alias}</th>
              <td className="n num">{figure(standing)}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {madeAt ? (
        <p className="fine muted mt-2">
          Made <Time iso={madeAt} style="date" />.
        </p>
      ) : null}
    </>
  );
}

const WITHHELD: Record<Withheld, string> = {
  'not-yet': 'The first list comes with the new week, at least a day after a round has settled.',
  'too-few': 'There is no list while fewer than eight people have four findings each.',
  'no-spread': 'There are no real differences yet: what sets people apart is no more than chance.',
  off: 'The list is switched off. Your own figures are here all the same.',
};

function OwnRow({ own, standings }: { own: OwnStanding; standings: StandingsAnswer }) {
  const client = useQueryClient();
  const act = useMutation({
    mutationFn: () => setOptOut(standings.classId, !own.optedOut),
    onSuccess: (answer) => client.setQueryData(standingsQuery(standings.classId).queryKey, answer),
  });
  return (
    <div className="youare">
      <p>
        <b>
          You, as {own.alias}: {own.standing === null ? 'no finding yet' : figure(own.standing)}.
        </b>{' '}
        {own.change === null ? null : changeWords(own.change)} Only you and your teacher see this line.{' '}
        {own.optedOut ? 'You are not shown in the list, and lose nothing by it.' : null}
      </p>
      <div className="acts">
        <Link className="lk s" to={paths.account()}>
          Change alias
        </Link>
        <Button kind="quiet" small busy={act.isPending} onClick={() => act.mutate()}>
          {own.optedOut ? 'Show me again' : 'Don’t show me'}
        </Button>
      </div>
    </div>
  );
}

function changeWords(change: number): string {
  if (change === 0) return 'As a week ago.';
  return `${counted(Math.abs(change), 'point')} ${change > 0 ? 'more' : 'fewer'} than a week ago.`;
}
