import { createHash, randomBytes } from 'node:crypto';

/** A secret given to one person once; the database keeps only its hash, so that a copy of the table opens nothing. */
export interface SecretToken {
  readonly token: string;
  readonly hash: Buffer;
}

const form = /^[A-Za-z0-9_-]{43}$/;

/** 256 random bits in 43 URL-safe characters. */
export function newSecretToken(): SecretToken {
  const token = randomBytes(32).toString('base64url');
  return { token, hash: createHash('sha256').update(token).digest() };
}

/** The stored hash of a token somebody sent; undefined when it is not even shaped like one. */
export function hashOfToken(token: string | undefined): Buffer | undefined {
  return token !== undefined && form.test(token) ? createHash('sha256').update(token).digest() : undefined;
}
