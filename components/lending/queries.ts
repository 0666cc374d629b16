import { useQuery, useQueryClient } from '@tanstack/react-query';
import type { ScannedLabel } from '@shared/api/labels';
import type {
  AcceptTermsRequest, BrowseKit, CancelLoanRequest, LoanView, ObjectionRequest, OpenPaymentView, ReturnLoanRequest, SeeJarRequest, StaffLoanView, StartLoanRequest,
} from '@shared/api/loans';
import { stale, useApi, useIdempotentMutation } from '@/components/api';

export const createBrowseQueryKey = () => ['browse'] as const;
export const createLoansQueryKey = () => ['loans'] as const;
export const createLoanQueryKey = (loanId: string) => ['loans', loanId] as const;
export const createStaffLoanQueryKey = (loanId: string) => ['staff-loans', loanId] as const;
export const createLabelQueryKey = (code: string) => ['labels', code] as const;

export function useBrowseQuery() {
  const api = useApi();
  return useQuery({
    queryKey: createBrowseQueryKey(),
    queryFn: ({ signal }) => api.get<{ items: BrowseKit[] }>('/browse/kits', { signal }),
    staleTime: stale.live,
  });
}

export function useLoansQuery() {
  const api = useApi();
  return useQuery({
    queryKey: createLoansQueryKey(),
    queryFn: ({ signal }) => api.get<{ items: LoanView[] }>('/loans', { signal }),
    staleTime: stale.live,
  });
}

export function useLoanQuery(loanId: string, enabled = true) {
  const api = useApi();
  return useQuery({
    queryKey: createLoanQueryKey(loanId),
    queryFn: ({ signal }) => api.get<LoanView>(`/loans/${loanId}`, { signal }),
    staleTime: stale.live,
    enabled,
  });
}

export function useStaffLoanQuery(loanId: string, enabled = true) {
  const api = useApi();
  return useQuery({
    queryKey: createStaffLoanQueryKey(loanId),
    queryFn: ({ signal }) => api.get<StaffLoanView>(`/staff/loans/${loanId}`, { signal }),
    staleTime: stale.live,
    enabled,
  });
}

export function useLabelQuery(code: string) {
  const api = useApi();
  return useQuery({
    queryKey: createLabelQueryKey(code),
    queryFn: ({ signal }) => api.get<ScannedLabel>(`/labels/${code}`, { signal }),
    staleTime: stale.live,
    enabled: code !== '',
  });
}

export function useStartLoanMutation() {
  const api = useApi();
  const queries = useQueryClient();
  return useIdempotentMutation<LoanView, StartLoanRequest>({
    operation: (request) => `loans/start/${request.code ?? request.kitId ?? ''}/${request.borrowerId ?? ''}`,
    send: (request, options) => api.post<LoanView>('/loans', request, options),
    onSuccess: async (loan) => {
      queries.setQueryData(createLoanQueryKey(loan.id), loan);
      await Promise.all([['loans'], ['browse'], ['labels'], ['desk']].map((queryKey) => queries.invalidateQueries({ queryKey, refetchType: 'none' })));
    },
  });
}

/** Writes on one loan answer with the loan as it stands now. */
function useLoanMutation<Body>(loanId: string, name: string) {
  const api = useApi();
  const queries = useQueryClient();
  return useIdempotentMutation<LoanView, Body>({
    operation: (body) => `loans/${loanId}/${name}/${JSON.stringify(body ?? {})}`,
    send: (body, options) => api.post<LoanView>(`/loans/${loanId}/${name}`, body, options),
    onSuccess: async (loan) => {
      queries.setQueryData(createLoanQueryKey(loanId), loan);
      await Promise.all([
        queries.invalidateQueries({ queryKey: createLoansQueryKey(), exact: true }),
        queries.invalidateQueries({ queryKey: createBrowseQueryKey() }),
        queries.invalidateQueries({ queryKey: createStaffLoanQueryKey(loanId) }),
        queries.invalidateQueries({ queryKey: ['desk'] }),
      ]);
    },
  });
}

export const useSeeJarMutation = (loanId: string) => useLoanMutation<SeeJarRequest>(loanId, 'jars');
export const useAcceptTermsMutation = (loanId: string) => useLoanMutation<AcceptTermsRequest>(loanId, 'terms');
export const useCancelLoanMutation = (loanId: string) => useLoanMutation<CancelLoanRequest>(loanId, 'cancel');
export const useReturnLoanMutation = (loanId: string) => useLoanMutation<ReturnLoanRequest>(loanId, 'return');
export const useObjectMutation = (loanId: string) => useLoanMutation<ObjectionRequest>(loanId, 'objection');

/** Opens the payment page, or comes back with the kit out where no deposit is due. */
export function useOpenPaymentMutation(loanId: string) {
  const api = useApi();
  const queries = useQueryClient();
  return useIdempotentMutation<OpenPaymentView>({
    operation: `loans/${loanId}/payment`,
    send: (_, options) => api.post<OpenPaymentView>(`/loans/${loanId}/payment`, undefined, options),
    onSuccess: ({ loan }) => queries.setQueryData(createLoanQueryKey(loanId), loan),
  });
}

/** Back from the payment page: asks the server to look the payment up now instead of waiting for its notice. */
export function useCheckPaymentQuery(loanId: string, enabled: boolean) {
  const api = useApi();
  const queries = useQueryClient();
  return useQuery({
    queryKey: ['loans', loanId, 'payment-check'],
    queryFn: async () => {
      const loan = await api.post<LoanView>(`/loans/${loanId}/payment/check`);
      queries.setQueryData(createLoanQueryKey(loanId), loan);
      return loan;
    },
    enabled,
    staleTime: 0,
    gcTime: 0,
  });
}
