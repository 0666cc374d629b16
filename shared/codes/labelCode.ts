import { Mod37_36 } from '@konfirm/iso7064';

/**
 * Characters a printed code is made of. Both halves of the pairs people confuse on paper (0 and O, 1 and I and L)
 * are left out, and U because it is read as V; whatever a person mistakes for one of these is a plain bad character.
 */
export const LABEL_ALPHABET = '23456789ABCDEFGHJKMNPQRSTVWXYZ';

/** Eleven random characters and one check character: 30^11 bodies, so a code can be neither guessed nor enumerated. */
export const LABEL_CODE_LENGTH = 12;
const BODY_LENGTH = LABEL_CODE_LENGTH - 1;

/** Bytes `makeLabelCode` wants: on average 12 are used, so running out of 48 does not happen in practice. */
export const LABEL_RANDOM_BYTES = 48;

/** Why a scanned or typed text is not a label code. */
export type LabelCodeFault = 'empty' | 'bad_character' | 'wrong_length' | 'check_failed';

/** Tell the two apart with `'code' in reading`. */
export type LabelCodeReading = { readonly code: string } | { readonly reason: LabelCodeFault };

/** The ISO/IEC 7064 MOD 37,36 check character of `body` (characters 0–9 and A–Z). */
export function checkCharacter(body: string): string {
  return Mod37_36.checksum(body);
}

/**
 * Makes a label code from random bytes.
 *
 * MOD 37,36 catches every single wrong character but lets a few swaps of neighbours through (about one code in a
 * hundred has such a pair). Those codes, and codes whose check character is not in our alphabet, are passed over,
 * so a code that was really printed always catches both kinds of slip.
 *
 * @param randomBytes at least `LABEL_RANDOM_BYTES` bytes from a cryptographic source
 * @returns twelve characters of `LABEL_ALPHABET`
 * @throws RangeError when too few bytes were given (or, never in practice, when all were used up)
 */
export function makeLabelCode(randomBytes: Uint8Array): string {
  if (randomBytes.length < LABEL_RANDOM_BYTES) throw new RangeError(`makeLabelCode needs ${LABEL_RANDOM_BYTES} random bytes`);
  const fair = Math.floor(256 / LABEL_ALPHABET.length) * LABEL_ALPHABET.length;
  let body = '';
  for (const byte of randomBytes) {
    if (byte >= fair) continue; // the rest of the byte's range would favour the alphabet's first characters
    body = (body + LABEL_ALPHABET.charAt(byte % LABEL_ALPHABET.length)).slice(-BODY_LENGTH);
    if (body.length < BODY_LENGTH) continue;
    const code = body + checkCharacter(body);
    if (LABEL_ALPHABET.includes(code.charAt(BODY_LENGTH)) && catchesEverySwap(code)) return code;
  }
  throw new RangeError('makeLabelCode used up its random bytes; give it fresh ones');
}

function catchesEverySwap(code: string): boolean {
  for (let at = 0; at + 1 < code.length; at += 1) {
    const [left, right] = [code.charAt(at), code.charAt(at + 1)];
    if (left === right) continue;
    if (Mod37_36.validate(code.slice(0, at) + right + left + code.slice(at + 2))) return false;
  }
  return true;
}

/**
 * Reads a code from whatever a camera, a hand scanner or a person gives: small letters, spaces and dashes, the label's
 * whole link (`…/l/CODE`, with or without query), a scanner's trailing Enter or Tab, or its symbology prefix (`]Q1`).
 *
 * @example parseLabelCode('https://school.example/l/abcd-efgh-jkmn')
 */
export function parseLabelCode(text: string): LabelCodeReading {
  const code = bare(text);
  if (code === '') return { reason: 'empty' };
  for (const character of code) if (!LABEL_ALPHABET.includes(character)) return { reason: 'bad_character' };
  if (code.length !== LABEL_CODE_LENGTH) return { reason: 'wrong_length' };
  return Mod37_36.validate(code) ? { code } : { reason: 'check_failed' };
}

function bare(text: string): string {
  const printable = text.replace(/[\p{Cc}\p{Cf}]/gu, '').trim();
  const withoutPrefix = printable.replace(/^\]Q\d/i, ''); // AIM identifier of a QR code, ISO/IEC 15424
  const fromLink = /\/l\/([^/?#]*)/i.exec(withoutPrefix)?.[1];
  return (fromLink ?? withoutPrefix)
    .replace(/%20/g, '')
    .replace(/[\s\p{Pd}]/gu, '')
    .toUpperCase();
}

/** `ABCDEFGHJKMN` → `ABCD-EFGH-JKMN`, the way a code is printed and read aloud. */
export function groupLabelCode(code: string): string {
  return code.replace(/(.{4})(?=.)/g, '$1-');
}

/** The link a label's QR code carries. `publicUrl` is the origin people reach the app at, with or without a last slash. */
export function labelUrl(publicUrl: string, code: string): string {
  return `${publicUrl.replace(/\/+$/, '')}/l/${code}`;
}
