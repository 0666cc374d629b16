import type { EntityManager } from 'typeorm';
import type { KitStanding } from '@shared/api/kits';
import { recordCustody } from '@/server/features/custody/custody.service';
import { notFound } from '@/server/http/problem';
import { Kit } from './kit.entity';

export interface StandingChange {
  readonly schoolId: string;
  readonly kitId: string;
  readonly reason: string;
  /** Null for the system. */
  readonly actorId: string | null;
  readonly loanId?: string;
  readonly now: Date;
}

/** Takes the kit out of lending until people decide. Does nothing more where it is set aside already. */
export function setKitAside(tx: EntityManager, change: StandingChange): Promise<void> {
  return moveStanding(tx, change, 'set_aside');
}

/** Lends the kit again after a check. Does nothing where it was never taken out of lending; a retired kit stays retired. */
export function backOnShelf(tx: EntityManager, change: StandingChange): Promise<void> {
  return moveStanding(tx, change, 'lendable');
}

const custodyKinds = { set_aside: 'kit_set_aside', lendable: 'kit_lendable', retired: 'kit_retired' } as const satisfies Record<KitStanding, string>;

async function moveStanding(tx: EntityManager, change: StandingChange, to: 'set_aside' | 'lendable'): Promise<void> {
  const kit = await lockKit(tx, change.kitId);
  if (kit.standing === to || kit.standing === 'retired') return;
  await tx.update(Kit, { id: kit.id }, { standing: to, standingReason: to === 'lendable' ? '' : change.reason, version: kit.version + 1 });
  await standingEvent(tx, change, to);
}

/** Locks the kit's row: two changes of one kit come after one another. Throws `NotFound`. */
export async function lockKit(tx: EntityManager, kitId: string): Promise<Kit> {
  const kit = await tx.findOne(Kit, { where: { id: kitId }, lock: { mode: 'pessimistic_write' } });
  if (kit === null) throw notFound('That kit is not in this school. Go back to the list of kits.', 'kit_not_found');
  return kit;
}

export function standingEvent(tx: EntityManager, change: StandingChange, to: KitStanding): Promise<void> {
  const { schoolId, kitId, actorId, loanId, reason, now } = change;
  return recordCustody(tx, { schoolId, kitId, loanId: loanId ?? null, actorId, kind: custodyKinds[to], at: now, detail: { reason } });
}
