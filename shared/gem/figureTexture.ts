import type { RetardationColours } from './figureColour';

type LightField = (x: number, y: number, out: Float64Array) => void;

/** Repeatable numbers from 0 to 1: a small integer hash, so that one seed always gives one picture. */
export function hash(seed: number, a: number, b = 0): number {
  let h = Math.imul(seed | 0, 0x9e3779b1) ^ Math.imul(a | 0, 0x85ebca6b) ^ Math.imul(b | 0, 0xc2b2ae35);
  h = Math.imul(h ^ (h >>> 15), 0x2c1b3c6d);
  h = Math.imul(h ^ (h >>> 12), 0x297a2d39);
  return ((h ^ (h >>> 15)) >>> 0) / 4294967296;
}

/**
 * Strain double refraction: a smooth field of small retardations, whose dark lines wander as the stone turns.
 * `bands` are the snakes of glass and garnet, `tabby` the cross-hatching of flame-fusion spinel.
 * The field is drawn, not derived from a stress state: no two strained stones look alike, and the eye learns the kind.
 */
export function strainField(
  { pattern, seed }: { pattern: 'bands' | 'tabby'; seed: number },
  size: number,
  colours: RetardationColours,
): LightField {
  const level = waves(seed, pattern);
  const upright = waves(seed + 101, pattern);
  const strongestNm = pattern === 'tabby' ? 130 : 210;
  return (x, y, out) => {
    const u = (2 * (x + 0.5)) / size - 1;
    const v = (2 * (y + 0.5)) / size - 1;
    const [a, b] = [level(u, v), upright(u, v)];
    const strength = Math.hypot(a, b);
    const sine2 = strength === 0 ? 0 : (b / strength) ** 2;
    colours.mean(strength * strongestNm, 0, sine2, out);
  };
}

/** A sum of a few plane waves, about −1.5 to 1.5. */
function waves(seed: number, pattern: 'bands' | 'tabby'): (u: number, v: number) => number {
  const terms = Array.from({ length: 5 }, (_, index) => {
    const crossed = pattern === 'tabby' && index < 4;
    const direction = crossed ? (index % 2) * (Math.PI / 2) + Math.PI / 4 + 0.12 * hash(seed, index, 1) : 2 * Math.PI * hash(seed, index, 1);
    const turns = crossed ? 3.2 + 2.6 * hash(seed, index, 2) : 0.45 + 0.8 * hash(seed, index, 2);
    return { kx: Math.PI * turns * Math.cos(direction), ky: Math.PI * turns * Math.sin(direction), phase: 2 * Math.PI * hash(seed, index, 3) };
  });
  return (u, v) => terms.reduce((sum, { kx, ky, phase }) => sum + 0.45 * Math.sin(kx * u + ky * v + phase), 0);
}

/** A fine-grained aggregate: many small crystals, each turned its own way, so that some light always comes through. */
export function grainField(seed: number, size: number, colours: RetardationColours): LightField {
  const layers = 3;
  const grains = 84;
  const part = new Float64Array(3);
  return (x, y, out) => {
    for (let layer = 0; layer < layers; layer++) {
      // Each layer's grid is turned, so that no rows of grains show.
      const [cos, sin] = [Math.cos(0.5 + 1.1 * layer), Math.sin(0.5 + 1.1 * layer)];
      const column = Math.floor((((x + 0.5) * cos - (y + 0.5) * sin) / size) * grains);
      const row = Math.floor((((x + 0.5) * sin + (y + 0.5) * cos) / size) * grains);
      const sine2 = Math.sin(Math.PI * hash(seed + layer, column, row)) ** 2;
      const retardation = 500 + 2200 * hash(seed + layer + 17, column, row);
      colours.mean(retardation, 900, 0.25 + 0.55 * sine2, part);
      for (let channel = 0; channel < 3; channel++) out[channel] = out[channel]! + part[channel]! / layers / 1.6;
    }
  };
}
