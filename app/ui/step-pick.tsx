import type { KeyboardEvent } from 'react';

export interface StepPickProps {
  /** The steps of one derivation share a name. */
  readonly name: string;
  readonly step: number;
  readonly isPicked: boolean;
  /** Whether the Tab key stops here: the step in view, one of the group. */
  readonly isStop: boolean;
  readonly onPick: (step: number) => void;
  /** The step in view changed, by the arrow keys. */
  readonly onWalk: (step: number) => void;
  /** Left (-1) and right (1), to choose within the line. */
  readonly onSideways?: (by: -1 | 1) => void;
  /** Instead of `step 2, from line 1 to line 2`. */
  readonly label?: string;
}

function neighbours(from: HTMLInputElement): readonly HTMLInputElement[] {
  const group = from.closest('ol') ?? document;
  return [...group.querySelectorAll<HTMLInputElement>(`input[name="${CSS.escape(from.name)}"]`)];
}

/** A radio button over the edge of a step. Arrow keys walk without picking; Enter, Space and a click pick. */
export function StepPick(props: StepPickProps) {
  const { name, step, isPicked, isStop, onPick, onWalk, onSideways, label } = props;
  const walk = (event: KeyboardEvent<HTMLInputElement>, by: -1 | 1) => {
    event.preventDefault();
    const all = neighbours(event.currentTarget);
    const next = all[all.indexOf(event.currentTarget) + by];
    if (!next) return;
    next.focus();
    onWalk(Number(next.value));
  };
  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.key === 'ArrowUp') walk(event, -1);
    else if (event.key === 'ArrowDown') walk(event, 1);
    else if (event.key === 'ArrowLeft' || event.key === 'ArrowRight') {
      event.preventDefault();
      onSideways?.(event.key === 'ArrowLeft' ? -1 : 1);
    } else if (event.key === 'Enter') {
      event.preventDefault();
      onPick(step);
    }
  };
  return (
    <>
      <label className="pick">
        <input
          type="radio"
          className="sr-only"
          name={name}
          value={step}
          checked={isPicked}
          tabIndex={isStop ? 0 : -1}
          onChange={() => onPick(step)}
          onKeyDown={onKeyDown}
        />
        <span className="sr-only">
          {label ?? `step ${step}, from ${step === 1 ? 'the given line' : `line ${step - 1}`} to line ${step}`}
        </span>
      </label>
      <i className="pick-ring" aria-hidden="true" />
    </>
  );
}
