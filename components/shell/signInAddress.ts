import type { To } from '@/components/ui/Link';

/** The sign-in page that leads back to `pathname` afterwards. */
export function signInAddress(pathname: string): To {
  return pathname === '/' ? '/sign-in' : `/sign-in?next=${encodeURIComponent(pathname)}`;
}

/** An address inside the app, or null: what comes with a link is not to lead to another site. */
export function safeNext(next: string | string[] | undefined): To | null {
  if (typeof next !== 'string' || !/^\/(?![/\\])/.test(next)) return null;
  return next as To;
}
