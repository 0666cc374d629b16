import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { IssuedLabels, IssueLabelsRequest, LabelSheetRequest } from '@shared/api/labels';
import { useApi, useIdempotentMutation } from '@/components/api';

export function useIssueLabelsMutation() {
  const api = useApi();
  const queries = useQueryClient();
  return useIdempotentMutation<IssuedLabels, IssueLabelsRequest>({
    operation: (request) => `labels/${request.kitId}/${(request.stoneIds ?? []).join(',')}/${String(request.includeKit ?? '')}`,
    send: (request, options) => api.post<IssuedLabels>('/labels', request, options),
    onSuccess: () => Promise.all([['kit'], ['kits'], ['stone'], ['custody']].map((queryKey) => queries.invalidateQueries({ queryKey }))),
  });
}

/** Fetches the sheet and gives it to the browser as a file. */
export function useLabelSheetMutation() {
  const api = useApi();
  return useMutation({
    mutationFn: async (request: LabelSheetRequest) => {
      const sheet = await api.blob('/labels/sheet', { body: request });
      const address = URL.createObjectURL(sheet);
      const link = document.createElement('a');
      link.href = address;
      link.download = 'labels.pdf';
      link.click();
      // The browser reads the address a moment after the click.
      setTimeout(() => URL.revokeObjectURL(address), 60_000);
    },
  });
}
