import { useQuery, useQueryClient } from '@tanstack/react-query';
import type { AcceptStoneRequest, BenchJarRequest, BenchList, BenchReadingsRequest, BenchView, EndStoneRequest, OpenBenchRequest } from '@shared/api/bench';
import type { StrikeRequest } from '@shared/api/kits';
import { stale, useApi, useIdempotentMutation } from '@/components/api';

export const createBenchListQueryKey = () => ['bench'] as const;
export const createBenchQueryKey = (loanId: string) => ['bench', loanId] as const;

export function useBenchListQuery() {
  const api = useApi();
  return useQuery({
    queryKey: createBenchListQueryKey(),
    queryFn: ({ signal }) => api.get<BenchList>('/bench', { signal }),
    staleTime: stale.live,
  });
}

export function useBenchQuery(loanId: string) {
  const api = useApi();
  return useQuery({
    queryKey: createBenchQueryKey(loanId),
    queryFn: ({ signal }) => api.get<BenchView>(`/bench/${loanId}`, { signal }),
    staleTime: stale.live,
  });
}

/** Every write at the bench answers with the whole check as it stands now; what else shows the loan is fetched anew. */
function useBenchMutation<Variables>(loanId: string, name: string, send: { path: (variables: Variables) => string; body: (variables: Variables) => unknown }) {
  const api = useApi();
  const queries = useQueryClient();
  return useIdempotentMutation<BenchView, Variables>({
    operation: (variables) => `bench/${loanId}/${name}/${send.path(variables)}`,
    send: (variables, options) => api.post<BenchView>(`/bench/${loanId}${send.path(variables)}`, send.body(variables), options),
    onSuccess: async (view) => {
      queries.setQueryData(createBenchQueryKey(loanId), view);
      await Promise.all([
        queries.invalidateQueries({ queryKey: createBenchListQueryKey(), exact: true }),
        queries.invalidateQueries({ queryKey: ['desk'] }),
        queries.invalidateQueries({ queryKey: ['settlements'] }),
      ]);
    },
  });
}

export const useOpenBenchMutation = (loanId: string) =>
  useBenchMutation<OpenBenchRequest>(loanId, 'open', { path: () => '/opening', body: (request) => request });

export const useBenchJarMutation = (loanId: string) =>
  useBenchMutation<BenchJarRequest>(loanId, 'jar', { path: () => '/jars', body: (request) => request });

export const useBenchReadingsMutation = (loanId: string, stoneId: string) =>
  useBenchMutation<BenchReadingsRequest>(loanId, 'readings', { path: () => `/stones/${stoneId}/readings`, body: (request) => request });

export const useBenchStrikeMutation = (loanId: string) =>
  useBenchMutation<StrikeRequest & { readingId: string }>(loanId, 'strike', {
    path: ({ readingId }) => `/readings/${readingId}/strike`,
    body: ({ reason }) => ({ reason }),
  });

export const useSecondReadingMutation = (loanId: string, stoneId: string) =>
  useBenchMutation<undefined>(loanId, 'second', { path: () => `/stones/${stoneId}/second-reading`, body: () => undefined });

export const useAcceptStoneMutation = (loanId: string, stoneId: string) =>
  useBenchMutation<AcceptStoneRequest>(loanId, 'accept', { path: () => `/stones/${stoneId}/acceptance`, body: (request) => request });

export const useEndStoneMutation = (loanId: string, stoneId: string) =>
  useBenchMutation<EndStoneRequest>(loanId, 'end', { path: () => `/stones/${stoneId}/ending`, body: (request) => request });
