import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { describe, expect, it, vi } from 'vitest';
import { Derivation } from '../../../app/ui/derivation.tsx';
import type { EdgeLine } from '../../../app/ui/edge-line.tsx';
import { SmallEdge } from '../../../app/ui/small-edge.tsx';
import { StepPick } from '../../../app/ui/step-pick.tsx';

const VERDICT: readonly EdgeLine[] = [
  { id: 'a', tex: 'x+1' },
  { id: 'b', tex: 'x+2', state: 'holds', reason: 'collect' },
  { id: 'c', tex: 'x+3', state: 'fault', note: 'At x = 1', mended: { tex: 'x+9' } },
  { id: 'd', tex: 'x+4', state: 'carried', mended: { tex: 'x+8' } },
  { id: 'e', tex: 'x+5', state: 'also-fails' },
  { id: 'f', tex: 'x+6', state: 'undecided' },
];

describe('a derivation', () => {
  it('is an ordered list with each step’s state in words', () => {
    render(<Derivation lines={VERDICT} label="Your derivation" />);
    const items = within(screen.getByRole('list', { name: 'Your derivation' })).getAllByRole('listitem');
    expect(items).toHaveLength(6);
    expect(items[0]).toHaveTextContent('given');
    expect(within(items[1]!).getByText('step 1: holds')).toBeInTheDocument();
    expect(within(items[2]!).getByText('step 2: first fault')).toBeInTheDocument();
    expect(within(items[3]!).getByText('step 3: carried')).toBeInTheDocument();
    expect(within(items[4]!).getByText('step 4: also fails')).toBeInTheDocument();
    expect(within(items[5]!).getByText('step 5: undecided')).toBeInTheDocument();
  });

  it('says nothing of a step that is not judged', () => {
    render(
      <Derivation
        lines={[
          { id: 'a', tex: 'x' },
          { id: 'b', tex: 'y', state: 'plain' },
        ]}
        label="Lines"
      />,
    );
    expect(screen.queryByText(/holds|fault|carried|undecided/)).not.toBeInTheDocument();
  });

  it('shows the mended line and the mended ending', () => {
    render(<Derivation lines={VERDICT} label="Your derivation" />);
    expect(screen.getByText('mended')).toBeInTheDocument();
    expect(screen.getByText('mended ending')).toBeInTheDocument();
  });

  it('speaks its maths as MathML', () => {
    const { container } = render(<Derivation lines={[{ id: 'a', tex: 'x=2' }]} label="Lines" />);
    expect(container.querySelectorAll('math')).toHaveLength(2);
  });

  it('shows TeX that cannot be set as it is', () => {
    render(<Derivation lines={[{ id: 'a', tex: '\\frac{a}{' }]} label="Lines" />);
    expect(screen.getByText('\\frac{a}{')).toBeInTheDocument();
  });

  it('sets no links or styles from what people wrote', () => {
    const { container } = render(
      <Derivation lines={[{ id: 'a', tex: '\\href{https://a.example}{x}\\htmlStyle{color:red}{y}' }]} label="Lines" />,
    );
    expect(container.querySelector('a')).toBeNull();
    expect(container.querySelector('[style*="red"]')).toBeNull();
  });

  it('numbers an excerpt from where it begins', () => {
    render(
      <Derivation
        lines={[
          { id: 'a', tex: 'x' },
          { id: 'b', tex: 'y', state: 'fault', words: 'step 4 fails' },
        ]}
        from={3}
        label="Excerpt"
      />,
    );
    expect(screen.getByText('step 4: step 4 fails')).toBeInTheDocument();
  });
});

function Picker({ onPick }: { onPick: (step: number) => void }) {
  const [inView, setInView] = useState(1);
  const lines = ['x', 'y', 'z'].map((tex, index) => ({
    id: tex,
    tex,
    state: index > 0 ? ('plain' as const) : undefined,
    control:
      index > 0 ? (
        <StepPick
          name="step"
          step={index}
          isPicked={false}
          isStop={index === inView}
          onPick={onPick}
          onWalk={setInView}
        />
      ) : null,
  }));
  return <Derivation lines={lines} layout="review" aside={<p>The finding</p>} />;
}

describe('picking a step', () => {
  it('walks with the arrow keys without picking, and picks with Enter', async () => {
    const onPick = vi.fn<(step: number) => void>();
    const user = userEvent.setup();
    render(<Picker onPick={onPick} />);
    await user.tab();
    expect(screen.getByRole('radio', { name: 'step 1, from the given line to line 1' })).toHaveFocus();
    await user.keyboard('{ArrowDown}');
    expect(screen.getByRole('radio', { name: 'step 2, from line 1 to line 2' })).toHaveFocus();
    expect(onPick).not.toHaveBeenCalled();
    await user.keyboard('{Enter}');
    expect(onPick).toHaveBeenCalledWith(2);
  });

  it('picks with a click', async () => {
    const onPick = vi.fn<(step: number) => void>();
    render(<Picker onPick={onPick} />);
    await userEvent.click(screen.getByRole('radio', { name: /^step 2/ }));
    expect(onPick).toHaveBeenCalledWith(2);
  });
});

it('tells which term of a line was clicked', async () => {
  const onPick = vi.fn<(index: number) => void>();
  const spans = [
    { start: 0, end: 2 },
    { start: 2, end: 4 },
    { start: 5, end: 6 },
  ];
  const { container } = render(
    <Derivation lines={[{ id: 'a', tex: '2x+3=7', terms: { spans, picked: 1, onPick } }]} />,
  );
  const terms = container.querySelectorAll('.katex-html .term');
  expect(terms).toHaveLength(3);
  expect(terms[1]).toHaveClass('marked');
  await userEvent.click(terms[2]!);
  expect(onPick).toHaveBeenCalledWith(2);
});

it('names the small edge by its states, or as told', () => {
  const { rerender } = render(<SmallEdge states={['holds', 'fault', 'carried']} />);
  expect(screen.getByRole('img', { name: 'holds, first fault, carried' })).toBeInTheDocument();
  rerender(<SmallEdge states={['walked', 'plain']} label="one of two steps walked" />);
  expect(screen.getByRole('img', { name: 'one of two steps walked' })).toBeInTheDocument();
});
