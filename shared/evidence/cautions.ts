import type { Attribute, Caution, CautionCode, NextReading } from '../api/evidence';
import { caresOf } from '../gem/cares';
import type { Judgement } from './judge';
import { isNumeric, readingScores } from './judge';
import type { PooledReadings } from './likelihood';
import type { PreparedRecord } from './record';

const CONTACT_LIQUID = new Set<Attribute>(['ri_spot', 'ri_low', 'ri_high']);
const ULTRAVIOLET = new Set<Attribute>(['uv_long', 'uv_short']);

/** What the reader should be told: first about the readings, then about the tests proposed, then about handling the stone. */
export function cautionsFor(
  record: PreparedRecord, pooled: PooledReadings, judgement: Judgement, { next, ranked }: { next: readonly NextReading[]; ranked: boolean },
): Caution[] {
  const cautions = [...readingCautions(record, pooled, judgement)];
  if (ranked && judgement.verdict === 'not_settled' && next.length === 0) {
    cautions.push(say('no_reading_left', null, 'No reading is left that could settle this. Two people decide, with a reason.'));
  }
  cautions.push(...testCautions(record, new Set([...pooled.present, ...next.map((reading) => reading.attribute)])));
  return cautions;
}

function readingCautions(record: PreparedRecord, pooled: PooledReadings, judgement: Judgement): Caution[] {
  const cautions: Caution[] = [];
  for (const attribute of judgement.unexplained) {
    const z = isNumeric(attribute) ? readingScores(record, pooled.numbers[attribute] ?? emptyRead(attribute))[0] ?? 0 : 0;
    if (attribute === 'weight_ct' && z < 0) {
      cautions.push(say('loss_unexplained', attribute, 'The stone weighs less than its record. Look for a fresh chip; if there is one, note it, otherwise weigh again.'));
    } else if (attribute === 'weight_ct') {
      cautions.push(say('gain_unexplained', attribute, record.porous
        ? 'The stone weighs more than its record. This one takes up water: let it dry, then weigh again.'
        : 'The stone weighs more than its record. Wipe it clean and dry, then weigh again.'));
    } else {
      cautions.push(say('reading_far_from_record', attribute, 'This reading is far from the record. Take it again from a fresh placement, or strike it with a reason.'));
    }
  }
  for (const attribute of pooled.present) {
    if (isNumeric(attribute) && disagree(pooled.numbers[attribute])) {
      cautions.push(say('readings_disagree', attribute, 'The repeated readings do not agree with each other. Check the instrument and the stone, then take one more.'));
    }
    if (!hasRecord(record, attribute)) {
      cautions.push(say('nothing_recorded', attribute, 'The record does not hold this value, so the reading is compared with the species only.'));
    }
  }
  return cautions;
}

function emptyRead(attribute: Attribute): never {
  throw new Error(`an unexplained attribute has readings: ${attribute}`);
}

function hasRecord(record: PreparedRecord, attribute: Attribute): boolean {
  return isNumeric(attribute) ? record.numbers[attribute] !== undefined || record.limits[attribute] !== undefined : record.categories[attribute] !== undefined;
}

function disagree(read: PooledReadings['numbers'][keyof PooledReadings['numbers']]): boolean {
  if (read === undefined) return false;
  const [first, last] = [read.reads[0], read.reads[read.reads.length - 1]];
  return first !== undefined && last !== undefined && Math.abs(last.value - first.value) > 4 * Math.hypot(first.u, last.u);
}

function testCautions(record: PreparedRecord, tests: ReadonlySet<Attribute>): Caution[] {
  const cares = caresOf(record.model.row, record.stone.flags);
  const cautions: Caution[] = [];
  const liquid = [...tests].find((attribute) => CONTACT_LIQUID.has(attribute));
  if (cares.sparesContactLiquid) {
    cautions.push(say('contact_liquid_harms_stone', 'ri_spot', 'Contact liquid can stain or attack this stone. Do not use the refractometer on it.'));
  } else if (liquid !== undefined) {
    cautions.push(say('contact_liquid_harms_health', liquid, "Contact liquid is toxic: smallest drop, gloves, fresh air, wash your hands. Your lab's own rules come first."));
  }
  const lamp = [...tests].find((attribute) => ULTRAVIOLET.has(attribute));
  if (lamp !== undefined) {
    cautions.push(say('uv_harms_eyes', lamp, "Ultraviolet hurts eyes and skin: closed cabinet, filter goggles, no hands in the beam. Your lab's own rules come first."));
  }
  if (cares.porous) cautions.push(say('no_water', 'sg', 'This stone takes up water. Do not weigh it in water; weigh it dry.'));
  if (cares.fragile) cautions.push(say('fragile', null, 'This stone cleaves or chips easily: no drop, no tweezers at the girdle, no sudden heat.'));
  if (cares.soft) cautions.push(say('soft', null, 'This stone is soft: do not rub it on glass or let it touch other stones.'));
  if (cares.radioactive) cautions.push(say('radioactive', null, 'This stone may be weakly radioactive: fine to handle, wash your hands after, never grind it.'));
  if ((record.stone.flags ?? []).includes('axis_up')) {
    cautions.push(say('axis_up', 'polariscope', 'This stone may stay dark through its dome although it is doubly refractive. Look through its side.'));
  }
  return cautions;
}

function say(code: CautionCode, attribute: Attribute | null, message: string): Caution {
  return { code, attribute, message };
}
