import type { EntityManager } from 'typeorm';
import type { KitRow } from '@shared/api/kits';
import { kitPlace } from '@shared/lending';
import { blindReason } from '@/server/features/bench/blindness';
import { recordsOf, type StoneRecord } from '@/server/features/stones/record';
import type { Stone } from '@/server/features/stones/stone.entity';
import { stonesOfKits } from '@/server/features/stones/stones.queries';
import type { Kit } from './kit.entity';
import { openLoansOf, type OpenLoan } from './kits.queries';
import { kitGaps } from './lendability';

/** A kit with all that its row is made from. */
export interface KitFacts {
  readonly kit: Kit;
  readonly stones: Stone[];
  readonly records: ReadonlyMap<string, StoneRecord>;
  readonly openLoan: OpenLoan | null;
  readonly row: KitRow;
}

/** The rows of these kits as this account may see them, in the order given. */
export async function kitFacts(tx: EntityManager, accountId: string, kits: readonly Kit[]): Promise<KitFacts[]> {
  const ids = kits.map(({ id }) => id);
  const allStones = await stonesOfKits(tx, ids);
  const records = await recordsOf(tx, allStones);
  const loans = await openLoansOf(tx, ids);
  const facts: KitFacts[] = [];
  for (const kit of kits) {
    const stones = allStones.filter(({ kitId }) => kitId === kit.id);
    const openLoan = loans.get(kit.id) ?? null;
    const blind = openLoan !== null && (await isBlind(tx, accountId, openLoan));
    facts.push({ kit, stones, records, openLoan, row: toRow({ kit, stones, openLoan, blind, gapCount: kitGaps(stones, records).length }) });
  }
  return facts;
}

/** Asked only where it can be: of one's own loans, and of kits that are back. */
async function isBlind(tx: EntityManager, accountId: string, loan: OpenLoan): Promise<boolean> {
  if (loan.borrowerId !== accountId && (loan.state === 'reserved' || loan.state === 'out')) return false;
  return (await blindReason(tx, accountId, loan.kitId)) !== null;
}

function toRow(from: { kit: Kit; stones: readonly Stone[]; openLoan: OpenLoan | null; blind: boolean; gapCount: number }): KitRow {
  const { kit, openLoan, gapCount } = from;
  return {
    id: kit.id,
    number: kit.number,
    title: from.blind ? kit.neutralTitle : kit.title,
    neutralTitle: kit.neutralTitle,
    place: kitPlace({ standing: kit.standing, openLoanState: openLoan?.state ?? null, gapCount }),
    stoneCount: from.stones.length,
    gapCount,
    openLoanId: openLoan?.id ?? null,
    dueAt: openLoan?.dueAt.toISOString() ?? null,
  };
}
