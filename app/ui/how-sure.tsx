import { useId } from 'react';
import { signed } from './num.tsx';

/** The nine places, in words, from 0 to 8. */
export const SURE_WORDS = [
  'can’t tell',
  'barely sure',
  'a little sure',
  'somewhat sure',
  'half sure',
  'fairly sure',
  'quite sure',
  'nearly certain',
  'certain',
] as const;

const PLACES = SURE_WORDS.length;
const LAST = PLACES - 1;

/** What would be earned or lost if this turned out to be so. */
export interface SureOutcome {
  readonly label: string;
  readonly points: number;
}

export interface HowSureProps {
  readonly label?: string;
  /** A place from 0 (can’t tell) to 8 (certain). */
  readonly value: number;
  readonly onChange: (place: number) => void;
  /** What each outcome would bring at a place; without it there is no chart. */
  readonly outcomes?: (place: number) => readonly SureOutcome[];
  readonly hint?: string;
  readonly disabled?: boolean;
}

const across = (place: number) => `${(place / LAST) * 100}%`;

/** The slider's picture: a small edge whose stroke fills as sureness rises. */
function Track({ value }: { value: number }) {
  return (
    <svg className="sure-track" aria-hidden="true">
      <line className="base" x1="0" x2="100%" y1="15" y2="15" />
      {SURE_WORDS.map((word, place) => (
        <line
          key={word}
          className={place <= value ? 'on' : undefined}
          x1={across(place)}
          x2={across(place)}
          y1="9"
          y2="21"
        />
      ))}
      <line className="fill" x1="0" x2={across(value)} y1="15" y2="15" />
      <line className="fill" x1={across(value)} x2={across(value)} y1="3" y2="27" />
    </svg>
  );
}

function largest(outcomes: (place: number) => readonly SureOutcome[]): number {
  const all = SURE_WORDS.flatMap((_, place) => outcomes(place).map(({ points }) => Math.abs(points)));
  return Math.max(1, ...all);
}

/** Room kept at the ends of the bars for their numbers. */
const BAR_SHARE = 68;

function Chart({ outcomes, value }: { outcomes: (place: number) => readonly SureOutcome[]; value: number }) {
  const top = largest(outcomes);
  return (
    <dl className="outcomes">
      {outcomes(value).map(({ label, points }) => {
        const width = `${(Math.abs(points) / top) * BAR_SHARE}%`;
        return (
          <div key={label}>
            <dt>{label}</dt>
            <dd className={points > 0 ? 'earns' : undefined}>
              <span className="loss">
                {points < 0 ? signed(points) : null}
                {points < 0 ? <i style={{ width }} aria-hidden="true" /> : null}
              </span>
              <span className="gain">
                {points > 0 ? <i style={{ width }} aria-hidden="true" /> : null}
                {points < 0 ? null : signed(points)}
              </span>
            </dd>
          </div>
        );
      })}
    </dl>
  );
}

/** How sure, on nine places, with what could be earned and lost on one axis below. */
export function HowSure({ label = 'How sure are you?', value, onChange, outcomes, hint, disabled }: HowSureProps) {
  const id = useId();
  return (
    <div className="sure">
      <label className="flabel" htmlFor={id}>
        {label} <span className="sure-word">{SURE_WORDS[value]}</span>
      </label>
      <div className="sure-slide">
        <Track value={value} />
        <input
          id={id}
          type="range"
          min={0}
          max={LAST}
          step={1}
          value={value}
          disabled={disabled}
          aria-valuetext={SURE_WORDS[value]}
          onChange={(event) => onChange(Number(event.currentTarget.value))}
        />
      </div>
      <p className="sure-ends" aria-hidden="true">
        <span>{SURE_WORDS[0]}</span>
        <span>{SURE_WORDS[LAST]}</span>
      </p>
      {outcomes ? <Chart outcomes={outcomes} value={value} /> : null}
      {hint ? <p className="fine muted mt-1.5">{hint}</p> : null}
    </div>
  );
}
