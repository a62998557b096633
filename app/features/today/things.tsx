import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { AnswerThing, LookThing, ReviewThing, TodayThing, WriteThing } from '../../../shared/schemas/today.ts';
import { formatInstant, sayDay } from '../../lib/dates.ts';
import { paths } from '../../lib/paths.ts';
import { LinkButton } from '../../ui/button.tsx';
import { Derivation } from '../../ui/derivation.tsx';
import { SmallEdge, type SmallStep } from '../../ui/small-edge.tsx';
import { TimeLeft } from '../../ui/time.tsx';
import { countWord, ordinal, plural, sayLines, sayOutcome } from './today-words.ts';
import { When } from './when.tsx';

interface ThingProps<T> {
  readonly thing: T;
  /** The first thing has the page's one button. */
  readonly isFirst: boolean;
}

/** One thing to do, with the instant it is due in the gutter. */
export function Thing({ thing, isFirst }: ThingProps<TodayThing>) {
  switch (thing.kind) {
    case 'write':
      return <Write thing={thing} isFirst={isFirst} />;
    case 'review':
      return <ReviewTwo thing={thing} isFirst={isFirst} />;
    case 'answer':
      return <AnswerFindings thing={thing} isFirst={isFirst} />;
    case 'look':
      return <Look thing={thing} isFirst={isFirst} />;
  }
}

function Context({ thing, children }: { readonly thing: TodayThing; readonly children?: ReactNode }) {
  const stage = { write: ', writing', review: ', reviewing', answer: ', answering', look: '' }[thing.kind];
  return (
    <p className="ctx">
      {thing.title} · round {thing.number}
      {stage}
      {children}
    </p>
  );
}

function Act({ to, children, isFirst }: { readonly to: string; readonly children: string; readonly isFirst: boolean }) {
  return (
    <LinkButton to={to} kind={isFirst ? 'primary' : 'quiet'} small={!isFirst}>
      {children}
    </LinkButton>
  );
}

function sentence(words: string): string {
  return `${words.charAt(0).toUpperCase()}${words.slice(1)}.`;
}

/** Where the reader stopped, and what the sheet could not read; never a word on right or wrong. */
function whereLeft({ last, unread, twoWays }: WriteThing): string {
  if (!last) return '';
  const cannot = unread.length > 0 ? `${sayLines(unread)} cannot be read yet` : '';
  const two = twoWays.length > 0 ? `${sayLines(twoWays)} can be read in two ways` : '';
  const notes = [two, cannot].filter(Boolean).join(', ');
  return `You stopped in line ${last.number}.${notes ? ` ${sentence(notes)}` : ''}`;
}

function Write({ thing, isFirst }: ThingProps<WriteThing>) {
  const to = paths.write(thing.roundId);
  const { last } = thing;
  return (
    <article className="it">
      <When iso={thing.dueAt} zone={thing.timeZone} />
      <div className="what">
        <h2>
          <Link to={to}>{thing.begun ? 'Finish your derivation' : 'Write your derivation'}</Link>
        </h2>
        <Context thing={thing}>
          {' · '}
          <TimeLeft iso={thing.dueAt} />
        </Context>
        {last ? <p className="small mt-2">{whereLeft(thing)}</p> : null}
      </div>
      {last && isFirst ? (
        <Derivation
          layout="narrow"
          from={last.number}
          label="The last line you typed"
          lines={[{ id: 'last', tex: last.tex, state: 'plain', words: null, spoken: `line ${last.number}` }]}
        />
      ) : null}
      <div className="what below">
        <div className={last && isFirst ? 'acts' : 'acts mt-3'}>
          <Act to={to} isFirst={isFirst}>
            {thing.begun ? 'Go on writing' : 'Begin'}
          </Act>
          {thing.begun && isFirst ? <span className="small muted">Everything typed is saved.</span> : null}
        </div>
      </div>
    </article>
  );
}

const REVIEW_WORDS = {
  'not-begun': ['not begun', 'Begin'],
  begun: ['begun', 'Go on'],
  'handed-in': ['handed in', 'Look again'],
  'set-aside': ['set aside', 'Look again'],
} as const;

function ReviewTwo({ thing, isFirst }: ThingProps<ReviewThing>) {
  const open = thing.reviews.filter(({ state }) => state === 'not-begun' || state === 'begun');
  const next = open.find(({ state }) => state === 'begun') ?? open[0];
  return (
    <article className="it">
      <When iso={thing.dueAt} zone={thing.timeZone} />
      <div className="what">
        <h2>
          <Link to={paths.review(next?.reviewId ?? '')}>
            Review {countWord(open.length).toLowerCase()} {open.length === 1 ? 'derivation' : 'derivations'}
          </Link>
        </h2>
        <Context thing={thing} />
        <ul className="two">
          {thing.reviews.map((review, i) => {
            const [words, act] = REVIEW_WORDS[review.state];
            const state: SmallStep = review.state === 'handed-in' ? 'walked' : 'plain';
            return (
              <li key={review.reviewId}>
                <span className="edge-room">
                  <SmallEdge states={Array.from({ length: review.steps }, () => state)} isDecoration />
                </span>
                <span>
                  {ordinal(i)}: {plural(review.steps, 'step')}, {words}
                </span>
                {isFirst && review === next ? null : (
                  <LinkButton to={paths.review(review.reviewId)} small>
                    {act}
                  </LinkButton>
                )}
              </li>
            );
          })}
        </ul>
        {isFirst && next ? (
          <div className="acts mt-4">
            <Act to={paths.review(next.reviewId)} isFirst>
              {next.state === 'begun' ? 'Go on reviewing' : 'Begin reviewing'}
            </Act>
          </div>
        ) : null}
      </div>
    </article>
  );
}

function AnswerFindings({ thing, isFirst }: ThingProps<AnswerThing>) {
  const to = paths.derivation(thing.derivationId);
  const { first, count } = thing;
  return (
    <article className="it">
      <When iso={thing.dueAt} zone={thing.timeZone} />
      <div className="what">
        <h2>
          <Link to={to}>
            Answer {countWord(count).toLowerCase()} {count === 1 ? 'finding' : 'findings'}
          </Link>
        </h2>
        <Context thing={thing} />
        {first ? (
          <p className="say">
            A reviewer marks your step {first.step}
            {first.why ? `: “${first.why}”` : '.'}
          </p>
        ) : null}
        <div className="acts mt-2">
          <Act to={to} isFirst={isFirst}>
            {count === 1 ? 'Answer it' : 'Answer them'}
          </Act>
        </div>
      </div>
    </article>
  );
}

type Own = NonNullable<LookThing['own']>;

function statesOf({ steps, outcome, firstFault }: Own): SmallStep[] {
  return Array.from({ length: steps }, (_, i): SmallStep => {
    if (outcome === 'sound') return 'holds';
    if (outcome === 'undecided' || firstFault === null) return 'plain';
    return i + 1 < firstFault ? 'holds' : i + 1 === firstFault ? 'fault' : 'carried';
  });
}

function sayOwn({ outcome, firstFault, mend }: Own): string {
  if (outcome === 'sound') return 'Yours: every step holds';
  if (outcome === 'undecided' || firstFault === null) return 'Yours: not decided, nobody is scored on it';
  const mended = { none: 'not mended yet', begun: 'the mend is begun', 'handed-in': 'mended' }[mend];
  return `Yours: first fault at step ${firstFault}, ${mended}`;
}

function Look({ thing, isFirst }: ThingProps<LookThing>) {
  const { own, reviews } = thing;
  const to = own ? paths.derivation(own.derivationId) : paths.review(reviews[0]?.reviewId ?? '');
  return (
    <article className="it">
      <When iso={thing.settledAt} zone={thing.timeZone} word="settled" />
      <div className="what">
        <h2>
          <Link to={to}>Look at a settled round</Link>
        </h2>
        <Context thing={thing} />
        <ul className="two">
          {own ? (
            <li>
              <span className="edge-room">
                <SmallEdge states={statesOf(own)} isDecoration />
              </span>
              <span>{sayOwn(own)}</span>
              {isFirst ? null : (
                <LinkButton to={to} small>
                  See why
                </LinkButton>
              )}
            </li>
          ) : null}
          {reviews.map((review, i) => (
            <li key={review.reviewId}>
              <span>
                {ordinal(i)} review: {sayOutcome(review.outcome)}
              </span>
              <LinkButton to={paths.review(review.reviewId)} small>
                See points
              </LinkButton>
            </li>
          ))}
        </ul>
        {isFirst ? (
          <div className="acts mt-4">
            <Act to={to} isFirst>
              See why
            </Act>
          </div>
        ) : null}
        <p className="fine muted mt-2">
          The checker advises, your teacher decides. You can contest until{' '}
          <time dateTime={thing.contestUntil} title={formatInstant(thing.contestUntil, thing.timeZone, 'date-time')}>
            {sayDay(thing.contestUntil, thing.timeZone)}
          </time>
          .
        </p>
      </div>
    </article>
  );
}
