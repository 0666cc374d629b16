import type { EntityManager } from 'typeorm';
import type { LabelRef, StoneRow, StoneView } from '@shared/api/kits';
import { speciesById } from '@shared/gem';
import { moneyRules, validLabelsOf } from '@/server/features/kits/kits.queries';
import { Kit } from '@/server/features/kits/kit.entity';
import { photosOf } from '@/server/features/photos/photo.queries';
import { intakeReadingViews } from './readingViews';
import { recordsOf, type StoneRecord } from './record';
import type { Stone } from './stone.entity';

/** A stone as its kit's page shows it. */
export function stoneRow(stone: Stone, record: StoneRecord | undefined, label: LabelRef | null): StoneRow {
  const { id, slot, species, neutralDescription, standing } = stone;
  return {
    id, slot, species, neutralDescription, standing, label,
    speciesName: speciesById(species).name,
    gaps: record?.gaps ?? [],
    values: record?.values ?? [],
  };
}

/** The whole stone for staff who are not blind to its kit: record, readings with strikes visible, photos. */
export async function stoneView(tx: EntityManager, stone: Stone): Promise<StoneView> {
  const kit = await tx.findOneByOrFail(Kit, { id: stone.kitId });
  const record = (await recordsOf(tx, [stone])).get(stone.id);
  const label = (await validLabelsOf(tx, stone.kitId)).get(stone.id) ?? null;
  const { currency } = await moneyRules(tx);
  const { kitId, colour, shape, nominalSize, marks, source, replacementValueMinor, flags, version } = stone;
  return {
    ...stoneRow(stone, record, label),
    kitId, colour, shape, nominalSize, marks, source, replacementValueMinor, currency, flags, version,
    kitNumber: kit.number,
    readings: await intakeReadingViews(tx, stone.id),
    photos: await photosOf(tx, stone.id),
  };
}
