import { createSecretKey, type KeyObject } from 'node:crypto';
import jwt from 'jsonwebtoken';

export const accessTokenRules = { algorithm: 'HS256', issuer: 'trayward', audience: 'trayward-api', minutes: 15 } as const;

/** Makes the short-lived tokens that say who is signed in; they carry the account's id and nothing else about it. */
export interface AccessTokens {
  readonly key: KeyObject;
  issue(accountId: string, now: Date): { accessToken: string; expiresAt: Date };
}

/** A `KeyObject` and not a string: verifying is then about ten times quicker, since the key is not parsed each time. */
export function createAccessTokens(secret: string): AccessTokens {
  const key = createSecretKey(Buffer.from(secret, 'utf8'));
  return {
    key,
    issue(accountId, now) {
      const issuedAt = Math.floor(now.getTime() / 1000);
      const expires = issuedAt + accessTokenRules.minutes * 60;
      const accessToken = jwt.sign({ iat: issuedAt, exp: expires }, key, {
        subject: accountId,
        algorithm: accessTokenRules.algorithm,
        issuer: accessTokenRules.issuer,
        audience: accessTokenRules.audience,
      });
      return { accessToken, expiresAt: new Date(expires * 1000) };
    },
  };
}
