import type { SessionView } from '@shared/api/sessions';

export type SessionState =
  /** The page has just loaded and asks the server whether the cookie still stands. */
  | { status: 'restoring' }
  /** The server could not be asked. */
  | { status: 'unreachable' }
  | { status: 'signedOut'; ended?: boolean }
  | { status: 'signedIn'; session: SessionView; schoolId: string | null };

const schoolKey = 'trayward.school';

/**
 * Holds the session in memory only: the access token never reaches storage. What survives a reload is the HttpOnly
 * cookie (the server's) and the chosen school's id (here).
 */
export class SessionStore {
  #state: SessionState = { status: 'restoring' };
  readonly #listeners = new Set<() => void>();

  get = (): SessionState => this.#state;

  subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  signIn(session: SessionView): void {
    const known = (id: string | null) => session.memberships.some((membership) => membership.schoolId === id);
    const before = this.#state.status === 'signedIn' ? this.#state.schoolId : readSchool();
    const schoolId = known(before) ? before : (session.memberships[0]?.schoolId ?? null);
    this.#set({ status: 'signedIn', session, schoolId });
  }

  /** @param ended true when a session ended by itself, so that the sign-in page can say so */
  signOut(ended = false): void {
    this.#set(ended ? { status: 'signedOut', ended } : { status: 'signedOut' });
  }

  setUnreachable(): void {
    this.#set({ status: 'unreachable' });
  }

  setRestoring(): void {
    this.#set({ status: 'restoring' });
  }

  chooseSchool(schoolId: string): void {
    if (this.#state.status !== 'signedIn') return;
    storeSchool(schoolId);
    this.#set({ ...this.#state, schoolId });
  }

  #set(state: SessionState): void {
    this.#state = state;
    for (const listener of this.#listeners) listener();
  }
}

function readSchool(): string | null {
  try {
    return localStorage.getItem(schoolKey);
  } catch {
    return null;
  }
}

function storeSchool(schoolId: string): void {
  try {
    localStorage.setItem(schoolKey, schoolId);
  } catch {
    // Storage is closed: the first school is shown again after a reload.
  }
}
