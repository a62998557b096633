import { readLines } from '../../../shared/maths/read-lines.ts';
import { showReading, wordReadError, type ReadsAs as Shown } from '../../../shared/maths/reads-as.ts';
import { SLIP_KINDS, type FindingDraft } from '../../../shared/schemas/finding.ts';
import type { ReviewAnswer } from '../../../shared/schemas/review.ts';
import { SLIP_KIND_WORDS } from '../../lib/finding-words.ts';
import { RadioGroup } from '../../ui/choice.tsx';
import { Maths } from '../../ui/maths.tsx';
import { MathsField } from '../../ui/maths-field.tsx';
import type { DraftKeeper } from './draft-keeper.ts';

/** What is asked about a picked step: the kind of slip, and what its line should have been. */
export function StepFields({
  review,
  keeper,
  draft,
}: {
  review: ReviewAnswer;
  keeper: DraftKeeper;
  draft: FindingDraft;
}) {
  return (
    <>
      <RadioGroup
        label="Kind of slip"
        value={draft.slipKind}
        onChange={(slipKind) => keeper.edit({ slipKind })}
        options={SLIP_KINDS.map((kind) => ({
          value: kind,
          label: SLIP_KIND_WORDS[kind].label,
          hint: draft.slipKind === kind ? `such as ${SLIP_KIND_WORDS[kind].example}` : undefined,
        }))}
      />
      <ShouldBe review={review} keeper={keeper} draft={draft} />
    </>
  );
}

/** Shows how the line reads and nothing else: no word on whether it follows. */
function ShouldBe({ review, keeper, draft }: { review: ReviewAnswer; keeper: DraftKeeper; draft: FindingDraft }) {
  const { decimal, numbers } = review.task.settings;
  const label = `What line ${draft.pick} should have been`;
  // It is read where it would stand, as the checker does.
  const above = review.lines.filter((line) => line.number < Number(draft.pick)).map(({ tex }) => tex);
  const reading =
    draft.shouldBe.trim() === '' ? undefined : readLines([...above, draft.shouldBe], { decimal, numbers }).at(-1);
  return (
    <div className="fld">
      <span className="flabel" id="should-be-label">
        {label}
      </span>
      <MathsField
        value={draft.shouldBe}
        onChange={(shouldBe) => keeper.edit({ shouldBe })}
        label={label}
        describedBy="should-be-reads"
        decimal={decimal}
        keys
      />
      <p className="msg" id="should-be-reads">
        {reading ? <ReadsAs reading={showReading(reading, decimal)} /> : null}
      </p>
    </div>
  );
}

function ReadsAs({ reading }: { readonly reading: Shown }) {
  if (reading.kind === 'error') return <>{wordReadError(reading.error)}</>;
  const tex = reading.kind === 'note' ? reading.tex : reading.kind === 'ask' ? reading.choices[0]?.tex : undefined;
  if (tex === undefined)
    return <span className="sr-only">reads as {reading.kind === 'silent' ? reading.words : ''}</span>;
  return (
    <>
      reads as <Maths tex={tex} />
    </>
  );
}
