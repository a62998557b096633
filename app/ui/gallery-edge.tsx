import { useState } from 'react';
import { Button } from './button.tsx';
import { RadioGroup } from './choice.tsx';
import { Derivation } from './derivation.tsx';
import type { EdgeLine } from './edge-line.tsx';
import { HowSure } from './how-sure.tsx';
import { Kbd } from './kbd.tsx';
import { Maths } from './maths.tsx';
import { SmallEdge } from './small-edge.tsx';
import { StepPick } from './step-pick.tsx';
import { TextArea } from './text-field.tsx';
import { exampleOutcomes } from './gallery-outcomes.ts';

const STATES: readonly EdgeLine[] = [
  { id: 's0', tex: '3(n-4)^2+n\\sqrt{n^2}' },
  { id: 's1', tex: '3(n^2-8n+16)+n\\sqrt{n^2}', state: 'holds', note: words('holds', 'solid') },
  {
    id: 's2',
    tex: '3n^2-24n-48+n|n|',
    state: 'fault',
    note: words('first fault', 'the notch. At n = 0 the line above is 48, this one −48.'),
  },
  { id: 's3', tex: '3(n^2-8n-16)+n|n|', state: 'carried', note: words('carried', 'a broken stroke') },
  {
    id: 's4',
    tex: '3(n^2-8n+16)+n|n|',
    state: 'also-fails',
    note: words('a second, independent fault', 'a small notch on the broken stroke; not the one that is scored'),
  },
  { id: 's5', tex: '\\frac{6(n^2-8n+16)+2n|n|}{2}', state: 'carried' },
];

const UNDECIDED: readonly EdgeLine[] = [
  { id: 'u0', tex: 'w=\\textstyle\\sum_{j=0}^{2}0^{\\,j}' },
  { id: 'u1', tex: '=0^0+0^1+0^2', state: 'holds' },
  {
    id: 'u2',
    tex: 'w=1',
    state: 'undecided',
    note: words('undecided', 'a gap with a question; it goes to the teacher, and scores wait'),
  },
  { id: 'u3', tex: '2w=2', state: 'holds' },
];

const BRACKETED: readonly EdgeLine[] = [
  { id: 'b0', tex: 'a^2-6a+9' },
  { id: 'b1', tex: '(a-3)^2', state: 'plain', note: words('plain', 'while writing and reviewing, nothing is known') },
  { id: 'b2', tex: 'a^2-9', state: 'plain', bracket: true, note: words('bracket', 'the reviewer’s own mark') },
  { id: 'b3', isWords: true, content: 'Words between two lines stand on the edge without a tick.' },
  { id: 'b4', tex: '(a-3)(a+3)', state: 'plain', beforeLabel: 'not read' },
];

const VERDICT: readonly EdgeLine[] = [
  { id: 'v0', tex: '(x-2)(x+4)-x(3x+4)' },
  { id: 'v1', tex: '(x-2)(x+4)-3x^2-4x', state: 'holds', reason: 'second bracket out' },
  {
    id: 'v2',
    tex: 'x^2+4x-2x+8-3x^2-4x',
    spans: [{ start: 9, end: 11, as: 'wrong' }],
    state: 'fault',
    mended: { tex: 'x^2+4x-2x-8-3x^2-4x', spans: [{ start: 9, end: 11, as: 'right' }] },
    isEvidence: true,
    note: (
      <>
        <p className="ev">
          At <Maths tex="x=1" /> the line above is <b>−12</b>, this one <b>4</b>.
        </p>
        <p>
          Minus 2 times 4 was taken as plus 8: <em>wrong sign in a product</em>. <span className="muted">Proved.</span>
        </p>
      </>
    ),
  },
  {
    id: 'v3',
    tex: 'x^2-3x^2+4x-2x-4x+8',
    state: 'carried',
    reason: 'put like with like',
    mended: { tex: 'x^2-3x^2+4x-2x-4x-8' },
  },
  { id: 'v4', tex: '-2x^2-2x+8', state: 'carried', mended: { tex: '-2x^2-2x-8' } },
  { id: 'v5', tex: '-2(x^2+x-4)', state: 'carried', reason: 'take out −2', mended: { tex: '-2(x^2+x+4)' } },
];

const VERDICT_EQUATION: readonly EdgeLine[] = [
  { id: 'e0', tex: '\\frac{y}{3}+2=\\frac{y-1}{2}' },
  {
    id: 'e1',
    tex: '2y+2=3(y-1)',
    spans: [{ start: 3, end: 4, as: 'wrong' }],
    state: 'fault',
    reason: 'times 6',
    isEvidence: true,
    note: (
      <p className="ev">
        The line above has the solution <b>15</b>, this one does not.
      </p>
    ),
    mended: { tex: '2y+12=3(y-1)', spans: [{ start: 3, end: 5, as: 'right' }] },
  },
  { id: 'e2', tex: '2y+2=3y-3', state: 'carried', mended: { tex: '2y+12=3y-3' } },
  { id: 'e3', tex: 'y=5', state: 'carried', mended: { tex: 'y=15' } },
];

const REVIEWED: readonly EdgeLine[] = [
  { id: 'r0', tex: '\\frac{x+5}{6}-\\frac{x-1}{4}=2' },
  { id: 'r1', tex: '2(x+5)-3(x-1)=24', reason: 'times 12' },
  { id: 'r2', tex: '2x+10-3x-3=24', reason: 'brackets out' },
  { id: 'r3', tex: '-x+7=24', reason: 'collect' },
  { id: 'r4', tex: '-x=17' },
  { id: 'r5', tex: 'x=-17', reason: 'times −1' },
];

/** The terms of line 2 of the review. */
const TERMS = [
  { start: 0, end: 2 },
  { start: 2, end: 5 },
  { start: 5, end: 8 },
  { start: 8, end: 10 },
  { start: 11, end: 13 },
];

const RULED: readonly EdgeLine[] = [
  { id: 'q2', tex: 'L=\\sqrt{(2y-6)^2}+5-y' },
  { id: 'q3', tex: 'L=2y-6+5-y', state: 'fault', words: 'step 3 fails' },
];

function words(first: string, rest: string) {
  return (
    <>
      <b>{first}</b>: {rest}
    </>
  );
}

function Review() {
  const [picked, setPicked] = useState(2);
  const [inView, setInView] = useState(2);
  const [sure, setSure] = useState(5);
  const [term, setTerm] = useState<number | null>(3);
  const [kind, setKind] = useState<string | null>('sign');
  const lines = REVIEWED.map((line, index) => {
    const isShown = index === inView || index === inView - 1;
    if (index === 0) return { ...line, isMuted: !isShown };
    return {
      ...line,
      state: 'plain' as const,
      isMuted: !isShown,
      isCurrent: index === inView,
      bracket: index === picked ? sure / 8 : undefined,
      terms: index === 2 ? { spans: TERMS, picked: term, onPick: setTerm } : undefined,
      control: (
        <StepPick
          name="example"
          step={index}
          isPicked={index === picked}
          isStop={index === inView}
          onPick={setPicked}
          onSideways={(by) => setTerm(Math.min(4, Math.max(0, (term ?? 0) + by)))}
          onWalk={setInView}
        />
      ),
    };
  });
  return (
    <Derivation
      layout="review"
      label="A derivation to review"
      lines={lines}
      foot={
        <>
          <span className="whitespace-nowrap">
            <Kbd>↑</Kbd> <Kbd>↓</Kbd> walk the steps
          </span>{' '}
          <span className="whitespace-nowrap">
            <Kbd>Enter</Kbd> close the bracket
          </span>{' '}
          <span className="whitespace-nowrap">
            <Kbd>←</Kbd> <Kbd>→</Kbd> choose the term
          </span>
        </>
      }
      aside={
        <>
          <h2>Your finding</h2>
          <p className="small muted">
            Step {picked}, from line {picked - 1} to line {picked}.
          </p>
          <RadioGroup
            label="Kind of slip"
            value={kind}
            onChange={setKind}
            options={[
              { value: 'sign', label: 'Wrong sign when a bracket is multiplied out' },
              { value: 'first', label: 'Only the first term multiplied' },
              { value: 'other', label: 'Another kind' },
            ]}
          />
          <TextArea label="Why" defaultValue="Minus 3 times minus 1 is plus 3." />
          <HowSure value={sure} onChange={setSure} outcomes={exampleOutcomes} hint="Honest sureness earns most." />
          <div className="acts">
            <Button kind="primary" wide>
              Hand in finding
            </Button>
            <Button kind="quiet" small>
              There is no fault
            </Button>
          </div>
        </>
      }
    />
  );
}

/** The edge in every state. */
export function EdgeGallery() {
  return (
    <>
      <h2 className="parts-h">The edge</h2>
      <Derivation lines={STATES} label="Every state" />
      <div className="h-8" />
      <Derivation lines={UNDECIDED} label="An undecided step" />
      <div className="h-8" />
      <Derivation lines={BRACKETED} label="A bracket" />
      <h2 className="parts-h">The edge in grey</h2>
      <div className="full grayscale">
        <Derivation lines={STATES} label="Every state, in grey" />
      </div>
      <h2 className="parts-h">A verdict, with what it would have been</h2>
      <Derivation lines={VERDICT} label="A verdict" reveal />
      <div className="h-8" />
      <Derivation lines={VERDICT_EQUATION} label="A verdict on an equation" />
      <h2 className="parts-h">A review</h2>
      <Review />
      <h2 className="parts-h">Two lines being ruled on</h2>
      <Derivation lines={RULED} from={2} layout="ruling" className="slate both" label="The step in question" />
      <h2 className="parts-h">The edge, small</h2>
      <div className="both small flex flex-wrap gap-x-8 gap-y-3">
        <p>
          <SmallEdge states={['holds', 'holds', 'holds', 'holds']} /> sound
        </p>
        <p>
          <SmallEdge states={['holds', 'fault', 'carried', 'also-fails', 'carried']} /> faulty
        </p>
        <p>
          <SmallEdge states={['holds', 'undecided', 'holds', 'holds']} /> undecided
        </p>
        <p>
          <SmallEdge states={['plain', 'plain', 'plain', 'plain']} /> not yet judged
        </p>
        <p>
          <SmallEdge states={['walked', 'plain', 'plain']} label="one of three steps walked" /> under review
        </p>
        <p>
          <SmallEdge states={['plain', 'plain', 'plain', 'plain', 'plain']} step={12} /> on the board
        </p>
      </div>
    </>
  );
}
