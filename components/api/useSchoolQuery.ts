import { useQuery } from '@tanstack/react-query';
import type { SchoolView } from '@shared/api/school';
import { useApi } from './ApiProvider';
import { stale } from './queryClient';

export function createSchoolQueryKey() {
  return ['school'] as const;
}

/** Settings of the school one works in: name, time zone, currency, closing time, lending rules. */
export function useSchoolQuery() {
  const api = useApi();
  return useQuery({
    queryKey: createSchoolQueryKey(),
    queryFn: ({ signal }) => api.get<SchoolView>('/school', { signal }),
    staleTime: stale.settled,
  });
}
