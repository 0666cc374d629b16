import type { Attribute, NextReading, NumericAttribute, ReadingInput, RefractiveAttribute, VerdictRequest } from '../api/evidence';
import { ATTRIBUTES, CATEGORY_VALUES } from '../api/evidence';
import { caresOf, isTransparentEnough } from '../gem/cares';
import { ratioUncertainty } from '../gem/hydrostatic';
import { speciesModels } from './components';
import type { Judgement } from './judge';
import { isNumeric, judge } from './judge';
import type { Likelihoods } from './likelihood';
import { likelihoods, poolReadings, substituteBodies, withReadings } from './likelihood';
import { outcomeNodes } from './outcomes';
import type { PooledNumber } from './pooling';
import type { PreparedRecord } from './record';
import { GROUP_OF, isCategory } from './settings';

/** An attribute is not proposed again once it has been read this often: people decide then. */
const MOST_READINGS_OF_ONE = 3;
/** Species less likely than this to be the stone in hand are left out while outcomes are explored. */
const SMALLEST_SHARE = 1e-3;
/** Below this chance of settling anything, readings are ranked by what they tell. */
const SETTLES_SELDOM = 0.05;

/** Limit of the usual contact liquid (from memory: Read, Gemmology). */
const USUAL_LIMIT = 1.81;

/** Standard uncertainties a school's instruments usually have; used for a test of which no reading says better. Common practice, no source. */
const USUAL_U: Readonly<Record<NumericAttribute, number>> = {
  length_mm: 0.014, width_mm: 0.014, height_mm: 0.014, weight_ct: 0.006, sg: 0.05, ri_spot: 0.006, ri_low: 0.0015, ri_high: 0.0015,
};

/** One thing a reading may say, how probable it is under either proposition, and what the verdict would become. */
interface Outcome { own: number; another: number; log10LR: number; settled: boolean }

/**
 * The readings worth taking next, best first: those that leave the least bench time to be expected until the verdict is
 * settled; where none is likely to settle it, those that tell most per minute. Outcomes are integrated numerically.
 */
export function rankNextReadings(record: PreparedRecord, request: VerdictRequest, found: Likelihoods, judgement: Judgement): NextReading[] {
  const exploring = withoutTheUnlikely(record, found);
  const { seconds, openSeconds, priorSwap } = record.settings;
  const belief = sigmoid(Math.log((1 - priorSwap) / priorSwap) + judgement.log10LR * Math.LN10);
  const explore = explorer(exploring, request);
  const ranked = candidates(record, request).map((attribute): NextReading => {
    const outcomes = explore(attribute);
    return {
      attribute,
      repeat: request.readings.some((reading) => reading.attribute === attribute),
      bits: Math.max(0, entropyBits(belief) - expect(outcomes, belief, ({ log10LR }) => entropyBits(sigmoid(Math.log((1 - priorSwap) / priorSwap) + log10LR * Math.LN10)))),
      settles: expect(outcomes, belief, ({ settled }) => (settled ? 1 : 0)),
      seconds: seconds[attribute],
    };
  }).filter(({ bits, settles }) => bits > 1e-9 || settles > 1e-6);
  const seldom = ranked.every(({ settles }) => settles < SETTLES_SELDOM);
  const cost = (reading: NextReading) => (seldom ? -reading.bits / reading.seconds : reading.seconds + (1 - reading.settles) * openSeconds);
  return ranked.sort((a, b) => cost(a) - cost(b) || b.bits - a.bits || ATTRIBUTES.indexOf(a.attribute) - ATTRIBUTES.indexOf(b.attribute));
}

function withoutTheUnlikely(record: PreparedRecord, found: Likelihoods): PreparedRecord {
  const sum = found.bySpecies.reduce((total, share) => total + share, 0);
  if (!(sum > 0)) return record;
  return { ...record, shares: record.shares.map((share, k) => ((found.bySpecies[k] ?? 0) > SMALLEST_SHARE * sum ? share : 0)) };
}

/** Attributes that the stone and the lab allow and of which another reading could say something. */
function candidates(record: PreparedRecord, request: VerdictRequest): Attribute[] {
  const cares = caresOf(record.model.row, record.stone.flags);
  const { values } = record.stone;
  return ATTRIBUTES.filter((attribute) => {
    if (request.unavailable?.includes(attribute)) return false;
    if (request.readings.filter((reading) => reading.attribute === attribute).length >= MOST_READINGS_OF_ONE) return false;
    if (attribute === 'sg') return !cares.porous && !record.stone.flags?.includes('coated_or_filled');
    if (attribute === 'ri_spot') return !cares.sparesContactLiquid;
    // Flat readings need a polished back, which only a record that holds them vouches for.
    if (attribute === 'ri_low' || attribute === 'ri_high') return !cares.sparesContactLiquid && values[attribute] !== undefined;
    if (attribute === 'polariscope') return isTransparentEnough(record.model.row);
    if (attribute === 'optic_figure' || attribute === 'optic_sign') return isTransparentEnough(record.model.row) && values[attribute] !== undefined;
    // A size, weight, fluorescence or pleochroism that the record lacks has nothing to be compared with.
    return values[attribute] !== undefined;
  });
}

/** Works out the outcomes of one further reading of an attribute; what the reading leaves unchanged is computed once for all. */
function explorer(record: PreparedRecord, request: VerdictRequest): (attribute: Attribute) => Outcome[] {
  const before = poolReadings(record, request.readings);
  const bodiesBefore = substituteBodies(record, before);
  return (attribute) => {
    const earlier = request.readings.filter((reading) => reading.attribute === attribute);
    const look = (reading: ReadingInput, width: number): Outcome => {
      const pooled = withReadings(record, before, attribute, [...earlier, reading]);
      const found = likelihoods(record, pooled, GROUP_OF[attribute] === 'body' ? undefined : bodiesBefore);
      const judged = judge(record, pooled, found);
      const last = found.own.length - 1;
      return { own: width * (found.own[last] ?? 0), another: width * (found.another[last] ?? 0), log10LR: judged.log10LR, settled: judged.verdict !== 'not_settled' };
    };
    if (isCategory(attribute)) return CATEGORY_VALUES[attribute].map((value) => look({ attribute, value }, 1));
    return isNumeric(attribute) ? numericOutcomes(record, attribute, before.numbers[attribute], earlier, look) : [];
  };
}

function numericOutcomes(
  record: PreparedRecord, attribute: NumericAttribute, read: PooledNumber | undefined, earlier: readonly ReadingInput[],
  look: (reading: ReadingInput, width: number) => Outcome,
): Outcome[] {
  const u = usualU(record, attribute, earlier);
  const limit = attribute.startsWith('ri_') ? USUAL_LIMIT : Infinity;
  const nodes = outcomeNodes(record, attribute, read, u).filter((value) => value > 0 && value < limit);
  const outcomes = nodes.map((value, i) => {
    const width = ((nodes[i + 1] ?? value) - (nodes[i - 1] ?? value)) / 2 / u;
    return look({ attribute, value, u }, width);
  });
  if (limit < Infinity && mayExceed(record, limit)) outcomes.push(look({ attribute: attribute as RefractiveAttribute, value: 'over_limit', limit }, 1));
  return outcomes;
}

function mayExceed(record: PreparedRecord, limit: number): boolean {
  return speciesModels(record.settings).some(({ components }, k) => (record.shares[k] ?? 0) > 0 && components.some((piece) => piece.high + 2 * piece.uIndex > limit));
}

/** The uncertainty a further reading will have: that of an earlier one, else the usual one; for SG it follows from the stone's weight. */
function usualU(record: PreparedRecord, attribute: NumericAttribute, earlier: readonly ReadingInput[]): number {
  for (const reading of earlier) if ('u' in reading) return reading.u;
  const weight = record.numbers.weight_ct;
  if (attribute === 'sg' && weight !== undefined) {
    const sg = record.numbers.sg?.value ?? record.model.row.sgTypical ?? 2.65;
    return ratioUncertainty({ sg, airCt: weight.value, uAirCt: USUAL_U.weight_ct, uWaterCt: USUAL_U.weight_ct });
  }
  return USUAL_U[attribute];
}

/** Expectation over outcomes under the belief that it is the recorded stone. */
function expect(outcomes: readonly Outcome[], belief: number, of: (outcome: Outcome) => number): number {
  let own = 0;
  let another = 0;
  let ownSum = 0;
  let anotherSum = 0;
  for (const outcome of outcomes) {
    const value = of(outcome);
    own += outcome.own * value;
    ownSum += outcome.own;
    another += outcome.another * value;
    anotherSum += outcome.another;
  }
  return belief * (ownSum > 0 ? own / ownSum : 0) + (1 - belief) * (anotherSum > 0 ? another / anotherSum : 0);
}

function sigmoid(logOdds: number): number {
  return 1 / (1 + Math.exp(-logOdds));
}

function entropyBits(p: number): number {
  return p <= 0 || p >= 1 ? 0 : -(p * Math.log2(p) + (1 - p) * Math.log2(1 - p));
}
