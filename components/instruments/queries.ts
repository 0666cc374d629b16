import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { InstrumentChange, InstrumentView, NewInstrumentRequest } from '@shared/api/instruments';
import { useApi } from '@/components/api';
import { createInstrumentsQueryKey } from '@/components/readings/instruments';

export function useNewInstrumentMutation() {
  const api = useApi();
  const queries = useQueryClient();
  return useMutation({
    mutationFn: (instrument: NewInstrumentRequest) => api.post<InstrumentView>('/instruments', instrument),
    onSuccess: () => queries.invalidateQueries({ queryKey: createInstrumentsQueryKey() }),
  });
}

export function useInstrumentChangeMutation(instrumentId: string) {
  const api = useApi();
  const queries = useQueryClient();
  return useMutation({
    mutationFn: (change: InstrumentChange) => api.patch<InstrumentView>(`/instruments/${instrumentId}`, change),
    onSuccess: () => queries.invalidateQueries({ queryKey: createInstrumentsQueryKey() }),
  });
}
