import type { KitTruth } from './truth';

/*
 * Stones invented for the demo. Indices and specific gravities lie inside the reference table's ranges; weights follow from
 * size, SG and fullness, so that every record hangs together as a real one does. Descriptions say nothing a student must find.
 */

const opticFigures: KitTruth = {
  number: '014',
  title: 'Optic-figure set',
  neutralTitle: 'Practice set 014',
  stones: [
    { species: 'tourmaline', colour: 'green', shape: 'oval', nominalSize: '10×8', neutralDescription: 'green oval, 10×8', valueMinor: 9_000, sizeMm: [10.04, 8.03, 4.62], sg: 3.06, fullness: 0.99, spot: 1.63, flat: [1.62, 1.639], polariscope: 'DR', figure: 'uniaxial', sign: '-', source: 'Bequest of a former tutor, 2011', marks: 'Fine tubes near one end of the girdle' },
    { species: 'smoky-quartz', colour: 'brown', shape: 'round', nominalSize: '9', neutralDescription: 'brown round, 9', valueMinor: 4_500, sizeMm: [9.02, 8.99, 4.71], sg: 2.65, fullness: 1.01, spot: 1.55, polariscope: 'DR', figure: 'quartz', sign: '+' },
    { species: 'topaz', colour: 'blue', shape: 'oval', nominalSize: '8×6', neutralDescription: 'pale blue oval, 8×6', valueMinor: 7_000, sizeMm: [8.02, 6.01, 3.52], sg: 3.56, fullness: 0.99, spot: 1.62, polariscope: 'DR', figure: 'biaxial', sign: '+', weighedInWater: true, marks: 'Tiny chip under the girdle at 4 o’clock' },
    { species: 'synthetic-spinel', colour: 'blue', shape: 'oval', nominalSize: '8×6', neutralDescription: 'deep blue oval, 8×6', valueMinor: 1_500, sizeMm: [8.05, 6.03, 3.6], sg: 3.63, fullness: 1, spot: 1.73, polariscope: 'ADR', weighedInWater: true },
    { species: 'glass', colour: 'violet', shape: 'round', nominalSize: '8', neutralDescription: 'violet round, 8', valueMinor: 500, sizeMm: [8.01, 8.01, 4.05], sg: 2.52, fullness: 1.01, spot: 1.52, polariscope: 'SR', marks: 'One round bubble under the dome' },
    { species: 'chalcedony', colour: 'grey', shape: 'oval', nominalSize: '10×8', neutralDescription: 'cloudy grey oval, 10×8', valueMinor: 2_500, sizeMm: [10.02, 7.98, 4.4], sg: 2.6, fullness: 0.98, spot: 1.54, polariscope: 'AGG' },
  ],
};

const blueLookAlikes: KitTruth = {
  number: '021',
  title: 'Blue look-alikes',
  neutralTitle: 'Practice set 021',
  stones: [
    { species: 'aquamarine', colour: 'blue', shape: 'oval', nominalSize: '8×6', neutralDescription: 'pale blue oval, 8×6', valueMinor: 12_000, sizeMm: [8.03, 6.02, 3.45], sg: 2.71, fullness: 1, spot: 1.57, polariscope: 'DR', figure: 'uniaxial', sign: '-', weighedInWater: true },
    { species: 'topaz', colour: 'blue', shape: 'oval', nominalSize: '8×6', neutralDescription: 'pale blue oval, 8×6', valueMinor: 7_000, sizeMm: [7.98, 5.99, 3.61], sg: 3.56, fullness: 1.02, spot: 1.61, polariscope: 'DR', figure: 'biaxial', sign: '+', weighedInWater: true },
    { species: 'synthetic-spinel', colour: 'blue', shape: 'oval', nominalSize: '8×6', neutralDescription: 'pale blue oval, 8×6', valueMinor: 1_500, sizeMm: [8.06, 6.05, 3.38], sg: 3.64, fullness: 0.99, spot: 1.73, polariscope: 'ADR' },
    { species: 'glass', colour: 'blue', shape: 'oval', nominalSize: '8×6', neutralDescription: 'pale blue oval, 8×6', valueMinor: 500, sizeMm: [8, 6, 3.5], sg: 2.48, fullness: 1, spot: 1.51, polariscope: 'SR' },
    { species: 'zircon-high', colour: 'blue', shape: 'oval', nominalSize: '8×6', neutralDescription: 'pale blue oval, 8×6', valueMinor: 14_000, sizeMm: [8.04, 6, 3.3], sg: 4.69, fullness: 0.99, spot: 'over_limit', polariscope: 'DR', figure: 'uniaxial', sign: '+', weighedInWater: true },
  ],
};

const indexLadder: KitTruth = {
  number: '009',
  title: 'Refractive-index ladder',
  neutralTitle: 'Practice set 009',
  stones: [
    { species: 'fluorite', colour: 'colourless', shape: 'round', nominalSize: '8', neutralDescription: 'colourless round, 8', valueMinor: 2_000, sizeMm: [8.02, 8, 4.02], sg: 3.18, fullness: 1, spot: 1.43, polariscope: 'SR', marks: 'Small cleavage at the edge of the back' },
    { species: 'glass', colour: 'colourless', shape: 'round', nominalSize: '8', neutralDescription: 'colourless round, 8', valueMinor: 500, sizeMm: [7.99, 7.98, 4.11], sg: 2.52, fullness: 1, spot: 1.52, polariscope: 'SR' },
    { species: 'rock-crystal', colour: 'colourless', shape: 'round', nominalSize: '8', neutralDescription: 'colourless round, 8', valueMinor: 2_000, sizeMm: [8.03, 8.01, 4.25], sg: 2.65, fullness: 0.99, spot: 1.55, flat: [1.544, 1.553], polariscope: 'DR', figure: 'quartz', sign: '+' },
    { species: 'tourmaline', colour: 'pink', shape: 'round', nominalSize: '8', neutralDescription: 'pink round, 8', valueMinor: 11_000, sizeMm: [8.05, 8.02, 3.9], sg: 3.05, fullness: 1, spot: 1.63, flat: [1.619, 1.637], polariscope: 'DR', figure: 'uniaxial', sign: '-' },
    { species: 'peridot', colour: 'green', shape: 'round', nominalSize: '8', neutralDescription: 'yellowish green round, 8', valueMinor: 9_500, sizeMm: [7.97, 7.95, 4.18], sg: 3.34, fullness: 1.01, spot: 1.67, flat: [1.654, 1.69], polariscope: 'DR', figure: 'biaxial', sign: '+' },
    { species: 'synthetic-spinel', colour: 'colourless', shape: 'round', nominalSize: '8', neutralDescription: 'colourless round, 8', valueMinor: 1_500, sizeMm: [8.01, 8.01, 4.06], sg: 3.64, fullness: 1, spot: 1.73, polariscope: 'ADR' },
    { species: 'synthetic-corundum', colour: 'yellow', shape: 'round', nominalSize: '8', neutralDescription: 'yellow round, 8', valueMinor: 2_500, sizeMm: [8.02, 8.02, 3.95], sg: 3.99, fullness: 1, spot: 1.77, flat: [1.761, 1.769], polariscope: 'DR', figure: 'uniaxial', sign: '-' },
    { species: 'cubic-zirconia', colour: 'colourless', shape: 'round', nominalSize: '8', neutralDescription: 'colourless round, 8', valueMinor: 1_000, sizeMm: [8, 7.99, 4.1], sg: 5.8, fullness: 1, spot: 'over_limit', polariscope: 'SR' },
  ],
};

/** Left half recorded, so that the catalogue can show what is missing before a kit can go out. */
const redStones: KitTruth = {
  number: '030',
  title: 'Red stones, being recorded',
  neutralTitle: 'Practice set 030',
  stones: [
    { species: 'pyrope', colour: 'red', shape: 'oval', nominalSize: '8×6', neutralDescription: 'red oval, 8×6', valueMinor: 3_500, sizeMm: [8.01, 6.02, 3.44], sg: 3.75, fullness: 1, spot: 1.74, polariscope: 'SR' },
    { species: 'almandine', colour: 'red', shape: 'oval', nominalSize: '8×6', neutralDescription: 'dark red oval, 8×6', valueMinor: 3_000, sizeMm: [8.04, 6, 3.52], sg: 4.08, fullness: 0.99 },
    { species: 'synthetic-corundum', colour: 'red', shape: 'oval', nominalSize: '8×6', neutralDescription: 'red oval, 8×6', valueMinor: 2_500, sizeMm: [8.02, 6.03, 3.4], sg: 4, fullness: 1, polariscope: 'DR' },
  ],
};

const starterSet: KitTruth = {
  number: '001',
  title: 'Violet pair',
  neutralTitle: 'Starter set 001',
  stones: [
    { species: 'amethyst', colour: 'violet', shape: 'oval', nominalSize: '10×8', neutralDescription: 'violet oval, 10×8', valueMinor: 3_500, sizeMm: [10.01, 8.02, 4.55], sg: 2.65, fullness: 1, spot: 1.55, polariscope: 'DR', figure: 'quartz', sign: '+' },
    { species: 'glass', colour: 'violet', shape: 'oval', nominalSize: '10×8', neutralDescription: 'violet oval, 10×8', valueMinor: 500, sizeMm: [10.03, 7.99, 4.48], sg: 2.47, fullness: 1, spot: 1.51, polariscope: 'SR' },
  ],
};

export const portElleryKits: readonly KitTruth[] = [opticFigures, blueLookAlikes, indexLadder, redStones];
export const saltpanKits: readonly KitTruth[] = [starterSet];
