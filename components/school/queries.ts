import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { NewTermsRequest, SchoolChange, SchoolView, TermsView } from '@shared/api/school';
import { createSchoolQueryKey, stale, useApi } from '@/components/api';

export function useTermsQuery() {
  const api = useApi();
  return useQuery({ queryKey: ['terms'], queryFn: ({ signal }) => api.get<TermsView>('/school/terms', { signal }), staleTime: stale.settled });
}

export function useSchoolChangeMutation() {
  const api = useApi();
  const queries = useQueryClient();
  return useMutation({
    mutationFn: (change: SchoolChange) => api.patch<SchoolView>('/school', change),
    onSuccess: async (school) => {
      queries.setQueryData(createSchoolQueryKey(), school);
      await Promise.all([['kits'], ['kit'], ['browse'], ['desk']].map((queryKey) => queries.invalidateQueries({ queryKey })));
    },
  });
}

export function useNewTermsMutation() {
  const api = useApi();
  const queries = useQueryClient();
  return useMutation({
    mutationFn: (terms: NewTermsRequest) => api.post<TermsView>('/school/terms', terms),
    onSuccess: () => queries.invalidateQueries({ queryKey: ['terms'] }),
  });
}
