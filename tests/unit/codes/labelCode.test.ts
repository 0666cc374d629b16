import { randomBytes } from 'node:crypto';
import {
  LABEL_ALPHABET, LABEL_CODE_LENGTH, LABEL_RANDOM_BYTES, checkCharacter, groupLabelCode, labelUrl, makeLabelCode, parseLabelCode,
} from '@shared/codes';

/** Bytes from a small seeded generator (mulberry32), so that a failure can be repeated. */
function seededBytes(seed: number): Uint8Array {
  let state = seed >>> 0;
  return Uint8Array.from({ length: LABEL_RANDOM_BYTES }, () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return (mixed ^ (mixed >>> 14)) & 0xff;
  });
}

const codes = Array.from({ length: 200 }, (_, seed) => makeLabelCode(seededBytes(seed)));

describe('check character', () => {
  // Published examples of ISO/IEC 7064 MOD 37,36 in use (the standard itself is not freely readable):
  it.each([
    ['A12425GABC1234002', 'M'], // IFPI, Global Release Identifier (GRid) Standard 2.1: A1-2425G-ABC1234002-M
    ['779185342C2390308610', '5'], // EIDR, ID format: 10.5240/7791-8534-2C23-9030-8610-5 (from memory)
    ['EA7379D71B2BB3783A73', 'M'], // EIDR, registry: 10.5240/EA73-79D7-1B2B-B378-3A73-M (from memory)
  ])('agrees with the published identifier %s-%s', (body, check) => {
    expect(checkCharacter(body)).toBe(check);
  });
});

describe('a label code', () => {
  it('has twelve characters of the alphabet and passes its own check', () => {
    for (const code of codes) {
      expect(code).toHaveLength(LABEL_CODE_LENGTH);
      expect(Array.from(code).every((character) => LABEL_ALPHABET.includes(character))).toBe(true);
      expect(parseLabelCode(code)).toEqual({ code });
    }
  });

  it('leaves out the characters people confuse on paper', () => {
    for (const character of '0O1ILU') expect(LABEL_ALPHABET).not.toContain(character);
  });

  it('is different for different random bytes', () => {
    expect(new Set(codes).size).toBe(codes.length);
    expect(makeLabelCode(randomBytes(LABEL_RANDOM_BYTES))).not.toBe(makeLabelCode(randomBytes(LABEL_RANDOM_BYTES)));
  });

  it('uses every character of the alphabet about equally in its body', () => {
    const counts = new Map<string, number>();
    for (let seed = 0; seed < 3000; seed += 1) {
      for (const character of makeLabelCode(seededBytes(seed)).slice(0, 11)) counts.set(character, (counts.get(character) ?? 0) + 1);
    }
    // 33,000 draws, 1100 expected each; rejection of weak codes tilts it by a percent or two.
    for (const character of LABEL_ALPHABET) {
      expect(counts.get(character)).toBeGreaterThan(900);
      expect(counts.get(character)).toBeLessThan(1300);
    }
  });

  it('catches every single wrong character', () => {
    const missed: string[] = [];
    for (const code of codes) {
      for (let at = 0; at < code.length; at += 1) {
        for (const wrong of LABEL_ALPHABET) {
          if (wrong === code.charAt(at)) continue;
          const text = code.slice(0, at) + wrong + code.slice(at + 1);
          if ('code' in parseLabelCode(text)) missed.push(text);
        }
      }
    }
    expect(missed).toEqual([]);
  });

  it('catches every swap of two neighbours, which MOD 37,36 alone does not', () => {
    for (const code of codes) {
      for (let at = 0; at + 1 < code.length; at += 1) {
        if (code.charAt(at) === code.charAt(at + 1)) continue;
        const swapped = code.slice(0, at) + code.charAt(at + 1) + code.charAt(at) + code.slice(at + 2);
        expect(parseLabelCode(swapped)).toEqual({ reason: 'check_failed' });
      }
    }
    // The recursion doubles modulo 37 after summing modulo 36; sums 18 and 19 then differ by exactly the swap.
    // I and J have the values 18 and 19, so at the start of a code they change places unseen.
    expect(checkCharacter('IJ')).toBe(checkCharacter('JI'));
  });

  it('refuses to be made from too few random bytes', () => {
    expect(() => makeLabelCode(new Uint8Array(12))).toThrow(RangeError);
    expect(() => makeLabelCode(new Uint8Array(LABEL_RANDOM_BYTES).fill(255))).toThrow(/used up/);
  });
});

describe('reading a code', () => {
  const code = codes[0] ?? '';
  const grouped = groupLabelCode(code);

  it.each([
    ['small letters', code.toLowerCase()],
    ['groups with dashes', grouped],
    ['groups with en dashes', grouped.replace(/-/g, '–')],
    ['spaces around and between', `  ${grouped.replace(/-/g, ' ')} `],
    ['a link', `https://school.example/l/${code}`],
    ['a link in capitals', `HTTPS://SCHOOL.EXAMPLE/L/${code}`],
    ['a link with a last slash and a query', `http://localhost:8080/l/${code}/?from=scan#x`],
    ['a link under a folder', `https://school.example/trayward/l/${grouped}`],
    ['a link with encoded spaces', `https://school.example/l/${grouped.replace(/-/g, '%20')}`],
    ['a hand scanner that ends with Enter', `${code}\r\n`],
    ['a hand scanner that ends with Tab', `https://school.example/l/${code}\t`],
    ['a hand scanner that sends the symbology first', `]Q1https://school.example/l/${code}`],
    ['an invisible mark from a copied page', `\u200b${code}\ufeff`],
  ])('accepts %s', (_, text) => {
    expect(parseLabelCode(text)).toEqual({ code });
  });

  it.each([
    ['empty', ''],
    ['empty', ' \r\n'],
    ['empty', 'https://school.example/l/'],
    ['wrong_length', code.slice(0, 11)],
    ['wrong_length', `${code}2`],
    ['bad_character', `${code.slice(0, 11)}O`],
    ['bad_character', 'https://elsewhere.example/a/page'],
    ['bad_character', `${code.slice(0, 11)}é`],
  ] as const)('says %s for %j', (reason, text) => {
    expect(parseLabelCode(text)).toEqual({ reason });
  });

  it('stays quick and calm with a megabyte of nonsense', () => {
    expect(parseLabelCode('A'.repeat(1_000_000))).toEqual({ reason: 'wrong_length' });
  });
});

describe('writing a code', () => {
  it('groups by four', () => {
    expect(groupLabelCode('ABCDEFGHJKMN')).toBe('ABCD-EFGH-JKMN');
  });

  it('joins the origin and the code with one slash', () => {
    expect(labelUrl('https://school.example/', 'X')).toBe('https://school.example/l/X');
    expect(labelUrl('https://school.example', 'X')).toBe('https://school.example/l/X');
  });
});
