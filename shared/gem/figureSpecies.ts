import { axialAngle2VzDeg } from './axialAngle';
import type { FigureParameters } from './figure';
import type { IndexTable, Range, SpeciesRow } from './speciesRow';

/** What decides a stone's figure; any row of the species table has it. */
export type FigureSubject = Pick<SpeciesRow, 'id' | 'group' | 'opticCharacter' | 'birefringence' | 'adrCommon' | 'ri'>;

/** Rotation of quartz along its axis at sodium D, degrees per mm (from memory of the CRC Handbook). */
export const quartzRotationDegPerMm = 21.7;

/** A cabochon's height, mm: what the view passes through when nothing better is known. */
const usualHeightMm = 3;

/** Half angles of the cone of light, degrees: a wider one shows both axes of most biaxial stones. */
const cone = { uniaxial: 36, biaxial: 48 } as const;

/** Path difference across the axis at which rings can still be told apart on a small disc, nm, for a birefringence of 0.009. */
const readablePathNm = 24_000;

/**
 * Parameters of a species' picture.
 * Where the real height would give rings too fine to see, the figure is that of a thinner plate of the same stone;
 * quartz keeps its height, because the colour of its centre depends on it.
 * @param turnDeg turn of the stone on the stage, degrees; 45 parts the brushes of a biaxial stone
 * @param heightMm height of the stone along the view, mm
 */
export function figureOfSpecies(subject: FigureSubject, { turnDeg = 45, heightMm = usualHeightMm }: { turnDeg?: number; heightMm?: number } = {}): FigureParameters {
  const birefringence = middle(subject.birefringence);
  switch (opticKind(subject)) {
    case 'isotropic':
      return strained(subject) ?? { kind: 'dark' };
    case 'aggregate':
      return { kind: 'aggregate', seed: seedOf(subject.id) };
    case 'uniaxial': {
      const quartz = subject.group === 'quartz';
      return {
        kind: 'axial', birefringence, turnDeg, axialAngleDeg: 0, view: 'bisectrix', coneDeg: cone.uniaxial,
        thicknessMm: quartz ? heightMm : readableThickness(heightMm, birefringence, 1),
        rotationDegPerMm: quartz ? quartzRotationDegPerMm : 0,
      };
    }
    case 'biaxial': {
      const axialAngleDeg = acuteAxialAngle(subject.ri);
      // Axes that lie outside the cone are never seen together; one then looks along one of them.
      const view = axialAngleDeg / 2 > 0.85 * cone.biaxial ? 'axis' : 'bisectrix';
      return {
        kind: 'axial', birefringence, turnDeg, axialAngleDeg, view, coneDeg: cone.biaxial,
        thicknessMm: readableThickness(heightMm, birefringence, 0.4),
        rotationDegPerMm: 0,
      };
    }
  }
}

type OpticKind = 'isotropic' | 'uniaxial' | 'biaxial' | 'aggregate';

/** The table's words ("uniaxial (usually aggregate)", "opaque") come down to one of four pictures. */
function opticKind({ opticCharacter: words }: FigureSubject): OpticKind {
  if (words.includes('aggregate') || words.includes('opaque')) return 'aggregate';
  if (words.startsWith('biaxial')) return 'biaxial';
  return words.startsWith('uniaxial') ? 'uniaxial' : 'isotropic';
}

function strained({ id, group, adrCommon }: FigureSubject): FigureParameters | null {
  if (adrCommon !== 'yes') return null;
  const pattern = group === 'spinel' ? 'tabby' : 'bands';
  return { kind: 'strain', pattern, seed: seedOf(id) };
}

function readableThickness(heightMm: number, birefringence: number, share: number): number {
  if (birefringence <= 0) return heightMm;
  // A little more for stronger stones, so that their rings stay finer than those of weaker ones.
  const pathNm = share * readablePathNm * (birefringence / 0.009) ** 0.3;
  return Math.min(heightMm, pathNm / (birefringence * 1e6));
}

/** 2V about the acute bisectrix from the middles of the index ranges, degrees; 60 where the table has no three indices. */
function acuteAxialAngle(ri: IndexTable): number {
  if (!('alpha' in ri)) return 60;
  const [alpha, beta, gamma] = [middle(ri.alpha), middle(ri.beta), middle(ri.gamma)];
  if (!(alpha < gamma && alpha <= beta && beta <= gamma)) return 60;
  const aboutZ = axialAngle2VzDeg(alpha, beta, gamma);
  return aboutZ > 90 ? 180 - aboutZ : aboutZ;
}

function middle(range: Range | null): number {
  return range === null ? 0 : (range[0] + range[1]) / 2;
}

/** The same stone always shows the same texture. */
function seedOf(id: string): number {
  return Array.from(id).reduce((hash, letter) => (Math.imul(hash, 31) + (letter.codePointAt(0) ?? 0)) | 0, 7);
}
