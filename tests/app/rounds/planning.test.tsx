import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { nextQuarter, proposeInstants } from '../../../app/features/rounds/round-rhythms.ts';
import { Component as NewRoundPage } from '../../../app/pages/round-new.tsx';
import { findDisorder, roundFormSchema, type RoundForm } from '../../../shared/schemas/round.ts';
import { fakeApi, FakeProblem } from '../../support/fake-api.ts';
import { renderPage } from '../../support/render-page.tsx';

const NOW = new Date('2031-03-03T16:50:00.000Z');
const CLASS = '7f3c2a10-5a51-4d5e-9a57-0d5c1b0a9e11';
const TASK = '9d1f6f0a-6a6f-4b12-8c0a-2f5e7a1c3b22';
const choices = {
  classes: [{ id: CLASS, name: '10C', timeZone: 'Europe/Vienna', students: 24 }],
  tasks: [
    { id: TASK, title: 'Surface of a cylinder', given: 'S' },
    { id: 'b6d1f3c4-0c3e-4f1d-b1d2-6c5a4e3f2a33', title: 'Two products', given: 'x' },
  ],
};

beforeEach(() => {
  vi.useFakeTimers({ now: NOW, toFake: ['Date'] });
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

describe('the proposed times', { timeout: 20_000 }, () => {
  it('are in order for every rhythm, and begin at the next quarter of an hour', () => {
    for (const rhythm of ['lesson', 'days', 'week'] as const) {
      const instants = proposeInstants(rhythm, 'Europe/Vienna', NOW);
      expect(findDisorder(instants)).toEqual([]);
      expect(instants.opensAt).toBe('2031-03-03T17:00:00.000Z');
    }
    expect(nextQuarter(new Date('2031-03-03T16:59:30.000Z')).toISOString()).toBe('2031-03-03T17:15:00.000Z');
  });

  it('end on evenings of the class’s own clocks, also over a change of clocks', () => {
    const before = new Date('2031-03-28T10:00:00.000Z');
    expect(proposeInstants('week', 'Europe/Vienna', before)).toMatchObject({
      writingEndsAt: '2031-03-30T19:00:00.000Z',
      settlesAt: '2031-04-04T16:00:00.000Z',
    });
  });
});

describe('planning a round', { timeout: 20_000 }, () => {
  it('takes a task and proposes everything else', async () => {
    const calls = fakeApi({ 'GET /api/round-choices': choices, 'POST /api/rounds': { id: 'r9' } });
    renderPage(NewRoundPage, '/rounds/new');
    await userEvent.selectOptions(await screen.findByRole('combobox', { name: 'Task' }), 'Surface of a cylinder');
    await userEvent.click(screen.getByRole('button', { name: 'Plan this round' }));
    expect(await screen.findByText('at /rounds/r9')).toBeInTheDocument();
    const sent = calls.find(({ what }) => what === 'POST /api/rounds')?.body as RoundForm;
    expect(roundFormSchema.parse(sent)).toEqual(sent);
    expect(sent).toMatchObject({ classId: CLASS, taskId: TASK, reviewsPerDerivation: 2, lateRule: 'closed' });
  });

  it('asks for the task, and says so beside the field', async () => {
    fakeApi({ 'GET /api/round-choices': choices });
    renderPage(NewRoundPage, '/rounds/new');
    await userEvent.click(await screen.findByRole('button', { name: 'Plan this round' }));
    expect(await screen.findByText('Choose a task.')).toBeInTheDocument();
    expect(screen.getByRole('combobox', { name: 'Task' })).toBeInvalid();
  });

  it('fits a lesson at one press', async () => {
    const calls = fakeApi({ 'GET /api/round-choices': choices, 'POST /api/rounds': { id: 'r9' } });
    renderPage(NewRoundPage, '/rounds/new', `/rounds/new?taskId=${TASK}`);
    await userEvent.click(await screen.findByRole('radio', { name: /One lesson/ }));
    await userEvent.click(screen.getByRole('button', { name: 'Plan this round' }));
    await waitFor(() => expect(calls.some(({ what }) => what === 'POST /api/rounds')).toBe(true));
    expect(calls.at(-1)?.body).toMatchObject({
      opensAt: '2031-03-03T17:00:00.000Z',
      settlesAt: '2031-03-03T18:00:00.000Z',
    });
  });

  it('shows what the server refuses beside its field', async () => {
    const errors = [{ pointer: '/writingEndsAt', detail: 'This time has passed already.' }];
    const refused = new FakeProblem({ type: 'invalid-fields', title: 'Look again', status: 422, errors });
    fakeApi({ 'GET /api/round-choices': choices, 'POST /api/rounds': refused });
    renderPage(NewRoundPage, '/rounds/new', `/rounds/new?taskId=${TASK}`);
    await userEvent.click(await screen.findByRole('button', { name: 'Plan this round' }));
    expect(await screen.findByText('This time has passed already.')).toBeInTheDocument();
    expect(screen.getByLabelText('Writing ends')).toBeInvalid();
  });

  it('warns when names can be guessed', async () => {
    const small = { ...choices, classes: [{ ...choices.classes[0], students: 4 }] };
    fakeApi({ 'GET /api/round-choices': small });
    renderPage(NewRoundPage, '/rounds/new');
    expect(await screen.findByText('Names can be guessed.')).toBeInTheDocument();
  });

  it('leads to writing a task where there is none', async () => {
    fakeApi({ 'GET /api/round-choices': { ...choices, tasks: [] } });
    renderPage(NewRoundPage, '/rounds/new');
    expect(await screen.findByRole('link', { name: 'Write a task' })).toHaveAttribute('href', '/tasks/new');
  });
});
