import { QueryClientProvider, type QueryClient } from '@tanstack/react-query';
import { createContext, useContext, useState, type ReactNode } from 'react';
import { ApiClient } from './client';
import { createQueryClient } from './queryClient';
import { SessionStore } from './sessionStore';

interface Api {
  client: ApiClient;
  store: SessionStore;
}

const Context = createContext<Api | null>(null);

export interface ApiProviderProps {
  children: ReactNode;
  /** For tests: a store that is already signed in, a query client without retries. */
  store?: SessionStore;
  queryClient?: QueryClient;
}

export function ApiProvider({ children, store, queryClient }: ApiProviderProps) {
  const [api] = useState<Api>(() => {
    const ownStore = store ?? new SessionStore();
    return { store: ownStore, client: new ApiClient(ownStore) };
  });
  const [queries] = useState(() => queryClient ?? createQueryClient());
  return (
    <Context.Provider value={api}>
      <QueryClientProvider client={queries}>{children}</QueryClientProvider>
    </Context.Provider>
  );
}

function useContextApi(): Api {
  const api = useContext(Context);
  if (!api) throw new Error('useApi needs an ApiProvider above it');
  return api;
}

export function useApi(): ApiClient {
  return useContextApi().client;
}

export function useSessionStore(): SessionStore {
  return useContextApi().store;
}
