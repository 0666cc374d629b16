import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useCallback, useSyncExternalStore } from 'react';
import type { Role } from '@shared/api/common';
import type { MembershipView, SessionView, SignInRequest } from '@shared/api/sessions';
import { useApi, useSessionStore } from './ApiProvider';
import type { SessionState } from './sessionStore';

export interface Session {
  status: SessionState['status'];
  /** The session ended by itself (not by signing out). */
  ended: boolean;
  account: SessionView['account'] | null;
  memberships: readonly MembershipView[];
  /** The school that is being worked in. */
  school: MembershipView | null;
  roles: readonly Role[];
  hasRole: (...roles: Role[]) => boolean;
}

export function useSession(): Session {
  const store = useSessionStore();
  const state = useSyncExternalStore(store.subscribe, store.get, store.get);
  const signedIn = state.status === 'signedIn' ? state : null;
  const memberships = signedIn?.session.memberships ?? [];
  const school = memberships.find((membership) => membership.schoolId === signedIn?.schoolId) ?? null;
  const roles = school?.roles ?? [];
  return {
    status: state.status,
    ended: state.status === 'signedOut' && state.ended === true,
    account: signedIn?.session.account ?? null,
    memberships,
    school,
    roles,
    hasRole: (...wanted) => wanted.some((role) => roles.includes(role)),
  };
}

export function useSignInMutation() {
  const api = useApi();
  const store = useSessionStore();
  const queries = useQueryClient();
  return useMutation({
    mutationFn: (request: SignInRequest) => api.post<SessionView>('/sessions', request, { signedIn: false }),
    onSuccess: (session) => {
      queries.clear();
      store.signIn(session);
    },
  });
}

/** Signs out here even when the server cannot be reached; the cookie then runs out by itself. */
export function useSignOutMutation() {
  const api = useApi();
  const store = useSessionStore();
  const queries = useQueryClient();
  return useMutation({
    mutationFn: () => api.delete<undefined>('/sessions/current'),
    onSettled: () => {
      store.signOut();
      queries.clear();
    },
  });
}

/** Changes the school one works in; everything shown is fetched anew. */
export function useChooseSchool(): (schoolId: string) => void {
  const store = useSessionStore();
  const queries = useQueryClient();
  return useCallback(
    (schoolId) => {
      queries.clear();
      store.chooseSchool(schoolId);
    },
    [store, queries],
  );
}
