import type { EntityManager } from 'typeorm';
import { recordsOf, type StoneRecord } from '@/server/features/stones/record';
import { stonesOfKits } from '@/server/features/stones/stones.queries';
import type { Stone } from '@/server/features/stones/stone.entity';
import { Kit } from './kit.entity';

export interface Lendability {
  readonly lendable: boolean;
  /** In words, each ending with what to do about it; empty when the kit can go out. Staff only: they may name a stone's readings. */
  readonly reasons: string[];
}

/**
 * Whether a kit may go out: its standing allows it, it has stones, every one is in its jar and its record is complete
 * enough for a verdict. Whether somebody has it already is the loan's question, not asked here.
 */
export async function lendability(tx: EntityManager, kitId: string): Promise<Lendability> {
  const kit = await tx.findOneBy(Kit, { id: kitId });
  if (kit === null) return { lendable: false, reasons: ['This kit is not in the catalogue.'] };
  const stones = await stonesOfKits(tx, [kitId]);
  const records = await recordsOf(tx, stones);
  const reasons = [...standingReasons(kit), ...kitGaps(stones, records)];
  return { lendable: reasons.length === 0, reasons };
}

function standingReasons({ standing, number }: Kit): string[] {
  if (standing === 'set_aside') return [`Kit ${number} is set aside. Decide about it first, then lend it again.`];
  return standing === 'retired' ? [`Kit ${number} is retired.`] : [];
}

const awayWords = { missing: 'is missing', damaged: 'is damaged', different: 'was found to be another stone', retired: 'is retired' } as const;

/** What a kit lacks before it can go out, whatever its standing; `stones` are those not retired. */
export function kitGaps(stones: readonly Stone[], records: ReadonlyMap<string, StoneRecord>): string[] {
  if (stones.length === 0) return ['The kit has no stones yet. Add the first one.'];
  return stones.flatMap(({ id, slot, standing }) => {
    const away = standing === 'in_kit' ? [] : [`Stone ${slot} ${awayWords[standing]}. Repair or replace it, or retire it.`];
    return [...away, ...(records.get(id)?.gaps ?? []).map((gap) => `Stone ${slot}: ${gap.message}`)];
  });
}
