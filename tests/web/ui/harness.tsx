import { render, type RenderResult } from '@testing-library/react';
import { QueryClient } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import type { Role } from '@shared/api/common';
import { ApiProvider, SessionStore } from '@/components/api';
import { ThemeProvider, type SchemeName } from '@/components/theme';
import { ToastProvider } from '@/components/ui';

/** jsdom has no modal dialogs, no canvas and no fetch of its own; what matters of them is stood in for here. */
export function installBrowserParts(): void {
  HTMLDialogElement.prototype.showModal = function showModal() {
    this.open = true;
  };
  HTMLDialogElement.prototype.close = function close() {
    this.open = false;
    this.dispatchEvent(new Event('close'));
  };
  HTMLCanvasElement.prototype.getContext = () => null;
  HTMLFormElement.prototype.requestSubmit = function requestSubmit() {
    this.dispatchEvent(new Event('submit', { bubbles: true, cancelable: true }));
  };
}

export function signedInStore(roles: Role[] = ['admin']): SessionStore {
  const store = new SessionStore();
  store.signIn({
    accessToken: 'token',
    expiresAt: new Date(Date.now() + 900_000).toISOString(),
    account: { id: 'account-1', name: 'Ada Portell', email: 'admin@portellery.example' },
    memberships: [{ schoolId: 'school-1', schoolName: 'Portellery', roles }],
  });
  return store;
}

/** Says which queries match as if the window had this width. */
export function setWidth(px: number): void {
  window.matchMedia = (query) => {
    const least = /min-width: (\d+)px/.exec(query)?.[1];
    const matches = least !== undefined && px >= Number(least);
    return Object.assign(new EventTarget(), { matches, media: query, onchange: null, addListener: () => undefined, removeListener: () => undefined });
  };
}

export function show(children: ReactNode, { store = signedInStore(), scheme = 'light' }: { store?: SessionStore; scheme?: SchemeName } = {}): RenderResult {
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false }, mutations: { retry: false } } });
  return render(
    <ThemeProvider scheme={scheme}>
      <ApiProvider store={store} queryClient={queryClient}>
        <ToastProvider>{children}</ToastProvider>
      </ApiProvider>
    </ThemeProvider>,
  );
}
