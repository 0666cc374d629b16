import { randomBytes, randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { IssuedLabels, IssueLabelsRequest } from '@shared/api/labels';
import { LABEL_RANDOM_BYTES, makeLabelCode } from '@shared/codes';
import type { SchoolActor } from '@/server/database/school';
import { recordCustody, type NewCustodyEvent } from '@/server/features/custody/custody.service';
import { lockKit } from '@/server/features/kits/standing';
import type { Stone } from '@/server/features/stones/stone.entity';
import { stonesOfKits } from '@/server/features/stones/stones.queries';
import { invalid, refused } from '@/server/http/problem';
import { Label } from './label.entity';

/** What gets a label: the kit itself (null) or a jar. */
type Target = Stone | null;

/**
 * New random codes for a kit and its jars (or those named); the earlier label of each becomes void at once, so that a lost
 * sheet opens nothing. Throws `Refused` for a retired kit, `Invalid` for a jar that is not the kit's.
 */
export async function issueLabels(tx: EntityManager, actor: SchoolActor, request: IssueLabelsRequest, now: Date): Promise<IssuedLabels> {
  const kit = await lockKit(tx, request.kitId);
  if (kit.standing === 'retired') throw refused('kit_retired', `Kit ${kit.number} is retired and needs no labels. Pick another kit.`);
  const targets = chosen(request, await stonesOfKits(tx, [kit.id]));
  let voidedCount = 0;
  const rows: Label[] = [];
  for (const target of targets) {
    if (await voidLabel(tx, actor, { kitId: kit.id, stoneId: target?.id ?? null }, now)) voidedCount += 1;
    const code = makeLabelCode(randomBytes(LABEL_RANDOM_BYTES));
    rows.push(tx.create(Label, { id: randomUUID(), schoolId: actor.schoolId, code, kitId: kit.id, stoneId: target?.id ?? null, issuedBy: actor.accountId, issuedAt: now, voidedAt: null }));
  }
  await tx.insert(Label, rows);
  await recordCustody(tx, ...rows.map((row) => labelEvent(actor, row, 'label_issued', now)));
  const slots = new Map(targets.map((target) => [target?.id ?? null, target?.slot ?? null]));
  return { voidedCount, labels: rows.map(({ id, code, stoneId }) => ({ id, code, kitNumber: kit.number, slot: slots.get(stoneId) ?? null })) };
}

function chosen({ stoneIds, includeKit }: IssueLabelsRequest, stones: readonly Stone[]): Target[] {
  const wanted = stoneIds?.map((id) => id.toLowerCase());
  const known = new Set(stones.map(({ id }) => id));
  const strange = (wanted ?? []).flatMap((id, index) =>
    (known.has(id) ? [] : [{ field: `stoneIds[${index}]`, message: 'This jar is not in the kit, or its stone is retired. Pick one of the kit’s jars.' }]));
  if (strange.length > 0) throw invalid(strange);
  const jars = wanted === undefined ? [...stones] : stones.filter(({ id }) => wanted.includes(id));
  const withKit = includeKit ?? wanted === undefined;
  if (jars.length === 0 && !withKit) throw invalid('stoneIds', 'Name a jar, or include the kit itself.');
  return withKit ? [null, ...jars] : jars;
}

/** Voids the valid label of a kit (`stoneId` null) or jar; false where it has none. */
export async function voidLabel(tx: EntityManager, actor: SchoolActor, of: { kitId: string; stoneId: string | null }, now: Date): Promise<boolean> {
  const update = tx.createQueryBuilder().update(Label).set({ voidedAt: now }).where('kit_id = :kitId AND voided_at IS NULL', { kitId: of.kitId });
  const { affected } = await (of.stoneId === null ? update.andWhere('stone_id IS NULL') : update.andWhere('stone_id = :stoneId', { stoneId: of.stoneId })).execute();
  if (affected === 0) return false;
  await recordCustody(tx, labelEvent(actor, of, 'label_voided', now));
  return true;
}

function labelEvent(actor: SchoolActor, of: { kitId: string; stoneId: string | null }, kind: 'label_issued' | 'label_voided', at: Date): NewCustodyEvent {
  return { schoolId: actor.schoolId, kitId: of.kitId, stoneId: of.stoneId, kind, actorId: actor.accountId, at };
}
