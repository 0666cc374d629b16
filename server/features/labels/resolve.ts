import type { EntityManager } from 'typeorm';
import { parseLabelCode, type LabelCodeFault } from '@shared/codes';
import { invalid } from '@/server/http/problem';

/** A label of this school, valid or void. */
export interface FoundLabel {
  readonly id: string;
  readonly code: string;
  readonly kitId: string;
  readonly kitNumber: string;
  readonly stoneId: string | null;
  readonly slot: string | null;
  readonly voidedAt: Date | null;
}

export type ValidLabel = Omit<FoundLabel, 'voidedAt'>;

/** What was scanned or typed, as a label of this school; null where the school has none with this code. */
export async function findLabel(tx: EntityManager, code: string): Promise<FoundLabel | null> {
  const [row] = await tx.query<FoundLabel[]>(
    `SELECT l.id, l.code, l.kit_id AS "kitId", k.number AS "kitNumber", l.stone_id AS "stoneId", s.slot, l.voided_at AS "voidedAt"
       FROM label l JOIN kit k ON k.id = l.kit_id LEFT JOIN stone s ON s.id = l.stone_id
      WHERE l.code = $1`,
    [code],
  );
  return row ?? null;
}

/**
 * Resolves what a camera, a hand scanner or a person gave (the code or the label's whole link) to a valid label of this school.
 * Throws `Invalid` on `field`, in words that say what to do, for a code that cannot be read, is unknown or void.
 */
export async function resolveLabel(tx: EntityManager, text: string, field = 'code'): Promise<ValidLabel> {
  const reading = parseLabelCode(text);
  if ('reason' in reading) throw invalid(field, faultWords[reading.reason], `label_${reading.reason}`);
  const label = await findLabel(tx, reading.code);
  if (label === null) throw invalid(field, 'No label of this school has that code. Check the characters, or scan again.', 'label_unknown');
  if (label.voidedAt !== null) {
    const what = label.slot === null ? `kit ${label.kitNumber}` : `jar ${label.slot} of kit ${label.kitNumber}`;
    throw invalid(field, `This is an old label of ${what}; a newer one was printed. Scan the newer one.`, 'label_void');
  }
  const { voidedAt: _voidedAt, ...valid } = label;
  return valid;
}

/** What to say of a text that is no label code. */
export const faultWords: Readonly<Record<LabelCodeFault, string>> = {
  empty: 'Scan a label or type its code.',
  bad_character: 'That is not a label code: it uses digits 2 to 9 and letters, without I, L, O and U. Check it and try again.',
  wrong_length: 'A label code has 12 characters. Check it and try again.',
  check_failed: 'One character of the code is not right. Check it and try again.',
};
