import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { Page } from '@shared/api/common';
import type { KitChange, KitRow, KitStanding, KitView, NewKitRequest } from '@shared/api/kits';
import { depositMinor } from '@shared/lending';
import type { SchoolActor } from '@/server/database/school';
import { refuseBlind } from '@/server/features/bench/blindness';
import { recordCustody } from '@/server/features/custody/custody.service';
import { stoneRow } from '@/server/features/stones/stoneViews';
import { invalid, notFound, refused } from '@/server/http/problem';
import { cursorValues, pageOf, rowsToAsk } from '@/server/http/paging';
import { Kit } from './kit.entity';
import { kitFacts } from './kitRows';
import type { KitListQuery } from './kits.dto';
import { moneyRules, openLoansOf, searchKits, validLabelsOf } from './kits.queries';
import { lockKit, standingEvent } from './standing';

export type KitList = Pick<KitListQuery, 'cursor' | 'limit' | 'q' | 'place'>;

/** One page of the catalogue by kit number. Where a place is asked for, kits are looked through until the page is full. */
export async function listKits(tx: EntityManager, accountId: string, query: KitList): Promise<Page<KitRow>> {
  const { q, place } = query;
  const wanted = rowsToAsk(query);
  const rows: KitRow[] = [];
  let after = cursorValues(query, 1)?.[0];
  for (;;) {
    const kits = await searchKits(tx, { after, q, place, accountId }, wanted);
    const facts = await kitFacts(tx, accountId, kits);
    rows.push(...facts.map(({ row }) => row).filter((row) => place === undefined || row.place === place));
    after = kits.at(-1)?.number;
    if (kits.length < wanted || rows.length >= wanted) return pageOf(query, rows, (row) => [row.number], (row) => row);
  }
}

/** The whole kit for staff. Refused while the asker is blind to it (it is on loan to them, or waits for their own reading). */
export async function getKit(tx: EntityManager, accountId: string, kitId: string): Promise<KitView> {
  const kit = await findKit(tx, kitId);
  await refuseBlind(tx, accountId, kitId);
  const [facts] = await kitFacts(tx, accountId, [kit]);
  if (facts === undefined) throw new Error('A kit that was found has no row.');
  const { stones, records, row } = facts;
  const labels = await validLabelsOf(tx, kitId);
  const { currency, depositRule } = await moneyRules(tx);
  const replacementValueMinor = stones.reduce((sum, stone) => sum + stone.replacementValueMinor, 0);
  return {
    ...row,
    standing: kit.standing,
    standingReason: kit.standingReason,
    version: kit.version,
    stones: stones.map((stone) => stoneRow(stone, records.get(stone.id), labels.get(stone.id) ?? null)),
    label: labels.get(null) ?? null,
    replacementValueMinor,
    depositMinor: depositMinor(depositRule, replacementValueMinor),
    currency,
  };
}

export async function findKit(tx: EntityManager, kitId: string): Promise<Kit> {
  const kit = await tx.findOneBy(Kit, { id: kitId });
  if (kit === null) throw notFound('That kit is not in this school. Go back to the list of kits.', 'kit_not_found');
  return kit;
}

export async function createKit(tx: EntityManager, actor: SchoolActor, request: NewKitRequest, now: Date): Promise<KitView> {
  const { schoolId, accountId } = actor;
  const { number } = request;
  const [title, neutralTitle] = [needed('title', request.title), needed('neutralTitle', request.neutralTitle)];
  if (await tx.existsBy(Kit, { number })) throw invalid('number', `Kit ${number} is in the catalogue already. Choose another number.`, 'number_taken');
  const id = randomUUID();
  await tx.insert(Kit, { id, schoolId, number, title, neutralTitle, createdAt: now });
  await recordCustody(tx, { schoolId, kitId: id, kind: 'kit_catalogued', actorId: accountId, at: now });
  return getKit(tx, accountId, id);
}

/** Changes titles or standing. A standing cannot change while somebody has the kit, and lending it again needs a reason. */
export async function changeKit(tx: EntityManager, actor: SchoolActor, kitId: string, change: KitChange, now: Date): Promise<KitView> {
  const { schoolId, accountId } = actor;
  await findKit(tx, kitId);
  await refuseBlind(tx, accountId, kitId);
  const kit = await lockKit(tx, kitId);
  if (kit.version !== change.version) throw refused('changed_meanwhile', 'Somebody else changed this kit meanwhile. Reload it and make the change again.');
  const standing = change.standing ?? kit.standing;
  const reason = change.standingReason?.trim() ?? '';
  if (standing !== kit.standing) await refuseStanding(tx, kit, standing, reason);
  await tx.update(Kit, { id: kitId }, {
    title: change.title === undefined ? kit.title : needed('title', change.title),
    neutralTitle: change.neutralTitle === undefined ? kit.neutralTitle : needed('neutralTitle', change.neutralTitle),
    standing,
    standingReason: standing === kit.standing ? kit.standingReason : reason,
    version: kit.version + 1,
  });
  if (standing !== kit.standing) await standingEvent(tx, { schoolId, kitId, actorId: accountId, reason, now }, standing);
  if (change.title !== undefined || change.neutralTitle !== undefined) {
    await recordCustody(tx, { schoolId, kitId, kind: 'kit_changed', actorId: accountId, at: now });
  }
  return getKit(tx, accountId, kitId);
}

async function refuseStanding(tx: EntityManager, kit: Kit, to: KitStanding, reason: string): Promise<void> {
  const loan = (await openLoansOf(tx, [kit.id])).get(kit.id);
  if (loan !== undefined) {
    throw refused('kit_has_open_loan', `Kit ${kit.number} has a loan that is not settled yet. Settle it first.`);
  }
  if (to !== 'retired' && reason.length < 3) {
    throw invalid('standingReason', to === 'lendable' ? 'Say why the kit can be lent again.' : 'Say why the kit is set aside.');
  }
}

function needed(field: string, text: string): string {
  const trimmed = text.trim();
  if (trimmed === '') throw invalid(field, 'Write something here.');
  return trimmed;
}
