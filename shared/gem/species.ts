import type { SpeciesSummary } from '../api/evidence';
import { SPECIES_ROWS } from './data/species';
import type { Range, SpeciesRow } from './speciesRow';
import { SPECIES_SOURCE_KINDS } from './speciesRow';

const byId = new Map(SPECIES_ROWS.map((row) => [row.id, row]));

export const SPECIES_IDS: readonly string[] = SPECIES_ROWS.map((row) => row.id);

export function isSpeciesId(id: unknown): id is string {
  return typeof id === 'string' && byId.has(id);
}

export function findSpecies(id: string): SpeciesRow | undefined {
  return byId.get(id);
}

/** The row of a known species. Throws on an unknown id: callers validate first. */
export function speciesById(id: string): SpeciesRow {
  const row = byId.get(id);
  if (row === undefined) throw new RangeError(`no species ${id} in the reference table`);
  return row;
}

/** The ranges of the lowest and the highest index one stone of the species shows (equal ranges where it is isotropic). */
export function indexExtent(row: SpeciesRow): { low: Range; high: Range } {
  const { ri } = row;
  if ('n' in ri) return { low: ri.n, high: ri.n };
  if ('range' in ri) return { low: ri.range, high: ri.range };
  if ('alpha' in ri) return { low: ri.alpha, high: ri.gamma };
  return ri.omega[0] <= ri.epsilon[0] ? { low: ri.omega, high: ri.epsilon } : { low: ri.epsilon, high: ri.omega };
}

/** The largest birefringence the table gives the species; 0 where it is isotropic or not tabulated. */
export function largestBirefringence(row: SpeciesRow): number {
  return row.birefringence?.[1] ?? 0;
}

/** The row as `GET /species` shows it. */
export function summariseSpecies(row: SpeciesRow): SpeciesSummary {
  const extent = indexExtent(row);
  return {
    id: row.id,
    name: row.name,
    group: row.group,
    opticCharacter: row.opticCharacter,
    opticSign: row.opticSign,
    riLow: extent.low[0],
    riHigh: extent.high[1],
    birefringence: row.birefringence === null ? null : [row.birefringence[0], row.birefringence[1]],
    sg: [row.sg[0], row.sg[1]],
    polariscope: row.polariscope,
    opticFigure: row.opticFigure,
    hardnessMohs: [row.hardnessMohs[0], row.hardnessMohs[1]],
    colours: [...row.colours],
    sourceKind: SPECIES_SOURCE_KINDS.properties,
    source: row.source,
  };
}

export function listSpecies(): SpeciesSummary[] {
  return SPECIES_ROWS.map(summariseSpecies);
}

export { SPECIES_ROWS };
