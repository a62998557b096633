import './maths-reading.css';
import type { ReadError, Reading } from '../../shared/maths/expression.ts';
import { printLine } from '../../shared/maths/print.ts';
import { DEFAULT_READ_SETTINGS, readLine } from '../../shared/maths/read.ts';
import { wordReadError } from '../../shared/maths/reads-as.ts';
import { lineInWords } from '../../shared/maths/words.ts';
import { explainRefusal } from '../../shared/maths/refusals.ts';
import { Button } from './button.tsx';
import { Maths } from './maths.tsx';
import { FLAG_WORDS, repairOf } from './maths-reading-words.ts';

interface MathsReadingProps {
  readonly id: string;
  readonly tex: string;
  readonly reading: Reading;
  readonly decimal: 'point' | 'comma';
  /** Absent where the line cannot be changed. */
  readonly onChange?: (tex: string) => void;
}

/** What is said under a line of maths on how it was read, where that is not what the eye expects. Never a word on whether it is right. */
export function MathsReading({ id, tex, reading, decimal, onChange }: MathsReadingProps) {
  if (!reading.ok) return <Unread id={id} tex={tex} error={explainRefusal(reading.refusal)} onChange={onChange} />;
  const now = printLine(reading.line, decimal);
  if (reading.alternatives.length > 0 && onChange) {
    return (
      <TwoReadings
        id={id}
        name={`${id}-choice`}
        choices={[reading.line, ...reading.alternatives].map((line) => printLine(line, decimal))}
        {...{ decimal }}
        onChoose={onChange}
      />
    );
  }
  if (reading.flags.length === 0) return null;
  return (
    <p id={id} className="reading-back small muted">
      reads as <Maths tex={now} />: {reading.flags.map((flag) => FLAG_WORDS[flag]).join('; ')}
    </p>
  );
}

interface UnreadProps extends Pick<MathsReadingProps, 'id' | 'tex' | 'onChange'> {
  readonly error: ReadError;
}

function Unread({ id, tex, error, onChange }: UnreadProps) {
  const repair = repairOf(error, tex);
  return (
    <p id={id} className="reading-note small">
      <b>Cannot be read yet.</b> {wordReadError(error)}{' '}
      {repair && onChange ? (
        <Button kind="quiet" small onClick={() => onChange(repair.tex)}>
          {repair.label}
        </Button>
      ) : null}
    </p>
  );
}

interface TwoReadingsProps {
  readonly id: string;
  readonly name: string;
  /** How it is read now comes first. */
  readonly choices: readonly string[];
  readonly decimal: 'point' | 'comma';
  readonly onChoose: (tex: string) => void;
}

function TwoReadings({ id, name, choices, decimal, onChoose }: TwoReadingsProps) {
  return (
    <fieldset id={id} className="reading-note">
      <legend className="small">
        <b>Two readings.</b> Which do you mean?
      </legend>
      <div className="reading-choices">
        {choices.map((choice, i) => (
          <label key={choice} className="reading-choice">
            {/* Choosing what is read already settles it as well, so a click counts, not only a change. */}
            <input
              type="radio"
              name={name}
              aria-label={inWords(choice, decimal)}
              checked={i === 0}
              readOnly
              onClick={() => onChoose(choice)}
            />
            <Maths tex={choice} display />
            {i === 0 ? <em>reads as this now</em> : null}
          </label>
        ))}
      </div>
    </fieldset>
  );
}

function inWords(tex: string, decimal: 'point' | 'comma'): string {
  const reading = readLine(tex, { ...DEFAULT_READ_SETTINGS, decimal });
  return reading.ok ? lineInWords(reading.line) : tex;
}
