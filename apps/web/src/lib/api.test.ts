import { beforeEach, describe, expect, it } from 'vitest';
import { z } from 'zod';
import { answerWith, problem } from '../testing/server';
import { api, ApiError, apiWithVersion } from './api';
import { sessionEnded, setHadPerson, settleSignIn } from './session';

const schema = z.object({ name: z.string() });
const refusal = () => problem(401, 'session-expired');

beforeEach(() => {
  settleSignIn(false);
  setHadPerson(false);
});

describe('a request', () => {
  it('answers what the schema reads, with the version from the ETag', async () => {
    const { seen } = answerWith({ 'GET /things': { body: { name: 'Loom' }, headers: { ETag: '"7"' } } });
    expect(await apiWithVersion({ path: '/things', query: { page: 2, search: '', sort: null }, schema })).toEqual({
      data: { name: 'Loom' },
      version: 7,
    });
    expect(seen[0]?.path).toBe('/things?page=2');
  });

  it('sends If-Match and Idempotency-Key', async () => {
    const { seen } = answerWith({ 'PATCH /things': { body: { name: 'Kiln' } } });
    await api({ method: 'PATCH', path: '/things', body: { name: 'Kiln' }, ifMatch: 3, idempotencyKey: 'once', schema });
    expect(seen[0]?.headers.get('If-Match')).toBe('"3"');
    expect(seen[0]?.headers.get('Idempotency-Key')).toBe('once');
    expect(seen[0]?.body).toEqual({ name: 'Kiln' });
  });

  it('reads a problem whole', async () => {
    answerWith({
      'GET /things': problem(412, 'stale-version', {
        current: { name: 'Wick' },
        fieldErrors: [{ path: 'name', message: 'Taken.' }],
        errorId: 'e-1',
      }),
    });
    const error = await api({ path: '/things', schema }).catch((failure: unknown) => failure);
    expect(error).toBeInstanceOf(ApiError);
    expect(error).toMatchObject({
      code: 'stale-version',
      status: 412,
      message: 'Detail of stale-version.',
      current: { name: 'Wick' },
      fieldErrors: [{ path: 'name', message: 'Taken.' }],
      errorId: 'e-1',
    });
  });

  it('tells an unreachable server and an answer that does not fit apart', async () => {
    answerWith({ 'GET /odd': { body: { name: 5 } }, 'GET /proxy': { status: 502, body: 'Bad gateway' } });
    await expect(api({ path: '/nowhere', schema })).rejects.toMatchObject({ code: 'unreachable', status: 0 });
    await expect(api({ path: '/odd', schema })).rejects.toMatchObject({ code: 'unexpected-answer', status: 200 });
    await expect(api({ path: '/proxy', schema })).rejects.toMatchObject({ code: 'unexpected-answer', status: 502 });
  });

  it('passes an abort on as it is', async () => {
    answerWith({ 'GET /things': () => Promise.reject(new DOMException('Stopped', 'AbortError')) });
    const controller = new AbortController();
    controller.abort();
    await expect(api({ path: '/things', schema, signal: controller.signal })).rejects.toMatchObject({
      name: 'AbortError',
    });
  });
});

describe('a refused session', () => {
  it('is renewed once for requests that fail together, and they are sent again', async () => {
    let renewed = false;
    const { seen } = answerWith({
      'GET /a': () => (renewed ? { body: { name: 'a' } } : refusal()),
      'GET /b': () => (renewed ? { body: { name: 'b' } } : refusal()),
      'POST /session/refresh': async () => {
        await new Promise((resolve) => setTimeout(resolve, 20));
        renewed = true;
        return { body: {} };
      },
    });
    const answers = await Promise.all([api({ path: '/a', schema }), api({ path: '/b', schema })]);
    expect(answers).toEqual([{ name: 'a' }, { name: 'b' }]);
    expect(seen.filter((request) => request.path === '/session/refresh')).toHaveLength(1);
  });

  it('is not renewed when another tab has just done so', async () => {
    let first = true;
    const { seen } = answerWith({
      'GET /a': () => {
        if (!first) return { body: { name: 'a' } };
        first = false;
        localStorage.setItem('faintward-session-refreshed-at', String(Date.now() + 5));
        return refusal();
      },
    });
    expect(await api({ path: '/a', schema })).toEqual({ name: 'a' });
    expect(seen.map((request) => request.path)).toEqual(['/a', '/a']);
  });

  it('throws when nobody had been signed in', async () => {
    answerWith({ 'GET /a': refusal(), 'POST /session/refresh': refusal() });
    await expect(api({ path: '/a', schema })).rejects.toMatchObject({ status: 401 });
    expect(sessionEnded.current()).toBe(false);
  });

  it('waits for the person to sign in again, and then the request goes through', async () => {
    const { handlers } = answerWith({ 'PUT /a': refusal(), 'POST /session/refresh': refusal() });
    setHadPerson(true);
    const answer = api({ method: 'PUT', path: '/a', body: { name: 'typed' }, schema });
    await expect.poll(() => sessionEnded.current()).toBe(true);
    handlers['PUT /a'] = (request) => ({ body: request.body });
    settleSignIn(true);
    expect(await answer).toEqual({ name: 'typed' });
    expect(sessionEnded.current()).toBe(false);
  });

  it('fails when the person declines, and is asked for no more', async () => {
    answerWith({ 'GET /a': refusal(), 'POST /session/refresh': refusal() });
    setHadPerson(true);
    const answer = api({ path: '/a', schema });
    const refused = expect(answer).rejects.toMatchObject({ status: 401 });
    await expect.poll(() => sessionEnded.current()).toBe(true);
    settleSignIn(false);
    await refused;
    await expect(api({ path: '/a', schema })).rejects.toMatchObject({ status: 401 });
  });

  it('does not stop signing in itself from failing', async () => {
    const { seen } = answerWith({ 'POST /session': problem(401, 'wrong-credentials') });
    await expect(
      api({ method: 'POST', path: '/session', body: {}, schema, onSignedOut: 'throw' }),
    ).rejects.toMatchObject({
      code: 'wrong-credentials',
    });
    expect(seen).toHaveLength(1);
  });
});
