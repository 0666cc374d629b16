import type { Config } from '@/server/config';
import { reply, type Reply } from '@/server/http/reply';
import { nothing, route, schema } from '@/server/http/route';
import type { MeView, SessionView } from '@shared/api/sessions';
import { signInNeeded } from '@/server/http/problem';
import { readMemberships } from './memberships';
import { askForReset, setPassword } from './passwordReset.service';
import { requireSameOrigin } from './sameOrigin';
import { NewPasswordBody, PasswordResetBody, SignInBody } from './sessions.dto';
import { readAccount, refresh, signIn, signOut, type OpenedSession } from './sessions.service';

const cookieName = 'trayward_refresh';

/** The cookie goes to these routes only, is out of reach of scripts, and follows no link from elsewhere. */
function cookie(config: Config, value: string, expires: Date) {
  return { name: cookieName, value, options: { httpOnly: true, sameSite: 'strict', secure: config.secureCookies, path: '/api/v1/sessions', expires } } as const;
}

function opened(config: Config, status: number, { view, refresh: token }: OpenedSession): Reply<SessionView> {
  return reply(status, view, { cookies: [cookie(config, token.token, token.expiresAt)] });
}

export const sessionsRoutes = [
  route({
    method: 'post', path: '/sessions', permission: 'public', summary: 'Sign in with e-mail and password',
    request: SignInBody, response: schema<SessionView>('SessionView'), status: 201, idempotent: false, transaction: 'none',
    handle: async ({ db, services, body, address, now }) => opened(services.config, 201, await signIn(db, services, body, { address, now })),
  }),
  route({
    method: 'post', path: '/sessions/refresh', permission: 'public', summary: 'Exchange the refresh cookie for a new access token',
    response: schema<SessionView>('SessionView'), idempotent: false, transaction: 'none',
    handle: async ({ db, services, header, cookies, now }) => {
      requireSameOrigin(header, services.config.publicUrl);
      return opened(services.config, 200, await refresh(db, services, cookies[cookieName], now));
    },
  }),
  route({
    method: 'delete', path: '/sessions/current', permission: 'public', summary: 'Sign out on this device',
    response: nothing(), idempotent: false, transaction: 'none',
    handle: async ({ db, services, header, cookies, now }) => {
      requireSameOrigin(header, services.config.publicUrl);
      await signOut(db, cookies[cookieName], now);
      return reply(204, undefined, { cookies: [cookie(services.config, '', new Date(0))] });
    },
  }),
  route({
    method: 'post', path: '/password-resets', permission: 'public', summary: 'Ask for a link to set a new password; the answer never tells whether the address is known',
    request: PasswordResetBody, response: nothing(), idempotent: false, transaction: 'none',
    handle: async ({ db, services, body, address, now }) => {
      await askForReset(db, services, body.email, { address, now });
      return reply(202, undefined);
    },
  }),
  route({
    method: 'post', path: '/password-resets/:token', permission: 'public', summary: 'Set a new password with the link from the mail',
    request: NewPasswordBody, response: nothing(), idempotent: false, transaction: 'none',
    handle: async ({ db, params, body, now }) => {
      await setPassword(db, params.token, body.password, now);
      return undefined;
    },
  }),
  route({
    method: 'get', path: '/me', permission: 'signed-in', summary: 'Who is signed in, and their schools',
    response: schema<MeView>('MeView'), idempotent: false,
    handle: async ({ tx, actor }) => {
      const account = await readAccount(tx, actor.accountId);
      if (!account) throw signInNeeded();
      return { account: { id: account.id, name: account.name, email: account.email }, memberships: await readMemberships(tx, account.id) };
    },
  }),
];
