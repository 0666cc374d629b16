import { useInfiniteQuery, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { Page } from '@shared/api/common';
import type { ChangeRolesRequest, InvitationView, InviteRequest, PersonView } from '@shared/api/people';
import { stale, useApi, useIdempotentMutation } from '@/components/api';

export function usePeopleQuery() {
  const api = useApi();
  return useInfiniteQuery({
    queryKey: ['people', 'pages'],
    initialPageParam: null as string | null,
    queryFn: ({ signal, pageParam }) => api.get<Page<PersonView>>('/people', { signal, query: { cursor: pageParam } }),
    getNextPageParam: (page) => page.nextCursor,
    staleTime: stale.usual,
  });
}

export function useInvitationsQuery() {
  const api = useApi();
  return useQuery({ queryKey: ['people', 'invitations'], queryFn: ({ signal }) => api.get<Page<InvitationView>>('/people/invitations', { signal }), staleTime: stale.usual });
}

function usePeopleChanged() {
  const queries = useQueryClient();
  return () => queries.invalidateQueries({ queryKey: ['people'] });
}

export function useInviteMutation() {
  const api = useApi();
  const changed = usePeopleChanged();
  return useIdempotentMutation<InvitationView, InviteRequest>({
    operation: (request) => `people/invite/${request.email}`,
    send: (request, options) => api.post<InvitationView>('/people/invitations', request, options),
    onSuccess: changed,
  });
}

export function useWithdrawMutation() {
  const api = useApi();
  const changed = usePeopleChanged();
  return useMutation({ mutationFn: (id: string) => api.delete<unknown>(`/people/invitations/${id}`), onSuccess: changed });
}

export function useChangeRolesMutation(accountId: string) {
  const api = useApi();
  const changed = usePeopleChanged();
  return useMutation({ mutationFn: (request: ChangeRolesRequest) => api.patch<PersonView>(`/people/${accountId}`, request), onSuccess: changed });
}

export function useEndMembershipMutation(accountId: string) {
  const api = useApi();
  const changed = usePeopleChanged();
  return useMutation({ mutationFn: () => api.delete<unknown>(`/people/${accountId}`), onSuccess: changed });
}
