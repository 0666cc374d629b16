import { useMutation, type UseMutationOptions, type UseMutationResult } from '@tanstack/react-query';
import { claimKey, settleKey } from './idempotency';
import { isTransient } from './problem';
import { useSession } from './useSession';

export interface IdempotentOptions<Answer, Variables> extends Omit<UseMutationOptions<Answer, Error, Variables>, 'mutationFn' | 'retry'> {
  /** What is done to what, such as `loans/${loanId}/return`: one pending intent for each. */
  operation: string | ((variables: Variables) => string);
  send: (variables: Variables, options: { idempotencyKey: string }) => Promise<Answer>;
}

/**
 * A write that may be repeated without being done twice. The key is made and stored before sending, kept through
 * lost answers and reloads, and dropped on a final answer. Lost answers are tried again twice by themselves.
 * @example
 * const start = useIdempotentMutation({
 *   operation: (request) => `loans/start/${request.code}`,
 *   send: (request: StartLoanRequest, options) => api.post<LoanView>('/loans', request, options),
 * });
 */
export function useIdempotentMutation<Answer, Variables = void>(options: IdempotentOptions<Answer, Variables>): UseMutationResult<Answer, Error, Variables> {
  const { operation, send, ...rest } = options;
  const { account } = useSession();
  return useMutation<Answer, Error, Variables>({
    ...rest,
    retry: (count, error) => count < 2 && isTransient(error),
    mutationFn: async (variables) => {
      const name = `${account?.id ?? 'nobody'}/${typeof operation === 'string' ? operation : operation(variables)}`;
      const idempotencyKey = claimKey(name, variables);
      try {
        const answer = await send(variables, { idempotencyKey });
        settleKey(name);
        return answer;
      } catch (error) {
        settleKey(name, error);
        throw error;
      }
    },
  });
}
