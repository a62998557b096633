import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { Component as TaskPage } from '../../../app/pages/task.tsx';
import { Component as TasksPage } from '../../../app/pages/tasks.tsx';
import type { TaskAnswer, TaskListItem } from '../../../shared/schemas/task.ts';
import { fakeApi, FakeProblem } from '../../support/fake-api.ts';
import { renderPage } from '../../support/render-page.tsx';

afterEach(() => vi.unstubAllGlobals());

const item: TaskListItem = {
  id: 't1',
  title: 'Two products',
  given: '(x+2)(x-3)',
  goal: { kind: 'expanded' },
  decimal: 'point',
  rounds: 2,
  archived: false,
  updatedAt: '2031-03-03T16:50:00.000Z',
};

const task: TaskAnswer = {
  id: 't1',
  version: 4,
  title: 'Two products',
  instructions: '',
  given: '(x+2)(x-3)',
  goal: { kind: 'expanded' },
  assumptions: [],
  settings: {
    numbers: 'real',
    reversible: false,
    presentationCounts: false,
    constantNeeded: false,
    decimal: 'point',
  },
  rounds: 2,
  archived: false,
  updatedAt: '2031-03-03T16:50:00.000Z',
};

describe('the collection', { timeout: 20_000 }, () => {
  it('lists tasks with what can be done with each', async () => {
    const calls = fakeApi({ 'GET /api/tasks': [item], 'POST /api/tasks/t1/copy': { id: 't2' } });
    renderPage(TasksPage, '/tasks');
    const row = (await screen.findByRole('link', { name: 'Two products' })).closest('li') as HTMLElement;
    expect(row).toHaveTextContent('to be expanded · 2 rounds');
    expect(within(row).getByRole('link', { name: 'Plan a round' })).toHaveAttribute('href', '/rounds/new?taskId=t1');
    await userEvent.click(within(row).getByRole('button', { name: 'Copy Two products' }));
    await waitFor(() => expect(calls.map(({ what }) => what)).toContain('POST /api/tasks/t1/copy'));
  });

  it('keeps what is put away out of sight until asked for', async () => {
    fakeApi({ 'GET /api/tasks': [item, { ...item, id: 't9', title: 'Old square', archived: true }] });
    renderPage(TasksPage, '/tasks');
    await userEvent.click(await screen.findByRole('button', { name: 'Show 1 put away' }));
    expect(screen.getByRole('button', { name: 'Take out Old square' })).toBeInTheDocument();
  });

  it('explains itself while it is empty', async () => {
    fakeApi({ 'GET /api/tasks': [] });
    renderPage(TasksPage, '/tasks');
    expect(await screen.findByText('No task yet')).toBeInTheDocument();
  });
});

describe('a task', { timeout: 20_000 }, () => {
  it('is saved from the version it was opened at', async () => {
    const calls = fakeApi({ 'GET /api/tasks/t1': task, 'PUT /api/tasks/t1': { ...task, version: 5 } });
    renderPage(TaskPage, '/tasks/:taskId', '/tasks/t1');
    const title = await screen.findByRole('textbox', { name: 'Title' });
    await userEvent.type(title, ', again');
    await userEvent.selectOptions(screen.getByRole('combobox', { name: 'Goal' }), 'solved');
    await userEvent.clear(screen.getByRole('textbox', { name: 'The letter to solve for' }));
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));
    expect(await screen.findByText('Name the letter.')).toBeInTheDocument();
    await userEvent.type(screen.getByRole('textbox', { name: 'The letter to solve for' }), 'y');
    await userEvent.click(screen.getByRole('checkbox', { name: /reversible/ }));
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));
    await waitFor(() => expect(calls.at(-1)?.what).toBe('PUT /api/tasks/t1'));
    expect(calls.at(-1)?.body).toMatchObject({
      version: 4,
      title: 'Two products, again',
      goal: { kind: 'solved', letter: 'y' },
      given: '(x+2)(x-3)',
      settings: { reversible: true },
    });
  });

  it('shows beside the given line why it was not taken', async () => {
    const errors = [{ pointer: '/given', detail: 'A bracket is missing at the end of the line.' }];
    const refused = new FakeProblem({ type: 'invalid-fields', title: 'Look again', status: 422, errors });
    fakeApi({ 'GET /api/tasks/t1': task, 'PUT /api/tasks/t1': refused });
    renderPage(TaskPage, '/tasks/:taskId', '/tasks/t1');
    await userEvent.click(await screen.findByRole('button', { name: 'Save' }));
    expect(await screen.findByText('A bracket is missing at the end of the line.')).toBeInTheDocument();
  });

  it('says that it changed in another window', async () => {
    const detail = 'This task was changed in another window. Look at it again before you save.';
    fakeApi({
      'GET /api/tasks/t1': task,
      'PUT /api/tasks/t1': new FakeProblem({ type: 'conflict', title: 'Changed', status: 409, detail }),
    });
    renderPage(TaskPage, '/tasks/:taskId', '/tasks/t1');
    await userEvent.click(await screen.findByRole('button', { name: 'Save' }));
    expect(await screen.findByRole('alert')).toHaveTextContent(detail);
  });

  it('is not found where it is somebody else’s', async () => {
    fakeApi({});
    renderPage(TaskPage, '/tasks/:taskId', '/tasks/t7');
    expect(await screen.findByRole('heading', { level: 1 })).toHaveTextContent(/nothing/i);
  });
});
