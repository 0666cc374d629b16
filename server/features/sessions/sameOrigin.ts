import { forbidden } from '@/server/http/problem';

/**
 * Refuses a request that another site's page made the browser send. Routes that act on the cookie alone need it although
 * the cookie is SameSite=Strict, because a sibling subdomain counts as the same site. Browsers say where a request comes
 * from in `Sec-Fetch-Site`, or at least in `Origin`; a client that sends neither is no browser and has no cookie to abuse.
 */
export function requireSameOrigin(header: (name: string) => string | undefined, publicUrl: string): void {
  const site = header('sec-fetch-site');
  if (site !== undefined) {
    if (site === 'same-origin') return;
    throw otherOrigin();
  }
  const origin = header('origin');
  if (origin === undefined || origin === publicUrl) return;
  if (!URL.canParse(origin) || new URL(origin).host !== header('host')) throw otherOrigin();
}

function otherOrigin(): Error {
  return forbidden('This has to be done from the app itself. Open it and try again.', 'other_origin');
}
