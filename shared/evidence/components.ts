import { findSpecies, indexExtent, SPECIES_ROWS } from '../gem/species';
import type { SpeciesRow } from '../gem/speciesRow';
import type { EngineSettings } from './settings';

/**
 * A species as a mixture of normal pieces: SG about `sg`, indices about [`low`, `high`] moving together by `uIndex`.
 * One piece carries SG and index jointly, so that dense garnet is also the highly refractive one.
 */
export interface Component {
  readonly weight: number;
  readonly sg: number;
  readonly uSg: number;
  readonly low: number;
  readonly high: number;
  readonly uIndex: number;
  /** Pieces of equal `sg` and `uSg` share a number, counted from 0: their sizes, SG and weight are worked out once. */
  readonly body: number;
}

/** A piece before its place among the others is known. */
type Piece = Omit<Component, 'body'>;

export interface SpeciesModel {
  readonly row: SpeciesRow;
  readonly components: readonly Component[];
}

/** Share of a fixed composition's stones that fall evenly over the admitted range instead of near the typical value. */
const BROAD_SHARE = 0.3;

/** Species whose SG and index climb together along their range (methods §5, solid solutions). */
const SOLID_SOLUTIONS = new Set([
  'pyrope', 'rhodolite', 'almandine', 'spessartine', 'grossular', 'hydrogrossular', 'andradite', 'peridot', 'labradorite',
  'zircon-medium', 'zircon-low', 'tourmaline', 'aquamarine', 'emerald', 'morganite', 'scapolite', 'diopside', 'enstatite', 'opal',
]);
/** Materials so wide that one bell would misplace them: SG is cut into pieces, index only leans along. */
const WIDE = new Set(['glass', 'plastic']);

const models = new WeakMap<EngineSettings, readonly SpeciesModel[]>();

/** Every species as pieces, under the settings' spreads; computed once per settings object. */
export function speciesModels(settings: EngineSettings): readonly SpeciesModel[] {
  const known = models.get(settings);
  if (known !== undefined) return known;
  const bodies = new Map<string, number>();
  const numbered = (piece: Piece): Component => {
    const key = `${String(piece.sg)}|${String(piece.uSg)}`;
    const body = bodies.get(key) ?? bodies.size;
    bodies.set(key, body);
    return { ...piece, body };
  };
  const built = SPECIES_ROWS.map((row) => ({ row, components: componentsOf(row, settings.spreads[row.id] ?? row.spread).map(numbered) }));
  models.set(settings, built);
  return built;
}

export function modelOf(id: string, settings: EngineSettings): SpeciesModel {
  const model = speciesModels(settings).find((entry) => entry.row.id === id);
  if (model === undefined || findSpecies(id) === undefined) throw new RangeError(`no species ${id} in the reference table`);
  return model;
}

function componentsOf(row: SpeciesRow, spread: { sg: number; ri: number }): Piece[] {
  if (WIDE.has(row.id)) return pieces(row, 6, 0.5);
  if (SOLID_SOLUTIONS.has(row.id)) return pieces(row, 4, 1);
  const extent = indexExtent(row);
  const low = middle(extent.low);
  const high = middle(extent.high);
  const range = { sg: (row.sg[1] - row.sg[0]) / Math.sqrt(12), ri: (extent.low[1] - extent.low[0]) / Math.sqrt(12) };
  const core = { sg: row.sgTypical ?? middle(row.sg), uSg: spread.sg, low, high, uIndex: spread.ri };
  const aggregate = 'range' in row.ri ? { low: row.ri.spot, high: row.ri.spot } : {};
  if (spread.sg >= 0.8 * range.sg && spread.ri >= 0.8 * range.ri) return [{ weight: 1, ...core, ...aggregate }];
  const broad = { sg: middle(row.sg), uSg: Math.max(range.sg, spread.sg), low, high, uIndex: Math.max(range.ri, spread.ri) };
  return [
    { weight: 1 - BROAD_SHARE, ...core, ...aggregate },
    { weight: BROAD_SHARE, ...broad, ...('range' in row.ri ? { high: low } : {}) },
  ];
}

/** `count` equal pieces along the range; `lean` 1 ties the index to SG, 0 leaves it free over its whole range. */
function pieces(row: SpeciesRow, count: number, lean: number): Piece[] {
  const extent = indexExtent(row);
  const sgStep = (row.sg[1] - row.sg[0]) / count;
  const span = extent.low[1] - extent.low[0];
  const free = span / Math.sqrt(12);
  return Array.from({ length: count }, (_, i) => {
    const t = (i + 0.5) / count;
    const at = (range: readonly [number, number]) => middle(range) + lean * (t - 0.5) * (range[1] - range[0]);
    return {
      weight: 1 / count,
      sg: row.sg[0] + sgStep * (i + 0.5),
      uSg: sgStep * 0.5,
      low: at(extent.low),
      high: 'range' in row.ri ? at(extent.low) : at(extent.high),
      uIndex: lean === 1 ? span / count : free,
    };
  });
}

function middle(range: readonly [number, number]): number {
  return (range[0] + range[1]) / 2;
}
