import type { ReactNode } from 'react';
import type { BoardAnswer, BoardPerson } from '../../../shared/schemas/round.ts';
import { sayDuration } from '../../lib/dates.ts';
import { classNames } from '../../ui/class-names.ts';
import { SmallEdge, type SmallStep } from '../../ui/small-edge.tsx';
import { shortInstant } from './round-words.ts';

interface BoardPeopleProps {
  readonly board: BoardAnswer;
  /** Absent where the reader may not act, or sees no names. */
  readonly onChoose?: (person: BoardPerson) => void;
}

interface Figure {
  readonly count: number;
  readonly words: string;
}

interface Group {
  readonly title: string;
  readonly note?: string;
  readonly people: readonly BoardPerson[];
  readonly isPressing?: boolean;
  readonly row: (person: BoardPerson) => Row;
}

interface Row {
  readonly edge: readonly SmallStep[];
  readonly edgeWords: string;
  readonly words: string;
  readonly isLive?: boolean;
  /** Times and figures stand in the text face. */
  readonly isTime?: boolean;
}

const NOW_MS = 60_000;

/** The four figures and the people behind them, as far as the stage goes. */
export function BoardPeople({ board, onChoose }: BoardPeopleProps) {
  const { stage } = board.round;
  if (stage === 'reviewing') return <Lists {...reviewingLists(board)} onChoose={onChoose} />;
  if (stage === 'answering' || stage === 'settled') return <Lists {...answeringLists(board)} onChoose={onChoose} />;
  return <Lists {...writingLists(board)} onChoose={onChoose} />;
}

interface ListsProps {
  readonly figures: readonly Figure[];
  readonly left: readonly Group[];
  readonly right: readonly Group[];
  readonly below: readonly Group[];
  readonly onChoose?: (person: BoardPerson) => void;
}

/** So many more people on one side leave a hole on the other: then the long list goes below, in two columns. */
const UNEVEN = 8;

function Lists({ figures, left, right, below, onChoose }: ListsProps) {
  const filled = (groups: readonly Group[]) => groups.filter(({ people }) => people.length > 0);
  const size = (groups: readonly Group[]) => groups.reduce((sum, { people }) => sum + people.length, 0);
  const isUneven = Math.abs(size(left) - size(right)) > UNEVEN;
  const columns = isUneven ? [] : [filled(left), filled(right)];
  const wide = isUneven ? [...filled(left), ...filled(right), ...filled(below)] : filled(below);
  return (
    <section aria-label="How everyone stands">
      <ul className="figures">
        {figures.map(({ count, words }) => (
          <li key={words}>
            <b className="num">{count}</b> {words}
          </li>
        ))}
      </ul>
      <div className="lists">
        {columns.map((groups, i) => (
          <div key={i}>
            {groups.map((group) => (
              <PeopleGroup key={group.title} group={group} onChoose={onChoose} />
            ))}
          </div>
        ))}
      </div>
      {wide.map((group) => (
        <PeopleGroup key={group.title} group={group} onChoose={onChoose} isWide />
      ))}
    </section>
  );
}

function PeopleGroup({
  group,
  onChoose,
  isWide,
}: {
  readonly group: Group;
  readonly onChoose?: (person: BoardPerson) => void;
  readonly isWide?: boolean;
}) {
  return (
    <>
      <h2 className="list-head">
        {group.title} {group.note ? <span className="muted">{group.note}</span> : null}
      </h2>
      <ol className={isWide ? 'rows two-wide' : 'rows'}>
        {group.people.map((person, i) => {
          const row = group.row(person);
          return (
            <li key={person.userId ?? i} className={group.isPressing ? 'pressing' : undefined}>
              <PersonName person={person} onChoose={onChoose} />
              {row.edge.length > 0 ? (
                <SmallEdge states={row.edge} step={12} label={row.edgeWords} />
              ) : (
                <span className="fine muted">–</span>
              )}
              <span className={classNames('now', row.isLive && 'live', row.isTime && 'num')}>{row.words}</span>
            </li>
          );
        })}
      </ol>
    </>
  );
}

function PersonName({
  person,
  onChoose,
}: {
  person: BoardPerson;
  onChoose?: (person: BoardPerson) => void;
}): ReactNode {
  const extra = person.ownWritingEndsAt || person.ownReviewingEndsAt ? ' · more time' : '';
  if (!onChoose || !person.userId) return <span>{person.name}</span>;
  return (
    <span>
      <button type="button" className="name" onClick={() => onChoose(person)}>
        {person.name}
      </button>
      {extra ? <span className="fine muted">{extra}</span> : null}
    </span>
  );
}

const plain = (count: number): SmallStep[] => Array.from({ length: Math.min(count, 6) }, () => 'plain');

function writingLists({ people, round, now }: BoardAnswer): Omit<ListsProps, 'onChoose'> {
  const of = (state: BoardPerson['state']) => people.filter((person) => person.state === state);
  const since = (iso: string | null) => Date.parse(now) - Date.parse(iso ?? now);
  const lines = (person: BoardPerson, words: string, isLive = false): Row => ({
    edge: plain(person.lines),
    edgeWords: `${person.lines} lines`,
    words,
    isLive,
  });
  const ago = (person: BoardPerson): Row => {
    const ms = since(person.savedAt);
    if (ms < NOW_MS) return lines(person, 'writes now', true);
    const isToday = ms < 12 * 3_600_000;
    return lines(person, isToday ? `${sayDuration(ms)} ago` : shortInstant(person.savedAt ?? now, round.timeZone, now));
  };
  const [stuck, notBegun, writing, handedIn] = [of('stuck'), of('not-begun'), of('writing'), of('handed-in')];
  return {
    figures: [
      { count: handedIn.length, words: 'handed in' },
      { count: writing.length, words: 'writing' },
      { count: stuck.length, words: 'stuck' },
      { count: notBegun.length, words: 'not begun' },
    ],
    left: [
      {
        title: 'Stuck',
        note: 'no new line for 15 min',
        people: stuck,
        isPressing: true,
        row: (person) =>
          lines(person, `line ${person.lines}, ${sayDuration(since(person.lineAddedAt ?? person.savedAt))}`),
      },
      {
        title: 'Not begun',
        people: notBegun,
        row: (person) => lines(person, person.hasOpened ? 'has read the task' : 'not opened'),
      },
    ],
    right: [{ title: 'Writing', people: writing, row: ago }],
    below: [
      {
        title: 'Handed in',
        people: handedIn,
        row: (person) => {
          const at = shortInstant(person.handedInAt ?? now, round.timeZone, now);
          return {
            ...lines(person, `${at}${person.late ? ', late' : ''}${person.tooShort ? ', too short' : ''}`),
            isTime: true,
          };
        },
      },
      { title: 'Excused', people: of('excused'), row: (person) => lines(person, 'excused') },
    ],
  };
}

function reviewingLists({ people, alerts }: BoardAnswer): Omit<ListsProps, 'onChoose'> {
  const dealt = people.filter(({ state, reviews }) => state !== 'excused' && reviews.dealt > 0);
  const done = dealt.filter(({ reviews }) => reviews.done === reviews.dealt);
  const open = dealt.filter(({ reviews }) => reviews.done < reviews.dealt);
  const begun = open.filter(({ reviews }) => reviews.begun + reviews.done > 0);
  const idle = open.filter(({ reviews }) => reviews.begun + reviews.done === 0);
  const row = ({ reviews }: BoardPerson): Row => ({
    edge: Array.from({ length: reviews.dealt }, (_, i): SmallStep => (i < reviews.done ? 'walked' : 'plain')),
    edgeWords: `${reviews.done} of ${reviews.dealt} reviews handed in`,
    words: `${reviews.done} of ${reviews.dealt}${reviews.begun > 0 ? `, ${reviews.begun} begun` : ''}`,
    isTime: true,
  });
  const total = (count: (person: BoardPerson) => number) => dealt.reduce((sum, person) => sum + count(person), 0);
  const waiting = people.filter(({ state, reviews }) => state !== 'excused' && reviews.dealt === 0);
  return {
    figures: [
      {
        count: total(({ reviews }) => reviews.done),
        words: `of ${total(({ reviews }) => reviews.dealt)} reviews handed in`,
      },
      { count: done.length, words: 'done' },
      { count: begun.length, words: 'under way' },
      { count: idle.length, words: 'not begun' },
    ],
    left: [
      { title: 'Not begun', people: idle, isPressing: alerts.some(({ kind }) => kind === 'reviews-not-begun'), row },
      {
        title: 'Has nothing to review yet',
        people: waiting,
        row: (person) => ({ ...row(person), words: waitingWords(person), isTime: false }),
      },
    ],
    right: [{ title: 'Under way', people: begun, row }],
    below: [
      { title: 'Done', people: done, row },
      {
        title: 'Excused',
        people: people.filter(({ state }) => state === 'excused'),
        row: (p) => ({ ...row(p), words: 'excused', isTime: false }),
      },
    ],
  };
}

function waitingWords({ ownWritingEndsAt, handedInAt }: BoardPerson): string {
  return ownWritingEndsAt && !handedInAt ? 'still writes' : 'waits';
}

function answeringLists({ people, disputesOpen, round }: BoardAnswer): Omit<ListsProps, 'onChoose'> {
  const authors = people.filter(({ findings }) => findings.received > 0);
  const openOf = ({ findings }: BoardPerson) => findings.received - findings.accepted - findings.contested;
  const row = (person: BoardPerson): Row => {
    const { received } = person.findings;
    const answered = received - openOf(person);
    return {
      edge: Array.from({ length: received }, (_, i): SmallStep => (i < answered ? 'walked' : 'plain')),
      edgeWords: `${answered} of ${received} findings answered`,
      words: `${answered} of ${received}`,
      isTime: true,
    };
  };
  const sum = (count: (person: BoardPerson) => number) => authors.reduce((all, person) => all + count(person), 0);
  const isOver = round.stage === 'settled';
  return {
    figures: [
      { count: sum(({ findings }) => findings.received), words: 'steps marked' },
      { count: sum(({ findings }) => findings.accepted), words: 'accepted' },
      { count: sum(({ findings }) => findings.contested), words: 'contested' },
      isOver
        ? { count: disputesOpen, words: disputesOpen === 1 ? 'dispute open' : 'disputes open' }
        : { count: sum(openOf), words: 'to be answered' },
    ],
    left: [{ title: isOver ? 'Left unanswered' : 'To be answered', people: authors.filter((p) => openOf(p) > 0), row }],
    right: [{ title: 'Answered', people: authors.filter((p) => openOf(p) === 0), row }],
    below: [
      {
        title: 'Nothing to answer',
        people: people.filter(({ findings }) => findings.received === 0),
        row: (person) => ({
          edge: plain(person.lines),
          edgeWords: `${person.lines} lines`,
          words: person.state === 'excused' ? 'excused' : person.handedInAt ? 'handed in' : 'nothing handed in',
        }),
      },
    ],
  };
}
