import { useQuery, useQueryClient } from '@tanstack/react-query';
import type { MoneyView, StatementView } from '@shared/api/money';
import type { ObjectionAnswerRequest, SettlementRequest, SettlementView } from '@shared/api/settlement';
import { stale, useApi, useIdempotentMutation } from '@/components/api';

export const createSettlementQueryKey = (loanId: string) => ['settlements', loanId] as const;
export const createMoneyQueryKey = () => ['money'] as const;
export const createStatementQueryKey = (loanId: string) => ['statement', loanId] as const;

export function useSettlementQuery(loanId: string, enabled: boolean) {
  const api = useApi();
  return useQuery({
    queryKey: createSettlementQueryKey(loanId),
    queryFn: ({ signal }) => api.get<SettlementView>(`/settlements/${loanId}`, { signal }),
    staleTime: stale.live,
    enabled,
  });
}

export function useMoneyQuery() {
  const api = useApi();
  return useQuery({
    queryKey: createMoneyQueryKey(),
    queryFn: ({ signal }) => api.get<MoneyView>('/money', { signal }),
    staleTime: stale.live,
  });
}

export function useStatementQuery(loanId: string, enabled = true) {
  const api = useApi();
  return useQuery({
    queryKey: createStatementQueryKey(loanId),
    queryFn: ({ signal }) => api.get<StatementView>(`/loans/${loanId}/statement`, { signal }),
    staleTime: stale.live,
    enabled,
  });
}

function useSettlementMutation<Body>(loanId: string, name: string, method: 'put' | 'post') {
  const api = useApi();
  const queries = useQueryClient();
  return useIdempotentMutation<SettlementView, Body>({
    operation: `settlements/${loanId}/${name}`,
    send: (body, options) => api[method]<SettlementView>(`/settlements/${loanId}/${name}`, body, options),
    onSuccess: async (view) => {
      queries.setQueryData(createSettlementQueryKey(loanId), view);
      await Promise.all([['desk'], ['loans'], ['staff-loans'], ['money'], ['statement', loanId], ['kits'], ['bench']].map((queryKey) => queries.invalidateQueries({ queryKey })));
    },
  });
}

export const useProposeMutation = (loanId: string) => useSettlementMutation<SettlementRequest>(loanId, 'proposal', 'put');
export const useDecideMutation = (loanId: string) => useSettlementMutation<SettlementRequest>(loanId, 'decision', 'post');
export const useAnswerObjectionMutation = (loanId: string) => useSettlementMutation<ObjectionAnswerRequest>(loanId, 'objection-answer', 'post');
