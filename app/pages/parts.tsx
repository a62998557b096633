import { useState } from 'react';
import { Button, LinkButton } from '../ui/button.tsx';
import { Checkbox, RadioGroup, Switch } from '../ui/choice.tsx';
import { CopyField } from '../ui/copy-field.tsx';
import { DateTimeField } from '../ui/date-time-field.tsx';
import { Derivation } from '../ui/derivation.tsx';
import { ConfirmDialog, Dialog } from '../ui/dialog.tsx';
import type { EdgeLine } from '../ui/edge-line.tsx';
import { FormErrors } from '../ui/form-errors.tsx';
import type { SureOutcome } from '../ui/how-sure.tsx';
import { HowSure } from '../ui/how-sure.tsx';
import { Kbd } from '../ui/kbd.tsx';
import { Maths } from '../ui/maths.tsx';
import { Notice } from '../ui/notice.tsx';
import { BigFigure, Num } from '../ui/num.tsx';
import { Both, Head, Page } from '../ui/page.tsx';
import { Shell } from '../ui/shell.tsx';
import { SmallEdge } from '../ui/small-edge.tsx';
import { EmptyState, ErrorState, Waiting } from '../ui/states.tsx';
import { StepPick } from '../ui/step-pick.tsx';
import { Table } from '../ui/table.tsx';
import { Tabs } from '../ui/tabs.tsx';
import { Tally } from '../ui/tally.tsx';
import { PasswordField, Select, TextArea, TextField } from '../ui/text-field.tsx';
import { Time, TimeLeft } from '../ui/time.tsx';
import { showToast } from '../ui/toast-store.ts';
import { ApiProblem } from '../lib/api.ts';

const NAV = [
  { to: '/parts', label: 'Parts' },
  { to: '/tasks', label: 'Tasks' },
  { to: '/disputes', label: 'Disputes', count: 5 },
  { to: '/insights', label: 'Insights' },
  { to: '/standings', label: 'Standings' },
];

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

/** An example of a chart's numbers; the product's own formula lives with its noun. */
function exampleOutcomes(place: number): readonly SureOutcome[] {
  const s = place / 10;
  const gain = 110 * (2 * s - s * s);
  return [
    { label: 'This step is it', points: gain },
    { label: 'Another step is it', points: gain - 200 * s * (1 - s) - 200 * s * s },
    { label: 'There is no fault', points: gain * 0.5 - 200 * s * (1 - s) - 200 * s * s },
  ];
}

function Review() {
  const [picked, setPicked] = useState(2);
  const [inView, setInView] = useState(2);
  const [sure, setSure] = useState(5);
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
      spans: index === 2 && picked === 2 ? [{ start: 8, end: 10, as: 'marked' as const }] : [],
      control: (
        <StepPick
          name="example"
          step={index}
          isPicked={index === picked}
          isStop={index === inView}
          onPick={setPicked}
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
          <Kbd>↑</Kbd> <Kbd>↓</Kbd> walk the steps <Kbd>Enter</Kbd> close the bracket <Kbd>←</Kbd> <Kbd>→</Kbd> choose
          the term
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

function Edges() {
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

function Actions() {
  return (
    <section className="parts-s">
      <h2>Actions</h2>
      <div className="parts-row">
        <Button kind="primary">Hand in</Button>
        <Button kind="primary" data-look="hover">
          Hover
        </Button>
        <Button kind="primary" data-look="active">
          Pressed
        </Button>
        <Button kind="primary" data-look="focus">
          Focus
        </Button>
        <Button kind="primary" busy>
          Handing in…
        </Button>
        <Button kind="primary" disabled>
          Not yet
        </Button>
      </div>
      <div className="parts-row">
        <Button>Second</Button>
        <Button data-look="hover">Hover</Button>
        <Button data-look="active">Pressed</Button>
        <Button data-look="focus">Focus</Button>
        <Button disabled>Not yet</Button>
        <Button kind="grave">Remove from class</Button>
      </div>
      <div className="parts-row">
        <LinkButton to="/parts">A quiet link</LinkButton> <Kbd>Enter</Kbd> <Kbd>↓</Kbd> <Kbd>1</Kbd>
      </div>
    </section>
  );
}

function Fields() {
  const [when, setWhen] = useState<string | null>('2026-10-16T16:00:00.000Z');
  const [sure, setSure] = useState<string | null>('likely');
  return (
    <section className="parts-s">
      <h2>Fields</h2>
      <FormErrors fields={[{ label: 'Class code', message: 'No class has this code.' }]} />
      <div className="parts-cols">
        <TextField label="Empty" placeholder="Name of the task" />
        <TextField label="Filled" defaultValue="Two products" hint="Students see this name." />
        <TextField label="Focus" defaultValue="Two prod" className="focus" />
        <TextField label="Wrong" defaultValue="10 C / D" error="No class has this code. Codes have ten characters." />
        <TextField label="Not open" disabled defaultValue="Set by the school" />
        <Select
          label="Choice"
          options={[
            { value: 'closed', label: 'Closed when writing ends' },
            { value: 'late', label: 'Late batch' },
          ]}
        />
        <PasswordField label="Password" defaultValue="a long sentence" autoComplete="off" />
        <DateTimeField label="Writing ends" value={when} onChange={setWhen} zone="Europe/Berlin" />
        <CopyField label="Class code" value="FENRUT7K3Q" hint="Students type it when they sign up." />
        <TextArea label="Why" hint="At most 500 characters." />
        <RadioGroup
          label="Only one"
          value={sure}
          onChange={setSure}
          options={[
            { value: 'likely', label: 'likely' },
            { value: 'sure', label: 'sure', hint: 'Nothing would change your mind.' },
          ]}
        />
        <div>
          <Checkbox label="Mix in planted derivations" defaultChecked />
          <Checkbox label="Every step must be reversible" />
          <Checkbox label="Set by the school" disabled />
          <Switch label="Show the standings" defaultChecked />
          <Switch label="Show names" />
        </div>
      </div>
      <p className="small muted">Maths: in a line, broken, and marked</p>
      <p className="mt-2">
        Half of <Maths tex="\frac{a+b}{2}h" /> and <Maths tex="\frac{a}{" /> and{' '}
        <Maths tex="2x+10-3x-3" spans={[{ start: 8, end: 10, as: 'marked' }]} />.
      </p>
    </section>
  );
}

function Sure() {
  const [sure, setSure] = useState(5);
  return (
    <section className="parts-s">
      <h2>How sure</h2>
      <div className="max-w-[26rem]">
        <HowSure value={sure} onChange={setSure} outcomes={exampleOutcomes} />
      </div>
    </section>
  );
}

const PEOPLE = [
  { name: 'Greta Moss', stage: 'writing', points: 112, state: undefined },
  { name: 'Hanno Pell', stage: 'handed in', points: 98, state: undefined },
  { name: 'Isla Quaye', stage: 'handed in (selected)', points: -14, state: 'selected' },
  { name: 'Vera Osei', stage: 'left the class', points: null, state: 'left' },
] as const;

function Tables() {
  return (
    <section className="parts-s">
      <h2>Tabs, tables, figures</h2>
      <Tabs
        label="Example views"
        tabs={[
          {
            id: 'lines',
            label: 'Lines',
            panel: (
              <Table
                caption="People of the class"
                rows={PEOPLE}
                rowKey={(row) => row.name}
                rowState={(row) => row.state}
                columns={[
                  { id: 'name', head: 'Student', cell: (row) => row.name },
                  { id: 'stage', head: 'Stage', cell: (row) => row.stage },
                  {
                    id: 'slips',
                    head: 'First faults',
                    cell: (row) => <Tally long={Math.abs(row.points ?? 0) % 9} short={6} label="strokes" />,
                  },
                  {
                    id: 'points',
                    head: 'Points',
                    isFigure: true,
                    cell: (row) => (row.points === null ? '–' : <Num>{row.points}</Num>),
                  },
                ]}
              />
            ),
          },
          {
            id: 'findings',
            label: 'Findings',
            count: 2,
            panel: <EmptyState>Two findings would stand here.</EmptyState>,
          },
          { id: 'history', label: 'History', panel: <EmptyState /> },
        ]}
      />
      <div className="mt-6">
        <BigFigure>7 of 10</BigFigure>
        <p className="small">
          Writing ends <Time iso={new Date(Date.now() + 11_400_000).toISOString()} zone="Europe/Berlin" />,{' '}
          <TimeLeft iso={new Date(Date.now() + 11_400_000).toISOString()} />.
        </p>
      </div>
    </section>
  );
}

function Statements() {
  const [open, setOpen] = useState<'plain' | 'grave' | null>(null);
  const offline = new ApiProblem({
    type: 'offline',
    title: 'Could not be loaded',
    status: 0,
    detail: 'The school’s server did not answer. Nothing you typed is lost.',
  });
  return (
    <section className="parts-s">
      <h2>Notices, toasts, dialogs</h2>
      <div className="stack mb-6">
        <Notice title="Writing ends in ten minutes.">What is typed by then is handed in.</Notice>
        <Notice kind="plum" title="In dispute.">
          Points may change when your teacher has ruled.
        </Notice>
        <Notice kind="grave" title="No connection.">
          You can go on writing; every line is kept on this device and sent when the line is back.
        </Notice>
      </div>
      <div className="parts-row">
        <Button onClick={() => showToast('Finding handed in.', { label: 'Take it back', onPress: () => undefined })}>
          Show a toast
        </Button>
        <Button onClick={() => setOpen('plain')}>Open a dialog</Button>
        <Button kind="grave" onClick={() => setOpen('grave')}>
          Open a grave one
        </Button>
      </div>
      <Dialog isOpen={open === 'plain'} onClose={() => setOpen(null)} title="Hand in your derivation?">
        <p className="small">
          You can change it until <time>21:00</time>. After that two classmates review it.
        </p>
        <div className="acts">
          <Button kind="primary" onClick={() => setOpen(null)}>
            Hand in
          </Button>
          <Button kind="quiet" small onClick={() => setOpen(null)}>
            Not yet
          </Button>
        </div>
      </Dialog>
      <ConfirmDialog
        isOpen={open === 'grave'}
        onClose={() => setOpen(null)}
        onConfirm={() => setOpen(null)}
        grave
        title="Remove Wim Achter from 10C?"
        confirm="Remove"
        cancel="Keep him"
        effects={['His derivations and findings stay in the record.', 'His standing is no longer shown.']}
      />
      <h2 className="mt-11 mb-3.5">Nothing, an error, waiting</h2>
      <div className="parts-cols">
        <EmptyState>No disputes. When someone contests, the case stands here, most people first.</EmptyState>
        <ErrorState error={offline} onRetry={() => undefined} />
        <Waiting>Reading the derivation…</Waiting>
      </div>
    </section>
  );
}

/** Every part in every state, for those who build with them. */
export function Component() {
  return (
    <Shell nav={NAV} who={{ name: 'Ilse Varga', place: '10C' }} foot="Brackenfell School · times are Berlin time">
      <Page>
        <Head where="for the developers" h1="Parts, in all their states" />
        <Edges />
        <Both>
          <Actions />
          <Fields />
          <Sure />
          <Tables />
          <Statements />
        </Both>
      </Page>
    </Shell>
  );
}
