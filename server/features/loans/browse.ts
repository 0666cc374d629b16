import type { EntityManager } from 'typeorm';
import { recordsOf } from '@/server/features/stones/record';
import { Stone } from '@/server/features/stones/stone.entity';
import { cursorValues, pageOf, rowsToAsk, type PageQuery } from '@/server/http/paging';
import type { Page } from '@shared/api/common';
import type { BrowseKit } from '@shared/api/loans';
import { depositMinor, dueAt } from '@shared/lending';
import { lendingRules } from './lendingRules';

interface Row {
  id: string;
  number: string;
  neutralTitle: string;
  available: boolean;
}

/**
 * Kits that the school lends, by number, under their neutral titles: whether each can be taken now, for which deposit and
 * until when. Kits whose record is not complete are left out, as those set aside are.
 */
export async function browseKits(tx: EntityManager, query: PageQuery, now: Date): Promise<Page<BrowseKit>> {
  const after = cursorValues(query, 1)?.[0] ?? '';
  const rows: Row[] = await tx.query(
    `SELECT k.id, k.number, k.neutral_title AS "neutralTitle",
            NOT EXISTS (SELECT 1 FROM loan l WHERE l.kit_id = k.id AND l.state NOT IN ('settled', 'cancelled')) AS available
       FROM kit k
      WHERE k.standing = 'lendable' AND k.number > $1
        AND EXISTS (SELECT 1 FROM stone s WHERE s.kit_id = k.id AND s.standing = 'in_kit')
        AND NOT EXISTS (SELECT 1 FROM stone s WHERE s.kit_id = k.id AND s.standing NOT IN ('in_kit', 'retired'))
      ORDER BY k.number LIMIT $2`,
    [after, rowsToAsk(query)],
  );
  const stones = await stonesOf(tx, rows);
  const records = await recordsOf(tx, [...stones.values()].flat());
  const rules = await lendingRules(tx);
  const isComplete = (kitId: string): boolean => (stones.get(kitId) ?? []).every((stone) => records.get(stone.id)?.gaps.length === 0);
  const page = pageOf(query, rows, (row) => [row.number], (row) => row);
  return {
    nextCursor: page.nextCursor,
    items: page.items.filter((row) => isComplete(row.id)).map((row) => {
      const inKit = stones.get(row.id) ?? [];
      const valueMinor = inKit.reduce((sum, stone) => sum + stone.replacementValueMinor, 0);
      return {
        ...row,
        stoneCount: inKit.length,
        depositMinor: depositMinor(rules.depositRule, valueMinor),
        currency: rules.currency,
        dueAtIfTakenNow: dueAt(now, rules.loanDays, rules).toISOString(),
      };
    }),
  };
}

async function stonesOf(tx: EntityManager, kits: readonly Row[]): Promise<Map<string, Stone[]>> {
  const byKit = new Map<string, Stone[]>(kits.map((kit) => [kit.id, []]));
  if (kits.length === 0) return byKit;
  const stones = await tx.createQueryBuilder(Stone, 'stone')
    .where("stone.kitId = ANY (:kitIds) AND stone.standing = 'in_kit'", { kitIds: kits.map((kit) => kit.id) })
    .getMany();
  for (const stone of stones) byKit.get(stone.kitId)?.push(stone);
  return byKit;
}
