import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import type { InstrumentChange, InstrumentView, NewInstrumentRequest } from '@shared/api/instruments';
import type { SchoolActor } from '@/server/database/school';
import { invalid, notFound, refused } from '@/server/http/problem';
import { Instrument } from './instrument.entity';
import { instrumentFaults } from './instrumentRules';

/** Every instrument of the school, those in use first, then by kind and name. */
export async function listInstruments(tx: EntityManager): Promise<InstrumentView[]> {
  const rows = await tx.find(Instrument, { order: { kind: 'ASC', name: 'ASC' } });
  return [...rows.filter((row) => row.retiredAt === null), ...rows.filter((row) => row.retiredAt !== null)].map(toView);
}

/** Throws `Invalid` naming the field for a figure the kind needs, lacks or cannot have. */
export async function createInstrument(tx: EntityManager, actor: SchoolActor, request: NewInstrumentRequest): Promise<InstrumentView> {
  const { kind, resolution = null, standardUncertainty = null, spotUncertainty = null, liquidLimitRi = null } = request;
  const numbers = { resolution, standardUncertainty, spotUncertainty, liquidLimitRi };
  refuseFaults(instrumentFaults(kind, numbers));
  const name = request.name.trim();
  await refuseTakenName(tx, name);
  const row = tx.create(Instrument, { id: randomUUID(), schoolId: actor.schoolId, kind, name, ...numbers, retiredAt: null, version: 1 });
  await tx.insert(Instrument, row);
  return toView(row);
}

/** Changes what the request names; readings already taken keep the uncertainty they were taken with. */
export async function changeInstrument(tx: EntityManager, instrumentId: string, change: InstrumentChange, now: Date): Promise<InstrumentView> {
  const before = await tx.findOneBy(Instrument, { id: instrumentId });
  if (before === null) throw notFound('That instrument is not in the register. Go back to the list.', 'instrument_not_found');
  const { version, retired, name, ...changed } = change;
  const numbers = { resolution: before.resolution, standardUncertainty: before.standardUncertainty, spotUncertainty: before.spotUncertainty, liquidLimitRi: before.liquidLimitRi, ...withoutUndefined(changed) };
  refuseFaults(instrumentFaults(before.kind, numbers));
  const newName = name?.trim() ?? before.name;
  if (newName !== before.name) await refuseTakenName(tx, newName);
  const retiredAt = retired === undefined ? before.retiredAt : retired ? (before.retiredAt ?? now) : null;
  const after = { ...numbers, name: newName, retiredAt, version: version + 1 };
  const { affected } = await tx.update(Instrument, { id: instrumentId, version }, after);
  if (affected !== 1) throw refused('changed_meanwhile', 'Somebody else changed this instrument meanwhile. Reload it and make the change again.');
  return toView(Object.assign(before, after));
}

function refuseFaults(faults: ReturnType<typeof instrumentFaults>): void {
  if (faults.length > 0) throw invalid(faults);
}

async function refuseTakenName(tx: EntityManager, name: string): Promise<void> {
  if (name === '') throw invalid('name', 'Give it a name.');
  if (await tx.existsBy(Instrument, { name })) throw invalid('name', 'Another instrument has this name. Choose one that tells them apart.', 'name_taken');
}

function withoutUndefined<T extends object>(values: T): { [K in keyof T]: Exclude<T[K], undefined> } {
  return Object.fromEntries(Object.entries(values).filter(([, value]) => value !== undefined)) as { [K in keyof T]: Exclude<T[K], undefined> };
}

function toView(row: Instrument): InstrumentView {
  const { id, kind, name, resolution, standardUncertainty, spotUncertainty, liquidLimitRi, version } = row;
  return { id, kind, name, resolution, standardUncertainty, spotUncertainty, liquidLimitRi, retired: row.retiredAt !== null, version };
}
