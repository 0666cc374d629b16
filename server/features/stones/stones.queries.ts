import type { EntityManager } from 'typeorm';
import { In, Not } from 'typeorm';
import { notFound } from '@/server/http/problem';
import { Stone } from './stone.entity';

/** The stones of these kits that are not retired, by slot. */
export async function stonesOfKits(tx: EntityManager, kitIds: readonly string[]): Promise<Stone[]> {
  if (kitIds.length === 0) return [];
  return tx.find(Stone, { where: { kitId: In([...kitIds]), standing: Not('retired') }, order: { slot: 'ASC' } });
}

/** Throws `NotFound` where this school has no such stone. */
export async function findStone(tx: EntityManager, stoneId: string): Promise<Stone> {
  const stone = await tx.findOneBy(Stone, { id: stoneId });
  if (stone === null) throw notFound('That stone is not in this school. Go back to its kit.', 'stone_not_found');
  return stone;
}
