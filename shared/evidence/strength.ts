import { CATEGORY_VALUES } from '../api/evidence';
import type { SpeciesRow } from '../gem/speciesRow';
import type { EngineSettings } from './settings';

type StrengthAttribute = 'uv_long' | 'uv_short' | 'pleochroism';

/** A species' words are typical, never proof: this share of its stones shows anything at all. Assumption. */
const UNTYPICAL = 0.3;

/**
 * Shares of strengths that a species' free words allow. "weaker" and "as long" stand for weak to moderate; words that
 * name no strength allow all alike.
 */
export function strengthsOf(row: SpeciesRow, attribute: StrengthAttribute): Readonly<Record<string, number>> {
  const key = `${attribute}|${row.id}`;
  const found = known.get(key) ?? parseStrengths(row, attribute);
  known.set(key, found);
  return found;
}

const known = new Map<string, Readonly<Record<string, number>>>();

function parseStrengths(row: SpeciesRow, attribute: StrengthAttribute): Readonly<Record<string, number>> {
  const scale: readonly string[] = CATEGORY_VALUES[attribute];
  const words = attribute === 'uv_long' ? row.uvLong : attribute === 'uv_short' ? row.uvShort : row.pleochroism;
  const found = scale.map((word, i) => ({ i, at: words.indexOf(word) })).filter(({ at }) => at >= 0).map(({ i }) => i);
  if (words.includes('weaker') || words.includes('as long')) found.push(1, 2);
  // Pleochroism words of the table also say "moderate", which the reading's scale calls distinct.
  if (attribute === 'pleochroism' && words.includes('moderate')) found.push(2);
  const low = found.length === 0 ? 0 : Math.min(...found);
  const high = found.length === 0 ? scale.length - 1 : Math.max(...found);
  const typical = (1 - UNTYPICAL) / (high - low + 1);
  return Object.fromEntries(scale.map((word, i) => [word, UNTYPICAL / scale.length + (i >= low && i <= high ? typical : 0)]));
}

/** Chance of writing down a strength when the stone's own has the given shares: eyes and lamps differ by a step. */
export function strengthChance(settings: EngineSettings, attribute: StrengthAttribute, shares: Readonly<Record<string, number>>, written: string): number {
  const scale: readonly string[] = CATEGORY_VALUES[attribute];
  const at = scale.indexOf(written);
  let sum = 0;
  scale.forEach((word, i) => {
    const share = shares[word] ?? 0;
    if (share === 0) return;
    const { same, near } = settings.strength;
    const neighbours = i === 0 || i === scale.length - 1 ? 1 : 2;
    const others = scale.length - 1 - neighbours;
    sum += share * (i === at ? same : Math.abs(i - at) === 1 ? near / neighbours : (1 - same - near) / others);
  });
  return sum;
}
