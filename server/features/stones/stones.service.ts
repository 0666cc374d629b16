import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { NewStoneRequest, StoneChange, StoneView } from '@shared/api/kits';
import type { SchoolActor } from '@/server/database/school';
import { refuseBlind } from '@/server/features/bench/blindness';
import { recordCustody } from '@/server/features/custody/custody.service';
import { openLoansOf } from '@/server/features/kits/kits.queries';
import { lockKit } from '@/server/features/kits/standing';
import { voidLabel } from '@/server/features/labels/issue.service';
import { invalid, refused } from '@/server/http/problem';
import { Stone } from './stone.entity';
import { findStone, stonesOfKits } from './stones.queries';
import { stoneView } from './stoneViews';

/** The whole stone. Refused while the asker is blind to its kit. */
export async function getStone(tx: EntityManager, accountId: string, stoneId: string): Promise<StoneView> {
  const stone = await findStone(tx, stoneId);
  await refuseBlind(tx, accountId, stone.kitId);
  return stoneView(tx, stone);
}

/** Adds a stone to a free slot of a kit that nobody has. */
export async function createStone(tx: EntityManager, actor: SchoolActor, kitId: string, request: NewStoneRequest, now: Date): Promise<StoneView> {
  const { schoolId, accountId } = actor;
  const kit = await lockKit(tx, kitId);
  if (kit.standing === 'retired') throw refused('kit_retired', `Kit ${kit.number} is retired. Add the stone to a kit in use.`);
  await refuseOpenLoan(tx, kitId);
  await refuseTakenSlot(tx, kitId, request.slot);
  const stone = tx.create(Stone, {
    id: randomUUID(), schoolId, kitId,
    slot: request.slot,
    species: request.species,
    colour: request.colour ?? null,
    shape: request.shape,
    nominalSize: request.nominalSize?.trim() ?? '',
    neutralDescription: described(request.neutralDescription),
    marks: request.marks?.trim() ?? '',
    source: request.source?.trim() ?? '',
    replacementValueMinor: request.replacementValueMinor,
    flags: [...new Set(request.flags ?? [])],
    standing: 'in_kit',
    version: 1,
    createdAt: now,
  });
  await tx.insert(Stone, stone);
  await recordCustody(tx, { schoolId, kitId, stoneId: stone.id, kind: 'stone_catalogued', actorId: accountId, at: now });
  return stoneView(tx, stone);
}

/** What a verdict or a loan rests on: it stands still while somebody has the kit. */
const settledByLoan = ['slot', 'species', 'colour', 'shape', 'flags', 'standing'] as const satisfies readonly (keyof StoneChange)[];

/** Changes what the request names. */
export async function changeStone(tx: EntityManager, actor: SchoolActor, stoneId: string, change: StoneChange, now: Date): Promise<StoneView> {
  const found = await findStone(tx, stoneId);
  await refuseBlind(tx, actor.accountId, found.kitId);
  await lockKit(tx, found.kitId);
  const before = await findStone(tx, stoneId);
  if (before.version !== change.version) throw refused('changed_meanwhile', 'Somebody else changed this stone meanwhile. Reload it and make the change again.');
  if (settledByLoan.some((field) => change[field] !== undefined)) await refuseOpenLoan(tx, before.kitId);
  const after = changed(before, change);
  const comesBack = before.standing === 'retired' && after.standing !== 'retired';
  if (after.slot !== before.slot || comesBack) await refuseTakenSlot(tx, before.kitId, after.slot, stoneId);
  const { id: _id, schoolId: _schoolId, kitId: _kitId, createdAt: _createdAt, ...columns } = after;
  const { affected } = await tx.update(Stone, { id: stoneId, version: change.version }, columns);
  if (affected !== 1) throw refused('changed_meanwhile', 'Somebody else changed this stone meanwhile. Reload it and make the change again.');
  const retires = after.standing === 'retired' && before.standing !== 'retired';
  const kind = retires ? 'stone_retired' : 'stone_changed';
  await recordCustody(tx, { schoolId: actor.schoolId, kitId: before.kitId, stoneId, kind, actorId: actor.accountId, at: now });
  if (retires) await voidLabel(tx, actor, { kitId: before.kitId, stoneId }, now);
  return stoneView(tx, after);
}

function changed(before: Stone, change: StoneChange): Stone {
  return Object.assign(new Stone(), before, {
    slot: change.slot ?? before.slot,
    species: change.species ?? before.species,
    colour: change.colour === undefined ? before.colour : change.colour,
    shape: change.shape ?? before.shape,
    nominalSize: change.nominalSize?.trim() ?? before.nominalSize,
    neutralDescription: change.neutralDescription === undefined ? before.neutralDescription : described(change.neutralDescription),
    marks: change.marks?.trim() ?? before.marks,
    source: change.source?.trim() ?? before.source,
    replacementValueMinor: change.replacementValueMinor ?? before.replacementValueMinor,
    flags: change.flags === undefined ? before.flags : [...new Set(change.flags)],
    standing: change.standing ?? before.standing,
    version: before.version + 1,
  } satisfies Partial<Stone>);
}

/** Throws `Refused` while a loan of the kit is not settled: the record it is checked against must not move. */
export async function refuseOpenLoan(tx: EntityManager, kitId: string): Promise<void> {
  if ((await openLoansOf(tx, [kitId])).size === 0) return;
  throw refused('kit_has_open_loan', 'This kit has a loan that is not settled yet, and its record stands still until then. Settle the loan first.');
}

async function refuseTakenSlot(tx: EntityManager, kitId: string, slot: string, except?: string): Promise<void> {
  const taken = (await stonesOfKits(tx, [kitId])).some((stone) => stone.slot === slot && stone.id !== except);
  if (taken) throw invalid('slot', `Slot ${slot} holds a stone already. Choose another letter.`, 'slot_taken');
}

function described(text: string): string {
  const trimmed = text.trim();
  if (trimmed === '') throw invalid('neutralDescription', 'Say what a student sees, without naming the stone: for instance "pale blue oval, 8×6".');
  return trimmed;
}
