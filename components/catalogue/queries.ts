import { useInfiniteQuery, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { Page } from '@shared/api/common';
import type { SpeciesSummary } from '@shared/api/evidence';
import type { IntakeReadingsRequest, KitChange, KitPlace, KitRow, KitView, NewKitRequest, NewStoneRequest, PhotoView, StoneChange, StoneView, StrikeRequest } from '@shared/api/kits';
import type { CustodyEventView } from '@shared/api/loans';
import { stale, useApi, useIdempotentMutation } from '@/components/api';

export const createKitsQueryKey = (filter: KitFilter = {}) => ['kits', filter] as const;
export const createKitQueryKey = (kitId: string) => ['kit', kitId] as const;
export const createStoneQueryKey = (stoneId: string) => ['stone', stoneId] as const;

export interface KitFilter { q?: string; place?: KitPlace | '' }

export function useKitsQuery(filter: KitFilter) {
  const api = useApi();
  return useInfiniteQuery({
    queryKey: createKitsQueryKey(filter),
    initialPageParam: null as string | null,
    queryFn: ({ signal, pageParam }) => api.get<Page<KitRow>>('/kits', { signal, query: { q: filter.q || null, place: filter.place || null, cursor: pageParam } }),
    getNextPageParam: (page) => page.nextCursor,
    staleTime: stale.usual,
  });
}

export function useKitQuery(kitId: string) {
  const api = useApi();
  return useQuery({ queryKey: createKitQueryKey(kitId), queryFn: ({ signal }) => api.get<KitView>(`/kits/${kitId}`, { signal }), staleTime: stale.usual });
}

export function useStoneQuery(stoneId: string) {
  const api = useApi();
  return useQuery({ queryKey: createStoneQueryKey(stoneId), queryFn: ({ signal }) => api.get<StoneView>(`/stones/${stoneId}`, { signal }), staleTime: stale.usual });
}

export function useSpeciesQuery() {
  const api = useApi();
  return useQuery({ queryKey: ['species'], queryFn: ({ signal }) => api.get<SpeciesSummary[]>('/species', { signal }), staleTime: stale.settled });
}

export function useCustodyQuery(of: { kitId: string } | { stoneId: string }) {
  const api = useApi();
  const path = 'kitId' in of ? `/kits/${of.kitId}/custody` : `/stones/${of.stoneId}/custody`;
  return useQuery({ queryKey: ['custody', path], queryFn: ({ signal }) => api.get<CustodyEventView[]>(path, { signal }), staleTime: stale.live });
}

/** What shows a kit or its stones is fetched anew after any change to either. */
function useCatalogueChanged() {
  const queries = useQueryClient();
  return () => Promise.all([['kits'], ['kit'], ['stone'], ['custody'], ['browse']].map((queryKey) => queries.invalidateQueries({ queryKey })));
}

export function useNewKitMutation() {
  const api = useApi();
  const changed = useCatalogueChanged();
  return useMutation({ mutationFn: (kit: NewKitRequest) => api.post<KitView>('/kits', kit), onSuccess: changed });
}

export function useKitChangeMutation(kitId: string) {
  const api = useApi();
  const changed = useCatalogueChanged();
  return useMutation({ mutationFn: (change: KitChange) => api.patch<KitView>(`/kits/${kitId}`, change), onSuccess: changed });
}

export function useNewStoneMutation(kitId: string) {
  const api = useApi();
  const changed = useCatalogueChanged();
  return useMutation({ mutationFn: (stone: NewStoneRequest) => api.post<StoneView>(`/kits/${kitId}/stones`, stone), onSuccess: changed });
}

export function useStoneChangeMutation(stoneId: string) {
  const api = useApi();
  const changed = useCatalogueChanged();
  return useMutation({ mutationFn: (change: StoneChange) => api.patch<StoneView>(`/stones/${stoneId}`, change), onSuccess: changed });
}

export function useIntakeMutation(stoneId: string) {
  const api = useApi();
  const changed = useCatalogueChanged();
  return useIdempotentMutation<StoneView, IntakeReadingsRequest>({
    operation: `stones/${stoneId}/readings`,
    send: (request, options) => api.post<StoneView>(`/stones/${stoneId}/readings`, request, options),
    onSuccess: changed,
  });
}

export function useStrikeMutation() {
  const api = useApi();
  const changed = useCatalogueChanged();
  return useMutation({
    mutationFn: ({ readingId, reason }: StrikeRequest & { readingId: string }) => api.post<StoneView>(`/readings/${readingId}/strike`, { reason }),
    onSuccess: changed,
  });
}

export function usePhotoMutation(stoneId: string) {
  const api = useApi();
  const changed = useCatalogueChanged();
  return useMutation({
    mutationFn: ({ photo, note, loanId }: { photo: File; note: string; loanId?: string }) => {
      const form = new FormData();
      form.append('photo', photo);
      form.append('note', note);
      if (loanId !== undefined) form.append('loanId', loanId);
      return api.post<PhotoView>(`/stones/${stoneId}/photos`, form);
    },
    onSuccess: changed,
  });
}

export function useRemovePhotoMutation() {
  const api = useApi();
  const changed = useCatalogueChanged();
  return useMutation({ mutationFn: (photoId: string) => api.delete<unknown>(`/photos/${photoId}`), onSuccess: changed });
}
