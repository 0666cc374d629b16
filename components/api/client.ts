import type { ProblemDocument } from '@shared/api/common';
import type { SessionView } from '@shared/api/sessions';
import { ApiProblem, NoAnswer } from './problem';
import type { SessionStore } from './sessionStore';

export type QueryValues = Record<string, string | number | boolean | null | undefined>;

export interface RequestOptions {
  query?: QueryValues;
  /** Sent as JSON, or as it is when it is FormData. */
  body?: unknown;
  idempotencyKey?: string;
  signal?: AbortSignal;
  /** False for what works without a session (invitations, resets, sign-in). */
  signedIn?: boolean;
}

type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';

/** A token is renewed this long before it runs out, so that a request does not arrive late. */
const renewBeforeMs = 15_000;

/**
 * The one way to the server. Adds the access token and the school, renews the token once (for all requests waiting),
 * and turns every refusal into an `ApiProblem` and every missing answer into a `NoAnswer`.
 */
export class ApiClient {
  readonly #base: string;
  readonly #store: SessionStore;
  #renewal: Promise<boolean> | null = null;

  constructor(store: SessionStore, base = '/api/v1') {
    this.#store = store;
    this.#base = base;
  }

  get = <T>(path: string, options?: RequestOptions): Promise<T> => this.#json<T>('GET', path, options);
  post = <T>(path: string, body?: unknown, options?: RequestOptions): Promise<T> => this.#json<T>('POST', path, { ...options, body });
  put = <T>(path: string, body?: unknown, options?: RequestOptions): Promise<T> => this.#json<T>('PUT', path, { ...options, body });
  patch = <T>(path: string, body?: unknown, options?: RequestOptions): Promise<T> => this.#json<T>('PATCH', path, { ...options, body });
  delete = <T>(path: string, options?: RequestOptions): Promise<T> => this.#json<T>('DELETE', path, options);

  /** A file: a photo, a sheet of labels. Sent as GET, or as POST where there is a body. */
  blob = async (path: string, options: RequestOptions = {}): Promise<Blob> => {
    const response = await this.#send(options.body === undefined ? 'GET' : 'POST', path, options);
    return response.blob();
  };

  /**
   * Renews the session by the cookie. Requests that come meanwhile wait for the same answer; other tabs take turns,
   * because each renewal rotates the cookie.
   * @returns whether there is a session now
   * @throws NoAnswer, or ApiProblem of a server in trouble; the session is then left as it is
   */
  renew = (): Promise<boolean> => {
    this.#renewal ??= inTurn(() => this.#renewNow()).finally(() => {
      this.#renewal = null;
    });
    return this.#renewal;
  };

  async #renewNow(): Promise<boolean> {
    const response = await this.#fetch('POST', '/sessions/refresh', {}, null);
    if (response.ok) {
      this.#store.signIn((await response.json()) as SessionView);
      return true;
    }
    if (response.status >= 500 || response.status === 429) throw await problemOf(response);
    this.#store.signOut(this.#store.get().status === 'signedIn');
    return false;
  }

  async #json<T>(method: Method, path: string, options: RequestOptions = {}): Promise<T> {
    const response = await this.#send(method, path, options);
    const text = await response.text();
    return (text === '' ? undefined : JSON.parse(text)) as T;
  }

  async #send(method: Method, path: string, options: RequestOptions): Promise<Response> {
    const needsSession = options.signedIn !== false;
    if (needsSession && this.#runsOut()) await this.renew();
    let response = await this.#fetch(method, path, options, needsSession ? this.#token() : null);
    if (response.status === 401 && needsSession && (await this.renew())) {
      response = await this.#fetch(method, path, options, this.#token());
    }
    if (!response.ok) throw await problemOf(response);
    return response;
  }

  async #fetch(method: Method, path: string, options: RequestOptions, token: string | null): Promise<Response> {
    const headers: Record<string, string> = { Accept: 'application/json' };
    if (token) headers['Authorization'] = `Bearer ${token}`;
    const state = this.#store.get();
    if (token && state.status === 'signedIn' && state.schoolId) headers['X-School'] = state.schoolId;
    if (options.idempotencyKey) headers['Idempotency-Key'] = options.idempotencyKey;
    const isForm = typeof FormData !== 'undefined' && options.body instanceof FormData;
    if (options.body !== undefined && !isForm) headers['Content-Type'] = 'application/json';
    try {
      return await fetch(this.#base + path + queryText(options.query), {
        method,
        headers,
        credentials: 'same-origin',
        ...(options.body === undefined ? {} : { body: isForm ? (options.body as FormData) : JSON.stringify(options.body) }),
        ...(options.signal ? { signal: options.signal } : {}),
      });
    } catch (cause) {
      if (options.signal?.aborted) throw cause;
      throw new NoAnswer(cause);
    }
  }

  #token(): string | null {
    const state = this.#store.get();
    return state.status === 'signedIn' ? state.session.accessToken : null;
  }

  #runsOut(): boolean {
    const state = this.#store.get();
    return state.status === 'signedIn' && Date.parse(state.session.expiresAt) - Date.now() < renewBeforeMs;
  }
}

/** Only one tab of this browser renews at a time, where the browser can say so. */
async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  // Only secure pages have locks; without them two tabs rely on the server's short grace for the token before.
  const locks = navigator.locks as LockManager | undefined;
  return locks ? await locks.request('trayward.renew', work) : await work();
}

async function problemOf(response: Response): Promise<ApiProblem> {
  try {
    const document = (await response.json()) as Partial<ProblemDocument>;
    return new ApiProblem(response.status, document);
  } catch {
    return new ApiProblem(response.status);
  }
}

function queryText(query: QueryValues | undefined): string {
  const pairs = Object.entries(query ?? {}).flatMap(([key, value]) =>
    value === undefined || value === null ? [] : [`${encodeURIComponent(key)}=${encodeURIComponent(String(value))}`],
  );
  return pairs.length > 0 ? `?${pairs.join('&')}` : '';
}
