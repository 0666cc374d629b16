import type { RequestHandler } from 'express';
import { Authenticator } from 'passport';
import { ExtractJwt, Strategy } from 'passport-jwt';
import { accessTokenRules, type AccessTokens } from './accessTokens';
import type { AccountActor } from './route';
import { signInNeeded } from './problem';
import { isUuid } from './uuid';

/**
 * Requires a valid access token in `Authorization: Bearer …` and keeps its account in `response.locals.actor`.
 * Algorithm, issuer, audience and expiry are all checked; a token signed `none` or with another algorithm is refused.
 */
export function authentication(tokens: AccessTokens): RequestHandler {
  const passport = new Authenticator();
  passport.use(
    new Strategy(
      {
        jwtFromRequest: ExtractJwt.fromAuthHeaderAsBearerToken(),
        // The published types know text and Buffer only; jsonwebtoken below takes a KeyObject and verifies faster with it.
        secretOrKey: tokens.key as unknown as Buffer,
        algorithms: [accessTokenRules.algorithm],
        issuer: accessTokenRules.issuer,
        audience: accessTokenRules.audience,
      },
      (claims: { sub?: unknown }, done) => {
        if (isUuid(claims.sub)) done(null, { accountId: claims.sub } satisfies AccountActor);
        else done(null, false);
      },
    ),
  );
  return (request, response, next) => {
    const decide = (error: unknown, actor: AccountActor | false): void => {
      if (error) next(error);
      else if (!actor) next(signInNeeded());
      else {
        response.locals['actor'] = actor;
        next();
      }
    };
    const check = passport.authenticate('jwt', { session: false }, decide) as RequestHandler;
    void check(request, response, next);
  };
}
