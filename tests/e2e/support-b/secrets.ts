import type { KitView, StoneView } from '@shared/api/kits';
import { SPECIES_IDS, speciesById } from '@shared/gem';
import { ok, type Client } from './loans';

/** What a text gives away, by name; empty for a blind one. */
export type Detector = (text: string) => string[];

const escape = (text: string): string => text.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
const asWord = (text: string): RegExp => new RegExp(`(?<![\\p{L}\\d])${escape(text)}(?![\\p{L}\\d])`, 'iu');

/** Trade words that only a record or an optic figure would bring. */
const recordWords = ['uniaxial', 'biaxial', 'optic figure', 'optic_figure', 'optic_sign', 'polariscope', 'ri_spot', 'ri_low', 'ri_high', 'weight_ct', 'length_mm', 'speciesName', 'specific gravity'];

/**
 * Looks for what must stay hidden of a kit: the name or id of any species, the kit's true title, marks and sources of its
 * stones, attributes of a record, and each recorded number (at two decimals or more; a whole millimetre stands in the neutral description).
 */
export async function detectorFor(admin: Client, kit: KitView): Promise<Detector> {
  const stones = await Promise.all(kit.stones.map(async (stone) => ok(await admin.get<StoneView>(`/stones/${stone.id}`))));
  const species = SPECIES_IDS.flatMap((id) => [id, speciesById(id).name, speciesById(id).name.replace(/\s*\(.*$/, '')]);
  const told = stones.flatMap((stone) => [stone.marks, stone.source]).filter((text) => text !== '');
  const words = [...new Set([...species, kit.title, ...told, ...recordWords])].map((word) => [word, asWord(word)] as const);
  const numbers = [...new Set(stones.flatMap(recordedNumbers))].map((number) => [number, new RegExp(`(?<![\\w.])${escape(number)}`)] as const);
  return (text) => {
    // Times hold seconds that look like readings.
    const plain = text.replace(/\d{4}-\d\d-\d\dT[\d:.]+Z/g, ' ');
    return [...words, ...numbers].filter(([, pattern]) => pattern.test(plain)).map(([what]) => what);
  };
}

function recordedNumbers(stone: StoneView): string[] {
  const recorded = stone.values.flatMap(({ value }) => (typeof value === 'object' && typeof value.value === 'number' ? [value.value.toFixed(2)] : []));
  const taken = stone.readings.flatMap(({ value }) => (typeof value === 'number' ? [String(value)] : []));
  return [...recorded, ...taken].filter((text) => /\.\d\d/.test(text));
}
