import { useQuery } from '@tanstack/react-query';
import type { DeskView } from '@shared/api/desk';
import { stale, useApi } from '@/components/api';

export const createDeskQueryKey = () => ['desk'] as const;

export function useDeskQuery() {
  const api = useApi();
  return useQuery({
    queryKey: createDeskQueryKey(),
    queryFn: ({ signal }) => api.get<DeskView>('/desk', { signal }),
    staleTime: stale.live,
  });
}
