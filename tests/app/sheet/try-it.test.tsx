import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { fireEvent, render, screen, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, expect, it, vi } from 'vitest';
import { TryIt } from '../../../app/features/derivations/try-it.tsx';
import type { Verdict } from '../../../shared/schemas/verdict.ts';
import { fakeApi, type FakeCall } from '../../support/fake-api.ts';
import type { MathfieldElement } from '../../support/mathlive-stub.ts';

const TASK = {
  given: '(x+1)^2',
  goal: { kind: 'expanded' },
  assumptions: [],
  settings: { numbers: 'real', reversible: false, presentationCounts: false, constantNeeded: false, decimal: 'point' },
} as const;

const VERDICT: Verdict = {
  outcome: 'faulty',
  firstFault: 1,
  steps: [
    {
      step: 1,
      ruling: 'fails',
      reached: 'proved',
      notes: [],
      evidence: { witness: { at: { x: '1' }, above: '4', below: '2' } },
    },
  ],
};

function open(given: string = TASK.given): FakeCall[] {
  const calls = fakeApi({ 'POST /api/tasks/try': VERDICT });
  render(
    <QueryClientProvider client={new QueryClient()}>
      <TryIt task={{ ...TASK, given, assumptions: [] }} />
    </QueryClientProvider>,
  );
  return calls;
}
afterEach(() => vi.unstubAllGlobals());

const field = async (line: number) =>
  (await screen.findByRole('textbox', { name: `line ${line}` })) as MathfieldElement;
const list = () => within(screen.getByRole('list', { name: 'A model derivation' }));

it('rules on the lines as they stand, with the evidence in words', async () => {
  const calls = open();
  (await field(1)).setValue('x^2+1');
  await userEvent.click(await screen.findByRole('button', { name: 'See how it is ruled' }));
  expect(await screen.findByText('The first fault is step 1.')).toBeInTheDocument();
  expect(calls[0]?.body).toEqual({ ...TASK, lines: ['x^2+1'] });
  expect(list().getByText('first fault')).toBeInTheDocument();
  expect(list().getByText(/the line above is/)).toBeInTheDocument();
});

it('says nothing of lines that have changed since', async () => {
  open();
  (await field(1)).setValue('x^2+1');
  await userEvent.click(await screen.findByRole('button', { name: 'See how it is ruled' }));
  await screen.findByText('The first fault is step 1.');
  (await field(1)).setValue('x^2+2x+1');
  expect(await screen.findByRole('button', { name: 'See how it is ruled' })).toBeEnabled();
  expect(screen.queryByText('The first fault is step 1.')).toBeNull();
  expect(list().queryByText('first fault')).toBeNull();
});

it('begins the next line with a copy of the one above', async () => {
  open();
  (await field(1)).setValue('x^2+1');
  fireEvent.keyDown(await field(1), { key: 'Enter' });
  expect((await field(2)).value).toBe('x^2+1');
  await userEvent.click(screen.getByRole('button', { name: 'Delete line 1' }));
  expect(screen.queryByRole('textbox', { name: 'line 2' })).toBeNull();
});

it('reads a line in its place behind those before it', async () => {
  open('x^2-6x=7');
  (await field(1)).setValue('x_1=7,x_2=-1');
  expect(await list().findByText(/values of the letter without its number/)).toBeInTheDocument();
});
