import type { NumericAttribute, RefractiveAttribute } from '../api/evidence';
import { CT_PER_MM3 } from '../gem/cabochon';
import { speciesModels } from './components';
import type { PooledNumber } from './pooling';
import type { PreparedRecord } from './record';
import { recordedInterval } from './refraction';

/** A place where a next reading may fall: about `mean`, give or take `sd`. */
interface Bell { mean: number; sd: number }

/** Offsets of the nodes about a bell's mean, in standard deviations. */
const FINE = [-3.3, -2.6, -2, -1.5, -1, -0.5, 0, 0.5, 1, 1.5, 2, 2.6, 3.3];
const COARSE = [-2.2, -0.9, 0, 0.9, 2.2];
const MOST_PIECES = 3;
/** Nodes closer together than this, in u of the reading, add nothing. */
const CLOSEST = 0.2;

/**
 * Values at which the outcomes of one further numeric reading are examined: finely about where the recorded stone would
 * read, coarsely wherever a likely substitute would. Sorted, without near duplicates; integrated by the trapezoid rule.
 */
export function outcomeNodes(record: PreparedRecord, attribute: NumericAttribute, read: PooledNumber | undefined, u: number): number[] {
  const fine = ownBells(record, attribute, read, u);
  const coarse = [...substituteBells(record, attribute, u), ...readBells(read, u)];
  const nodes = [
    ...fine.flatMap(({ mean, sd }) => FINE.map((offset) => mean + offset * sd)),
    ...coarse.flatMap(({ mean, sd }) => COARSE.map((offset) => mean + offset * sd)),
  ].sort((a, b) => a - b);
  return nodes.filter((value, i) => i === 0 || value - (nodes[i - 1] ?? value) > CLOSEST * u);
}

/** Where the recorded stone would read: its record and the readings so far, weighed by their certainty. */
function ownBells(record: PreparedRecord, attribute: NumericAttribute, read: PooledNumber | undefined, u: number): Bell[] {
  const recorded = record.numbers[attribute];
  if (recorded === undefined) {
    const interval = attribute.startsWith('ri_') ? recordedInterval(record, attribute as RefractiveAttribute) : null;
    if (interval === null) return [];
    return [{ mean: (interval.low + interval.high) / 2, sd: Math.hypot((interval.high - interval.low) / 2, interval.ends.u, u) }];
  }
  const split = attribute === 'ri_spot' ? record.birefringence : 0;
  if (read === undefined || read.reads.length === 0) return [{ mean: recorded.value, sd: Math.hypot(recorded.u, u, split / 2) }];
  const trust = recorded.u ** 2 / (recorded.u ** 2 + read.u ** 2);
  const about = { mean: recorded.value + trust * (read.mean - recorded.value), sd: Math.hypot(Math.sqrt(trust) * read.u, u) };
  // A reading far off may be a blunder: then the stone would read about its record again.
  const far = Math.abs(read.mean - recorded.value) > 2 * Math.hypot(recorded.u, read.u);
  return far ? [about, { mean: recorded.value, sd: Math.hypot(recorded.u, u, split / 2) }] : [about];
}

/** Where the stone in hand would read again, whichever stone it is. */
function readBells(read: PooledNumber | undefined, u: number): Bell[] {
  return (read?.reads ?? []).map(({ value, u: earlier }) => ({ mean: value, sd: Math.hypot(earlier, u) }));
}

function substituteBells(record: PreparedRecord, attribute: NumericAttribute, u: number): Bell[] {
  const { cutting } = record.settings;
  const recorded = record.numbers[attribute];
  if (attribute === 'height_mm' && recorded) return [{ mean: recorded.value, sd: Math.SQRT2 * cutting.depthShare * recorded.value }];
  if (attribute === 'length_mm' || attribute === 'width_mm') return recorded ? [{ mean: recorded.value, sd: Math.max(cutting.lengthWidthMm, cutting.lengthWidthShare * recorded.value) }] : [];
  const pieces = speciesModels(record.settings)
    .flatMap(({ components }, k) => components.map((piece) => ({ piece, odds: (record.shares[k] ?? 0) * piece.weight })))
    .sort((a, b) => b.odds - a.odds)
    .slice(0, MOST_PIECES)
    .map(({ piece }) => piece);
  if (attribute === 'sg') return pieces.map((piece) => ({ mean: piece.sg, sd: Math.hypot(piece.uSg, u) }));
  if (attribute === 'weight_ct') {
    const { length_mm: length, width_mm: width, height_mm: height } = record.numbers;
    if (!length || !width || !height) return [];
    const ctPerSg = CT_PER_MM3 * (Math.PI / 6) * length.value * width.value * height.value * Math.exp(record.profile.mean);
    return pieces.map((piece) => ({ mean: ctPerSg * piece.sg, sd: Math.hypot(0.1 * ctPerSg * piece.sg, u) }));
  }
  return pieces.map((piece) => ({ mean: (piece.low + piece.high) / 2, sd: Math.hypot((piece.high - piece.low) / 2, piece.uIndex, u) }));
}
