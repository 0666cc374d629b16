import { ApiClient, ApiProblem, isTransient, NoAnswer, SessionStore } from '@/components/api';
import type { SessionView } from '@shared/api/sessions';

interface Call {
  method: string;
  path: string;
  headers: Record<string, string>;
  body: string | undefined;
}

type Answer = { status: number; body?: unknown } | 'cut';

/** A server that answers by a function and remembers what it was asked. */
function serve(answer: (call: Call, turn: number) => Answer): Call[] {
  const calls: Call[] = [];
  globalThis.fetch = (async (input: string, init: RequestInit = {}) => {
    const call: Call = { method: init.method ?? 'GET', path: input, headers: init.headers as Record<string, string>, body: init.body as string | undefined };
    calls.push(call);
    await Promise.resolve();
    const given = answer(call, calls.length);
    if (given === 'cut') throw new TypeError('Failed to fetch');
    const text = given.body === undefined ? '' : JSON.stringify(given.body);
    return { ok: given.status < 400, status: given.status, text: async () => text, json: async () => JSON.parse(text) as unknown };
  }) as typeof fetch;
  return calls;
}

/** All that storage holds. */
function stored(): [string, string | null][] {
  return Object.keys(localStorage).map((key) => [key, localStorage.getItem(key)]);
}

function session(accessToken: string, minutes = 15): SessionView {
  return {
    accessToken,
    expiresAt: new Date(Date.now() + minutes * 60_000).toISOString(),
    account: { id: 'account-1', name: 'Ada', email: 'ada@portellery.example' },
    memberships: [
      { schoolId: 'school-1', schoolName: 'Portellery', roles: ['admin'] },
      { schoolId: 'school-2', schoolName: 'Saltpan', roles: ['student'] },
    ],
  };
}

function signedIn(token = 'first', minutes = 15): { client: ApiClient; store: SessionStore } {
  const store = new SessionStore();
  store.signIn(session(token, minutes));
  return { client: new ApiClient(store), store };
}

beforeEach(() => localStorage.clear());

describe('a request', () => {
  it('carries the token, the school and the key', async () => {
    const { client, store } = signedIn();
    store.chooseSchool('school-2');
    const calls = serve(() => ({ status: 200, body: { id: 'loan-1' } }));
    await expect(client.post('/loans', { code: 'K7' }, { idempotencyKey: 'key-1' })).resolves.toEqual({ id: 'loan-1' });
    expect(calls[0]).toMatchObject({
      method: 'POST',
      path: '/api/v1/loans',
      headers: { Authorization: 'Bearer first', 'X-School': 'school-2', 'Idempotency-Key': 'key-1', 'Content-Type': 'application/json' },
      body: '{"code":"K7"}',
    });
  });

  it('leaves out what a query does not say', async () => {
    const { client } = signedIn();
    const calls = serve(() => ({ status: 200, body: [] }));
    await client.get('/kits', { query: { cursor: null, state: 'on shelf', lent: false, page: undefined } });
    expect(calls[0]?.path).toBe('/api/v1/kits?state=on%20shelf&lent=false');
  });

  it('takes an empty answer for nothing', async () => {
    const { client } = signedIn();
    serve(() => ({ status: 204 }));
    await expect(client.delete('/kits/1')).resolves.toBeUndefined();
  });

  it('turns a refusal into a problem with its fields', async () => {
    const { client } = signedIn();
    serve(() => ({ status: 422, body: { title: 'Check the weight', detail: 'Enter a weight above 0 ct.', code: 'invalid', errors: [{ field: 'weight', message: 'above 0' }], requestId: 'r-1' } }));
    const refusal = await client.post('/readings', {}).catch((error: unknown) => error);
    expect(refusal).toBeInstanceOf(ApiProblem);
    expect(refusal).toMatchObject({ status: 422, code: 'invalid', detail: 'Enter a weight above 0 ct.', requestId: 'r-1' });
    expect((refusal as ApiProblem).fieldError('weight')).toBe('above 0');
    expect(isTransient(refusal)).toBe(false);
  });

  it('turns a cut line into no answer, which may be tried again', async () => {
    const { client } = signedIn();
    serve(() => 'cut');
    const failure = await client.get('/kits').catch((error: unknown) => error);
    expect(failure).toBeInstanceOf(NoAnswer);
    expect(isTransient(failure)).toBe(true);
  });
});

describe('the session', () => {
  it('is renewed once for many refused requests, which are then repeated', async () => {
    const { client } = signedIn('old');
    const calls = serve((call) => {
      if (call.path.endsWith('/sessions/refresh')) return { status: 200, body: session('new') };
      return call.headers['Authorization'] === 'Bearer new' ? { status: 200, body: { path: call.path } } : { status: 401, body: {} };
    });
    const answers = await Promise.all(['/kits', '/desk', '/bench'].map((path) => client.get<{ path: string }>(path)));
    expect(answers.map((answer) => answer.path)).toEqual(['/api/v1/kits', '/api/v1/desk', '/api/v1/bench']);
    expect(calls.filter((call) => call.path.endsWith('/sessions/refresh'))).toHaveLength(1);
  });

  it('is renewed before the token runs out', async () => {
    const { client } = signedIn('old', 0.1);
    const calls = serve((call) => (call.path.endsWith('/refresh') ? { status: 200, body: session('new') } : { status: 200, body: {} }));
    await client.get('/kits');
    expect(calls.map((call) => call.headers['Authorization'] ?? call.path)).toEqual(['/api/v1/sessions/refresh', 'Bearer new']);
  });

  it('ends when the cookie no longer stands, and says that it ended by itself', async () => {
    const { client, store } = signedIn();
    serve(() => ({ status: 401, body: { code: 'signed_out' } }));
    await expect(client.get('/kits')).rejects.toMatchObject({ status: 401 });
    expect(store.get()).toEqual({ status: 'signedOut', ended: true });
  });

  it('stays when the server is in trouble', async () => {
    const { client, store } = signedIn('old', 0.1);
    serve(() => ({ status: 503 }));
    await expect(client.get('/kits')).rejects.toMatchObject({ status: 503 });
    expect(store.get().status).toBe('signedIn');
  });

  it('never puts a token into storage', () => {
    const { store } = signedIn('secret-token');
    store.chooseSchool('school-2');
    expect(JSON.stringify(stored())).not.toContain('secret-token');
  });

  it('comes back in the school last chosen, if it is still a member of it', () => {
    signedIn().store.chooseSchool('school-2');
    expect(signedIn().store.get()).toMatchObject({ schoolId: 'school-2' });
    localStorage.setItem('trayward.school', 'school-9');
    expect(signedIn().store.get()).toMatchObject({ schoolId: 'school-1' });
  });
});
