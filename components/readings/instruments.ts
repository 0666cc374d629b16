import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { InstrumentKind, InstrumentView } from '@shared/api/instruments';
import { stale, useApi } from '@/components/api';
import type { Instruments } from './draft';

export const createInstrumentsQueryKey = () => ['instruments'] as const;

export function useInstrumentsQuery() {
  const api = useApi();
  return useQuery({
    queryKey: createInstrumentsQueryKey(),
    queryFn: ({ signal }) => api.get<InstrumentView[]>('/instruments', { signal }),
    staleTime: stale.settled,
  });
}

const storageKey = 'trayward.instruments';

/**
 * The instrument chosen for each kind: the one used last in this browser, else the first of the register.
 * Chosen once, remembered until another is chosen.
 */
export function useChosenInstruments(register: readonly InstrumentView[]): { chosen: Instruments; choose: (kind: InstrumentKind, id: string) => void } {
  const [remembered, setRemembered] = useState<Instruments>(load);
  const usable = register.filter((instrument) => !instrument.retired);
  const chosen: Instruments = {};
  for (const instrument of usable) {
    if (chosen[instrument.kind] === undefined || remembered[instrument.kind] === instrument.id) chosen[instrument.kind] = instrument.id;
  }
  return {
    chosen,
    choose: (kind, id) => {
      const next = { ...remembered, [kind]: id };
      setRemembered(next);
      globalThis.localStorage.setItem(storageKey, JSON.stringify(next));
    },
  };
}

function load(): Instruments {
  try {
    return JSON.parse(globalThis.localStorage.getItem(storageKey) ?? '{}') as Instruments;
  } catch {
    return {};
  }
}
