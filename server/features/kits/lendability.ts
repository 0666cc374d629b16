import type { EntityManager } from 'typeorm';
import { recordsOf } from '@/server/features/stones/record';
import { Stone } from '@/server/features/stones/stone.entity';
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
  const [kit, stones] = [await tx.findOneBy(Kit, { id: kitId }), await stonesInUse(tx, kitId)];
  if (kit === null) return { lendable: false, reasons: ['This kit is not in the catalogue.'] };
  const reasons = [...standingReasons(kit), ...stoneReasons(stones)];
  const records = await recordsOf(tx, stones.map(({ id }) => id));
  for (const { id, slot } of stones) {
    for (const gap of records.get(id)?.gaps ?? []) reasons.push(`Stone ${slot}: ${gap.message}`);
  }
  return { lendable: reasons.length === 0, reasons };
}

function stonesInUse(tx: EntityManager, kitId: string): Promise<Stone[]> {
  return tx.createQueryBuilder(Stone, 'stone').where('stone.kitId = :kitId', { kitId }).andWhere("stone.standing <> 'retired'").orderBy('stone.slot').getMany();
}

function standingReasons({ standing, number }: Kit): string[] {
  if (standing === 'set_aside') return [`Kit ${number} is set aside. Decide about it first, then lend it again.`];
  return standing === 'retired' ? [`Kit ${number} is retired.`] : [];
}

const awayWords = { missing: 'is missing', damaged: 'is damaged', different: 'was found to be another stone', retired: 'is retired' } as const;

function stoneReasons(stones: readonly Stone[]): string[] {
  if (stones.length === 0) return ['The kit has no stones yet. Add the first one.'];
  return stones.flatMap(({ slot, standing }) => (standing === 'in_kit' ? [] : [`Stone ${slot} ${awayWords[standing]}. Repair or replace it, or retire it.`]));
}
