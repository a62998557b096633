import { Words } from './words.tsx';
import type { StepWords } from '../../../shared/lib/step-words.ts';

/** What is said of one step: how it fares, what shows it, and how that was found. */
export function StepEvidence({ words, summary = true }: { readonly words: StepWords; readonly summary?: boolean }) {
  return (
    <div className="small">
      {summary ? (
        <p>
          <Words sentence={words.summary} />
        </p>
      ) : null}
      {words.evidence.map((sentence, i) => (
        <p key={i} className="ev">
          <Words sentence={sentence} />
        </p>
      ))}
      {words.notes.map((sentence, i) => (
        <p key={i}>
          <Words sentence={sentence} />
        </p>
      ))}
      {words.reached ? <p className="muted">{words.reached}</p> : null}
    </div>
  );
}
