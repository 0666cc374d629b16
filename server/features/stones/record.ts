import type { EntityManager } from 'typeorm';
import { ATTRIBUTES, type RecordedStone, type RecordedValues, type RecordGap } from '@shared/api/evidence';
import type { RecordedValueView } from '@shared/api/kits';
import { estimateRecord, recordGaps } from '@shared/evidence';
import { Reading } from './reading.entity';
import { readingInput } from './readingInput';
import { ReadingStrike } from './readingStrike.entity';
import type { Stone } from './stone.entity';
import { findStone } from './stones.queries';

/** What the school's un-struck intake readings say of one stone. */
export interface StoneRecord {
  readonly stoneId: string;
  /** For the evidence engine. */
  readonly recorded: RecordedStone;
  /** For the screen. */
  readonly values: RecordedValueView[];
  readonly gaps: RecordGap[];
}

/** The record of one stone of this school. Throws `NotFound` where there is none. */
export async function recordOf(tx: EntityManager, stoneId: string): Promise<StoneRecord> {
  const stone = await findStone(tx, stoneId);
  return buildRecord(stone, (await countingIntakeReadings(tx, [stoneId])).get(stoneId) ?? []);
}

/** The records of several stones by stone id, with one query. */
export async function recordsOf(tx: EntityManager, stones: readonly Stone[]): Promise<Map<string, StoneRecord>> {
  const readings = await countingIntakeReadings(tx, stones.map(({ id }) => id));
  return new Map(stones.map((stone) => [stone.id, buildRecord(stone, readings.get(stone.id) ?? [])]));
}

/** The record that follows from these un-struck readings. */
export function buildRecord(stone: Stone, readings: readonly Reading[]): StoneRecord {
  const values = estimateRecord(readings.map(readingInput));
  const recorded: RecordedStone = {
    species: stone.species,
    ...(stone.colour === null ? {} : { colour: stone.colour }),
    shape: stone.shape,
    flags: stone.flags,
    values,
  };
  return { stoneId: stone.id, recorded, values: valueViews(values, readings), gaps: recordGaps(recorded) };
}

async function countingIntakeReadings(tx: EntityManager, stoneIds: readonly string[]): Promise<Map<string, Reading[]>> {
  const byStone = new Map<string, Reading[]>();
  if (stoneIds.length === 0) return byStone;
  const readings = await tx.createQueryBuilder(Reading, 'reading')
    .where("reading.stoneId = ANY (:stoneIds) AND reading.purpose = 'intake'", { stoneIds })
    .andWhere((query) => `NOT EXISTS ${query.subQuery().select('1').from(ReadingStrike, 'strike').where('strike.readingId = reading.id').getQuery()}`)
    .orderBy('reading.takenAt').addOrderBy('reading.position').addOrderBy('reading.id')
    .getMany();
  for (const reading of readings) {
    const list = byStone.get(reading.stoneId);
    if (list === undefined) byStone.set(reading.stoneId, [reading]);
    else list.push(reading);
  }
  return byStone;
}

function valueViews(values: RecordedValues, readings: readonly Reading[]): RecordedValueView[] {
  return ATTRIBUTES.flatMap((attribute) => {
    const value = values[attribute];
    // Weighings arrive here as the SG they give: the record holds no value in another shape.
    if (value === undefined || (typeof value === 'object' && 'airCt' in value)) return [];
    return [{ attribute, value, readingCount: readings.filter((reading) => reading.attribute === attribute).length }];
  });
}
