import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { api, ApiError } from '../../../src/api/client';
import { parseEvent, events, type ServerEvent } from '../../../src/api/events';
import { keepSession, watchSession, type SignedIn } from '../../../src/api/token';

const user = { id: 1, email: 'engineer@keepstep.example', name: 'Ines Maro', role: 'engineer' } as const;
const json = (body: unknown, status = 200, headers = {}) =>
  new Response(JSON.stringify(body), { status, headers: { 'content-type': 'application/json', ...headers } });

/** A server that knows one valid token at a time and renews it on request. */
function server(valid: string, renewals: string[]) {
  return vi.fn((input: RequestInfo | URL, init?: RequestInit) => {
    const path = input as string;
    if (path === '/api/v1/session/refresh') {
      const next = renewals.shift();
      if (next) valid = next;
      return Promise.resolve(next ? json({ accessToken: next, user }) : json({ title: 'Signed out' }, 401));
    }
    const given = new Headers(init?.headers).get('authorization');
    const answer = given === `Bearer ${valid}` ? json({ path }, 200, { etag: '"7"' }) : json({ title: 'Expired' }, 401);
    return Promise.resolve(answer);
  });
}
const pathsOf = (fetched: ReturnType<typeof server>) => fetched.mock.calls.map(([path]) => (path as string).slice(7));

describe('api', () => {
  const told: (SignedIn | undefined)[] = [];

  beforeEach(() => {
    watchSession(() => undefined);
    keepSession({ accessToken: 'old', user });
    told.length = 0;
    watchSession((signedIn) => void told.push(signedIn));
  });
  afterEach(() => void vi.unstubAllGlobals());

  it('renews an expired token once and repeats the call', async () => {
    const fetched = server('new', ['new']);
    vi.stubGlobal('fetch', fetched);
    await expect(api.get('/plans')).resolves.toEqual({ path: '/api/v1/plans' });
    expect(pathsOf(fetched)).toEqual(['/plans', '/session/refresh', '/plans']);
    expect(told).toEqual([{ accessToken: 'new', user }]);
  });

  it('renews once for all calls that wait', async () => {
    const fetched = server('new', ['new', 'newer']);
    vi.stubGlobal('fetch', fetched);
    await Promise.all([api.get('/plans'), api.get('/targets'), api.get('/releases')]);
    expect(pathsOf(fetched).filter((path) => path === '/session/refresh')).toHaveLength(1);
  });

  it('takes a refused password as an answer', async () => {
    keepSession(undefined);
    const fetched = server('new', ['new']);
    vi.stubGlobal('fetch', fetched);
    await expect(api.post('/session', { email: 'a', password: 'b' })).rejects.toMatchObject({ status: 401 });
    expect(pathsOf(fetched)).toEqual(['/session']);
  });

  it('ends the session when the cookie is refused', async () => {
    vi.stubGlobal('fetch', server('other', []));
    await expect(api.get('/plans')).rejects.toMatchObject({ status: 401 });
    expect(told).toEqual([undefined]);
  });

  it('keeps the session when the server is silent', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('Failed to fetch')));
    const refusal = await api.get('/plans').catch((error: unknown) => error);
    expect(refusal).toBeInstanceOf(ApiError);
    expect(refusal).toMatchObject({ status: 0, title: expect.stringContaining('cannot be reached') });
    expect(told).toEqual([]);
  });

  it('rebuilds a problem with its faults by pointer', async () => {
    const faults = [{ pointer: '/carrier/stages/0/damping', detail: 'must be above 0' }];
    const problem = { type: '/problems/invalid', title: 'The plan does not hold', status: 422, faults, current: 3 };
    vi.stubGlobal('fetch', () => Promise.resolve(json(problem, 422)));
    const refusal = (await api.post('/designs', {}).catch((error: unknown) => error)) as ApiError;
    expect(refusal).toMatchObject({ status: 422, type: '/problems/invalid', title: problem.title });
    expect(refusal.faultAt('/carrier/stages/0/damping')).toBe('must be above 0');
    expect(refusal.problem.current).toBe(3);
  });

  it('says something of an answer that is no problem document', async () => {
    vi.stubGlobal('fetch', () => Promise.resolve(new Response('<h1>Bad gateway</h1>', { status: 502 })));
    await expect(api.get('/plans')).rejects.toMatchObject({ status: 502, title: 'The server answered 502.' });
  });

  it('hands entity tags through', async () => {
    const fetched = server('old', []);
    vi.stubGlobal('fetch', fetched);
    await expect(api.tagged.get('/plans/1')).resolves.toEqual({ body: { path: '/api/v1/plans/1' }, etag: '"7"' });
    await api.put('/plans/1', { name: 'Beacon' }, { ifMatch: '"7"' });
    const sent = new Headers(fetched.mock.calls[1]?.[1]?.headers);
    expect([sent.get('if-match'), sent.get('content-type')]).toEqual(['"7"', 'application/json']);
  });

  it('lets the caller call a request off', async () => {
    const off = new AbortController();
    vi.stubGlobal('fetch', (_: string, { signal }: RequestInit) => Promise.reject(signal?.reason as Error));
    off.abort();
    await expect(api.get('/plans', { signal: off.signal })).rejects.toMatchObject({ name: 'AbortError' });
  });
});

describe('events', () => {
  afterEach(() => void vi.unstubAllGlobals());
  const stream = (text: string) => new Response(text, { headers: { 'content-type': 'text/event-stream' } });

  // The fields of a block by the HTML standard, 9.2.6.
  it('parses a block of a stream', () => {
    expect(parseEvent('event: point\nid: 4\ndata: {"a":\ndata: 1}')).toEqual({
      id: '4',
      type: 'point',
      data: { a: 1 },
    });
    expect(parseEvent('data: plain')).toEqual({ id: undefined, type: 'message', data: 'plain' });
    expect(parseEvent(': open')).toBeUndefined();
  });

  it('opens a broken stream again from the last event', async () => {
    const texts = ['id: 1\ndata: 1\n\nid: 2\ndata: 2\n\nid: 3\nda', 'id: 3\ndata: 3\n\n'];
    const fetched = vi.fn((_path: string, _init: RequestInit) => Promise.resolve(stream(texts.shift() ?? '')));
    vi.stubGlobal('fetch', fetched);
    const seen: ServerEvent[] = [];
    await events('/replays/1/events', (event) => seen.push(event) < 3, { retry: 0 });
    expect(seen.map(({ data }) => data)).toEqual([1, 2, 3]);
    const ids = fetched.mock.calls.map(([, init]) => new Headers(init.headers).get('last-event-id'));
    expect(ids).toEqual([null, '2']);
  });

  it('gives up a stream that is refused', async () => {
    vi.stubGlobal('fetch', () => Promise.resolve(json({ title: 'No replay 9' }, 404)));
    await expect(events('/replays/9/events', () => true)).rejects.toMatchObject({ status: 404 });
  });
});
