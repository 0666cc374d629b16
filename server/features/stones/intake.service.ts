import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { ReadingEntry, StoneView } from '@shared/api/kits';
import type { SchoolActor } from '@/server/database/school';
import { refuseBlind } from '@/server/features/bench/blindness';
import { recordCustody } from '@/server/features/custody/custody.service';
import { lockKit } from '@/server/features/kits/standing';
import { invalid, notFound, refused } from '@/server/http/problem';
import { Reading } from './reading.entity';
import { prepareReadings } from './readingEntry';
import { ReadingStrike } from './readingStrike.entity';
import { refuseOpenLoan } from './stones.service';
import { findStone } from './stones.queries';
import { stoneView } from './stoneViews';

/** Adds readings to a stone's record; repeats add and never replace. Not while somebody has the kit. */
export async function addIntakeReadings(
  tx: EntityManager, actor: SchoolActor, stoneId: string, entries: readonly ReadingEntry[], takenAt: Date,
): Promise<StoneView> {
  const { schoolId, accountId } = actor;
  const stone = await findStone(tx, stoneId);
  await refuseBlind(tx, accountId, stone.kitId);
  await lockKit(tx, stone.kitId);
  await refuseOpenLoan(tx, stone.kitId);
  if (stone.standing === 'retired') throw refused('stone_retired', `Stone ${stone.slot} is retired. Its record stays as it is.`);
  const columns = await prepareReadings(tx, entries);
  await tx.insert(Reading, columns.map((row, position) => ({
    ...row, id: randomUUID(), schoolId, stoneId, purpose: 'intake' as const, readerId: accountId, observer: 'instructor' as const, takenAt, position,
  })));
  await recordCustody(tx, { schoolId, kitId: stone.kitId, stoneId, kind: 'intake_read', actorId: accountId, at: takenAt });
  return stoneView(tx, stone);
}

/** Strikes an intake reading with a reason. It stays in the list, marked, and no longer counts; it cannot be struck twice. */
export async function strikeReading(tx: EntityManager, actor: SchoolActor, readingId: string, reason: string, now: Date): Promise<StoneView> {
  const { schoolId, accountId } = actor;
  const because = reason.trim();
  if (because.length < 3) throw invalid('reason', 'Say in a few words why this reading was a slip.');
  const reading = await tx.findOneBy(Reading, { id: readingId, purpose: 'intake' });
  if (reading === null) throw notFound('That reading is not in any record of this school. Go back to its stone.', 'reading_not_found');
  const stone = await findStone(tx, reading.stoneId);
  await refuseBlind(tx, accountId, stone.kitId);
  await lockKit(tx, stone.kitId);
  await refuseOpenLoan(tx, stone.kitId);
  if (await tx.existsBy(ReadingStrike, { readingId })) throw refused('struck_already', 'This reading is struck already. Reload the stone to see why.');
  await tx.insert(ReadingStrike, { readingId, schoolId, struckBy: accountId, reason: because, struckAt: now });
  await recordCustody(tx, { schoolId, kitId: stone.kitId, stoneId: stone.id, kind: 'reading_struck', actorId: accountId, at: now, detail: { reason: because } });
  return stoneView(tx, stone);
}
