import type { EntityManager } from 'typeorm';
import { recordCustody } from '@/server/features/custody/custody.service';

interface Change {
  kitId: string;
  schoolId: string;
  reason: string;
  /** Null for the system. */
  actorId: string | null;
  loanId?: string;
  now: Date;
}

/** Takes a kit out of lending until people decide. A kit that is set aside or retired already stays as it is. */
export async function setKitAside(tx: EntityManager, change: Change): Promise<void> {
  if (await move(tx, change, { from: 'lendable', to: 'set_aside', reason: change.reason })) await trace(tx, change, 'kit_set_aside');
}

/** Puts a kit that was set aside back into lending; one that was never set aside, or is retired, stays as it is. */
export async function backOnShelf(tx: EntityManager, change: Change): Promise<void> {
  if (await move(tx, change, { from: 'set_aside', to: 'lendable', reason: '' })) await trace(tx, change, 'kit_lendable');
}

async function move(tx: EntityManager, { kitId }: Change, step: { from: string; to: string; reason: string }): Promise<boolean> {
  const [, changed] = await tx.query<[unknown[], number]>(
    'UPDATE kit SET standing = $3, standing_reason = $4, version = version + 1 WHERE id = $1 AND standing = $2',
    [kitId, step.from, step.to, step.reason],
  );
  return changed === 1;
}

function trace(tx: EntityManager, change: Change, kind: 'kit_set_aside' | 'kit_lendable'): Promise<void> {
  const { schoolId, kitId, actorId, now, reason } = change;
  return recordCustody(tx, { schoolId, kitId, loanId: change.loanId ?? null, kind, actorId, at: now, detail: { reason } });
}
