import { hash, verify } from '@node-rs/argon2';

/** OWASP's first choice for argon2id (Password Storage Cheat Sheet): 19 MiB, two passes, one lane; about 7 ms here. */
const argon2id = { algorithm: 2, memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;

export const passwordMinLength = 10;
/** Long enough for any passphrase, short enough that hashing it costs nobody anything. */
export const passwordMaxLength = 200;

/** One spelling for the same typed letters: keyboards differ in how they compose accents. */
const spelled = (password: string): string => password.normalize('NFC');

/** The argon2id hash of a password, with its parameters and a new salt inside. */
export function hashPassword(password: string): Promise<string> {
  return hash(spelled(password), argon2id);
}

/**
 * True when the password is the hashed one. With `undefined` for an account that does not exist the same work is done on
 * a hash nobody knows the password of, so that the time taken does not tell whether an address is known.
 */
export async function passwordMatches(passwordHash: string | undefined, password: string): Promise<boolean> {
  const matches = await verify(passwordHash ?? (await hashOfNobody()), spelled(password));
  return passwordHash !== undefined && matches;
}

let nobody: Promise<string> | undefined;

function hashOfNobody(): Promise<string> {
  nobody ??= hash(crypto.randomUUID(), argon2id);
  return nobody;
}

/** Why a new password cannot be taken, in words; undefined when it can. */
export function passwordFault(password: string, email: string): string | undefined {
  if (spelled(password).length < passwordMinLength) return `Use at least ${passwordMinLength} characters. A few words in a row are easy to remember.`;
  const [name = ''] = email.split('@');
  const lower = spelled(password).toLowerCase();
  if (lower === email || lower === name) return 'Do not use your e-mail address as the password.';
  if (new Set(lower).size < 4) return 'Use more than a few different characters.';
  return undefined;
}
