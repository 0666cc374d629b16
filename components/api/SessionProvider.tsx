import { useCallback, useEffect, type ReactNode } from 'react';
import { useApi, useSessionStore } from './ApiProvider';

/** Asks once, after the page has loaded, whether the cookie still stands; until then the session is `restoring`. */
export function SessionProvider({ children }: { children: ReactNode }) {
  const restore = useRestoreSession();
  const store = useSessionStore();
  useEffect(() => {
    if (store.get().status === 'restoring') restore();
  }, [restore, store]);
  return children;
}

/** Asks again after the server could not be reached. */
export function useRestoreSession(): () => void {
  const api = useApi();
  const store = useSessionStore();
  return useCallback(() => {
    store.setRestoring();
    api.renew().catch(() => store.setUnreachable());
  }, [api, store]);
}
