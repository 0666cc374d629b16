import type { EntityManager } from 'typeorm';
import type { SchoolActor } from '@/server/database/school';
import { createInstrument } from '@/server/features/instruments/instruments.service';
import { Kit } from '@/server/features/kits/kit.entity';
import { createKit } from '@/server/features/kits/kits.service';
import { issueLabels } from '@/server/features/labels/issue.service';
import { addIntakeReadings } from '@/server/features/stones/intake.service';
import { createStone } from '@/server/features/stones/stones.service';
import { intakeEntries, type DemoInstruments } from './demoReadings';
import type { KitTruth, StoneTruth } from './truth';

/** The first day of the demo's story: fixed, so that every start of the demo looks alike. */
const firstDay = Date.UTC(2025, 8, 8, 8, 0);
const minuteMs = 60_000;

/** Fills a school's catalogue in the caller's transaction, through the same services as the screens. Does nothing where it holds a kit. */
export async function seedCatalogue(tx: EntityManager, people: { admin: SchoolActor; reader: SchoolActor }, kits: readonly KitTruth[]): Promise<void> {
  if (await tx.existsBy(Kit, {})) return;
  const instruments = await seedInstruments(tx, people.admin);
  for (const [index, kit] of kits.entries()) {
    const day = new Date(firstDay + index * 24 * 60 * minuteMs);
    await seedKit(tx, people, { kit, instruments, day, seed: (index + 1) * 100 });
  }
}

async function seedInstruments(tx: EntityManager, admin: SchoolActor): Promise<DemoInstruments> {
  const balance = await createInstrument(tx, admin, { kind: 'balance', name: 'Bench balance', resolution: 0.01, standardUncertainty: 0.006 });
  const caliper = await createInstrument(tx, admin, { kind: 'caliper', name: 'Digital calipers', resolution: 0.01, standardUncertainty: 0.014 });
  const refractometer = await createInstrument(tx, admin, {
    kind: 'refractometer', name: 'Refractometer 1.81', resolution: 0.001, standardUncertainty: 0.0015, spotUncertainty: 0.006, liquidLimitRi: 1.81 });
  const polariscope = await createInstrument(tx, admin, { kind: 'polariscope', name: 'Polariscope with conoscope' });
  await createInstrument(tx, admin, { kind: 'uv_lamp', name: 'UV lamp, long and short wave' });
  await createInstrument(tx, admin, { kind: 'thermometer', name: 'Water thermometer', resolution: 0.1, standardUncertainty: 0.2 });
  return { balance: balance.id, caliper: caliper.id, refractometer: refractometer.id, polariscope: polariscope.id };
}

interface KitPlan { readonly kit: KitTruth; readonly instruments: DemoInstruments; readonly day: Date; readonly seed: number }

async function seedKit(tx: EntityManager, { admin, reader }: { admin: SchoolActor; reader: SchoolActor }, plan: KitPlan): Promise<void> {
  const { kit, instruments, day, seed } = plan;
  const later = (minutes: number): Date => new Date(day.getTime() + minutes * minuteMs);
  const { id: kitId } = await createKit(tx, admin, { number: kit.number, title: kit.title, neutralTitle: kit.neutralTitle }, day);
  for (const [index, truth] of kit.stones.entries()) {
    const slot = String.fromCharCode(65 + index);
    const stone = await createStone(tx, admin, kitId, { slot, ...details(truth) }, later(1 + index));
    await addIntakeReadings(tx, reader, stone.id, intakeEntries(truth, instruments, seed + index), later(60 + 20 * index));
  }
  await issueLabels(tx, admin, { kitId }, later(300));
}

function details({ species, colour, shape, nominalSize, neutralDescription, valueMinor, marks, source }: StoneTruth) {
  return { species, colour, shape, nominalSize, neutralDescription, replacementValueMinor: valueMinor, marks: marks ?? '', source: source ?? '' };
}
