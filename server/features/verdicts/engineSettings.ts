import type { EntityManager } from 'typeorm';
import { DEFAULT_SETTINGS, type EngineSettings } from '@shared/evidence';

/** Settings already put together, by what the school chose: the engine keeps what it derives beside the object it was given. */
const known = new Map<string, EngineSettings>([['{}', DEFAULT_SETTINGS]]);
const mostKnown = 200;

/** The engine's settings of the school of this unit of work: its own choices, by section, over the stated defaults. */
export async function schoolEngineSettings(tx: EntityManager): Promise<EngineSettings> {
  const [row] = await tx.query<{ own: Partial<EngineSettings> }[]>('SELECT engine_settings AS own FROM school WHERE id = current_school()');
  const key = JSON.stringify(row?.own ?? {});
  const found = known.get(key);
  if (found !== undefined) return found;
  const settings = { ...DEFAULT_SETTINGS, ...row?.own, version: DEFAULT_SETTINGS.version };
  if (known.size >= mostKnown) known.clear();
  known.set(key, settings);
  return settings;
}
