import type { EntityManager } from 'typeorm';
import { DEFAULT_SETTINGS, type EngineSettings } from '@shared/evidence';

/** The engine's settings of the school of this unit of work: its own choices, by section, over the stated defaults. */
export async function schoolEngineSettings(tx: EntityManager): Promise<EngineSettings> {
  const [row] = await tx.query<{ own: Partial<EngineSettings> }[]>('SELECT engine_settings AS own FROM school WHERE id = current_school()');
  return { ...DEFAULT_SETTINGS, ...row?.own, version: DEFAULT_SETTINGS.version };
}
