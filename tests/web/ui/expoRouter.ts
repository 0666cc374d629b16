import type { ReactNode } from 'react';

/** Stands in for expo-router where a primitive is tested without routes. */
export const router = { push: jest.fn(), replace: jest.fn(), back: jest.fn() };
export const useRouter = () => router;

export const place = { pathname: '/desk', params: {} as Record<string, string> };
export const usePathname = () => place.pathname;
export const useLocalSearchParams = () => place.params;

export const redirected = jest.fn();
export function Redirect({ href }: { href: string }): ReactNode {
  redirected(href);
  return null;
}

export function Slot(): ReactNode {
  return null;
}
