import { useSyncExternalStore } from 'react';

/** Follows one media query; false where there is no window (a test, a server). */
export function useMediaQuery(query: string): boolean {
  return useSyncExternalStore(
    (changed) => {
      const list = matchMedia(query);
      list?.addEventListener('change', changed);
      return () => list?.removeEventListener('change', changed);
    },
    () => matchMedia(query)?.matches ?? false,
    () => false,
  );
}

function matchMedia(query: string): MediaQueryList | undefined {
  return typeof window !== 'undefined' && typeof window.matchMedia === 'function' ? window.matchMedia(query) : undefined;
}

export type Breadth = 'phone' | 'middle' | 'wide';

export interface Breakpoints {
  breadth: Breadth;
  /** Under 700 px: one column, tabs at the bottom. */
  phone: boolean;
  /** 1000 px and more: rail, list, chosen thing. */
  wide: boolean;
}

/** The one place where the width of the window decides a layout. Phone first. */
export function useBreakpoints(): Breakpoints {
  const middleOrMore = useMediaQuery('(min-width: 700px)');
  const wide = useMediaQuery('(min-width: 1000px)');
  return { breadth: wide ? 'wide' : middleOrMore ? 'middle' : 'phone', phone: !middleOrMore, wide };
}

export function useReducedMotion(): boolean {
  return useMediaQuery('(prefers-reduced-motion: reduce)');
}
