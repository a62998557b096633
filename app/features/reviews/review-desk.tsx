import './reviews.css';
import { useMemo, useState } from 'react';
import type { ReviewAnswer } from '../../../shared/schemas/review.ts';
import { termsOfLine } from '../../../shared/lib/within-one-term.ts';
import { toEdgeLines } from '../../lib/edge-lines.ts';
import { Derivation } from '../../ui/derivation.tsx';
import { Kbd } from '../../ui/kbd.tsx';
import { StepPick } from '../../ui/step-pick.tsx';
import { FindingForm } from './finding-form.tsx';
import { useDraft } from './use-draft.ts';

/** The derivation with the reviewer's bracket, and the finding on its leader. */
export function ReviewDesk({ review }: { readonly review: ReviewAnswer }) {
  const { keeper, view } = useDraft(review);
  const { draft } = view;
  const { lines, task } = review;
  const picked = typeof draft.pick === 'number' ? draft.pick : null;
  const [walked, setWalked] = useState(picked ?? 1);
  const terms = useMemo(
    () => (picked === null ? [] : termsOfLine(lines[picked]?.tex ?? '', task.settings)),
    [lines, picked, task.settings],
  );
  const marked = terms.findIndex(({ start, end }) => start === draft.markedSpan?.start && end === draft.markedSpan.end);
  const mark = (index: number) => keeper.edit({ markedSpan: index === marked ? null : (terms[index] ?? null) });
  const pick = (step: number) => {
    setWalked(step);
    if (step !== picked) keeper.edit({ pick: step, markedSpan: null });
  };
  const moveMark = (step: number, by: -1 | 1) => {
    if (step !== picked || terms.length === 0) return;
    const next = marked < 0 ? (by > 0 ? 0 : terms.length - 1) : marked + by;
    keeper.edit({ markedSpan: terms[next] ?? null });
  };
  const edgeLines = toEdgeLines(lines, ({ number }) => ({
    state: number === 0 ? undefined : 'plain',
    isMuted: number !== walked && number !== walked - 1,
    isCurrent: number === walked,
    bracket: number === picked ? Math.max(0.15, draft.sureness / 8) : undefined,
    terms:
      number === picked && terms.length > 0
        ? { spans: terms, picked: marked < 0 ? null : marked, onPick: mark }
        : undefined,
    control:
      number === 0 ? undefined : (
        <StepPick
          name={`step-${review.reviewId}`}
          step={number}
          isPicked={number === picked}
          isStop={number === walked}
          onPick={pick}
          onWalk={setWalked}
          onSideways={(by) => moveMark(number, by)}
        />
      ),
  }));
  return (
    <Derivation
      layout="review"
      className="full"
      label="The derivation, step by step"
      lines={edgeLines}
      aside={
        <FindingForm
          review={review}
          keeper={keeper}
          view={view}
          markedTex={marked < 0 ? null : texOf(lines[picked ?? 0]?.tex, terms[marked])}
          canMark={terms.length > 0}
        />
      }
      foot={
        <p>
          <span className="whitespace-nowrap">
            <Kbd>↑</Kbd> <Kbd>↓</Kbd> walk the steps
          </span>{' '}
          <span className="whitespace-nowrap">
            <Kbd>Enter</Kbd> close the bracket
          </span>{' '}
          <span className="whitespace-nowrap">
            <Kbd>←</Kbd> <Kbd>→</Kbd> choose the term
          </span>
        </p>
      }
    />
  );
}

function texOf(tex: string | undefined, span: { start: number; end: number } | undefined): string | null {
  return tex && span ? tex.slice(span.start, span.end) : null;
}
