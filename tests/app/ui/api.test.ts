import type { FieldValues, UseFormSetError } from 'react-hook-form';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { ApiProblem, api } from '../../../app/lib/api.ts';
import { pointerToField, showProblem } from '../../../app/lib/form.ts';
import { shouldRetry } from '../../../app/lib/query-client.ts';

function answer(status: number, body: unknown, type = 'application/json') {
  const fetchStub = vi.fn<(path: string, init?: RequestInit) => Promise<Response>>(
    async () =>
      new Response(body === undefined ? null : JSON.stringify(body), { status, headers: { 'content-type': type } }),
  );
  vi.stubGlobal('fetch', fetchStub);
  return fetchStub;
}

afterEach(() => vi.unstubAllGlobals());

describe('requests to the server', () => {
  it('sends JSON and reads JSON', async () => {
    const sent = answer(200, { id: 'a' });
    await expect(api.post('/api/things', { name: 'b' }, { idempotencyKey: 'k' })).resolves.toEqual({ id: 'a' });
    expect(sent.mock.calls[0]?.[1]).toMatchObject({
      method: 'POST',
      body: '{"name":"b"}',
      headers: { 'content-type': 'application/json', 'idempotency-key': 'k' },
    });
  });

  it('answers nothing for 204', async () => {
    answer(204, undefined);
    await expect(api.delete('/api/things/a')).resolves.toBeUndefined();
  });

  it('rejects with the problem that the server named', async () => {
    const errors = [{ pointer: '/name', detail: 'Give it a name.' }];
    answer(
      422,
      { type: 'invalid-fields', title: 'Some fields need another look', status: 422, errors },
      'application/problem+json',
    );
    await expect(api.put('/api/things/a', {})).rejects.toMatchObject({ type: 'invalid-fields', status: 422, errors });
  });

  it('names a problem by its status where a gateway answered', async () => {
    answer(503, 'busy', 'text/html');
    await expect(api.get('/api/me')).rejects.toMatchObject({ type: 'unavailable', status: 503 });
  });

  it('rejects as offline without a connection, and passes an abort through', async () => {
    vi.stubGlobal('fetch', async () => Promise.reject(new TypeError('failed')));
    await expect(api.get('/api/me')).rejects.toMatchObject({ type: 'offline', status: 0 });
    vi.stubGlobal('fetch', async () => Promise.reject(new DOMException('stopped', 'AbortError')));
    await expect(api.get('/api/me')).rejects.toMatchObject({ name: 'AbortError' });
  });
});

const problem = (status: number, errors: readonly { pointer: string; detail: string }[] = []) =>
  new ApiProblem({ type: 'invalid-fields', title: 'Some fields need another look', status, errors });

it('asks again only where the server or the connection failed', () => {
  expect(shouldRetry(0, problem(422))).toBe(false);
  expect(shouldRetry(0, problem(503))).toBe(true);
  expect(shouldRetry(2, problem(503))).toBe(false);
});

describe('errors of a form', () => {
  it('names fields by their pointers', () => {
    expect(pointerToField('/lines/0/tex')).toBe('lines.0.tex');
  });

  it('puts each error beside its field and the rest above the form', () => {
    const setError = vi.fn<UseFormSetError<FieldValues>>();
    const error = problem(422, [
      { pointer: '/name', detail: 'Give it a name.' },
      { pointer: '/hidden', detail: 'Load the page again.' },
    ]);
    expect(showProblem(error, setError, ['name'])).toBe(true);
    expect(setError).toHaveBeenCalledWith('name', { type: 'server', message: 'Give it a name.' });
    expect(setError).toHaveBeenCalledWith('root', { type: 'invalid-fields', message: 'Load the page again.' });
  });

  it('leaves other errors to the caller', () => {
    expect(showProblem(new Error('bug'), vi.fn<UseFormSetError<FieldValues>>(), [])).toBe(false);
  });
});
