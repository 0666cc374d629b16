import type { EntityManager } from 'typeorm';
import { DEFAULT_SETTINGS, type EngineSettings } from '@shared/evidence';

type Fields = Readonly<Record<string, unknown>>;

const merged = new Map<string, EngineSettings>();
const mergedMax = 200;

/** The engine's settings of the school of this unit of work: what it chose itself, laid over the stated defaults. */
export async function schoolEngineSettings(tx: EntityManager): Promise<EngineSettings> {
  const [row] = await tx.query<{ own: Fields }[]>('SELECT engine_settings AS own FROM school WHERE id = current_school()');
  return settingsWith(row?.own ?? {});
}

/**
 * The defaults with a school's own choices in their place, however deep; the version stays the engine's.
 * One object for each set of choices: the engine keeps what it works out from settings by the object.
 */
export function settingsWith(own: Fields): EngineSettings {
  if (Object.keys(own).length === 0) return DEFAULT_SETTINGS;
  const key = JSON.stringify(own);
  const known = merged.get(key);
  if (known !== undefined) return known;
  if (merged.size >= mergedMax) merged.clear();
  // What a school may set is checked where it is stored; here its shape is that of the defaults.
  const settings = { ...(overlay({ ...DEFAULT_SETTINGS }, own) as unknown as EngineSettings), version: DEFAULT_SETTINGS.version };
  merged.set(key, settings);
  return settings;
}

function overlay(base: Fields, own: Fields): Fields {
  const entries = Object.entries(own).map(([name, value]): [string, unknown] => {
    const below = base[name];
    return [name, isFields(below) && isFields(value) ? overlay(below, value) : value];
  });
  return { ...base, ...Object.fromEntries(entries) };
}

function isFields(value: unknown): value is Fields {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
