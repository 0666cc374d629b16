import type { StoneColour } from '@shared/api/evidence';

/** A place in a demo kit: what the school bought for it. */
export interface Slot {
  readonly species: string;
  readonly colour: StoneColour;
  readonly lengthMm: number;
  readonly widthMm: number;
}

export interface DemoSet { readonly name: string; readonly slots: readonly Slot[] }

const oval = (species: string, colour: StoneColour, lengthMm = 8, widthMm = 6): Slot => ({ species, colour, lengthMm, widthMm });

/** The sets a school starts with: one shows the optic figures, one blue stones that look alike, one climbs the refractometer. */
export const DEMO_SETS: readonly DemoSet[] = [
  {
    name: 'optic figures',
    slots: [
      oval('tourmaline', 'green'), oval('smoky-quartz', 'brown'), oval('topaz', 'blue'),
      oval('synthetic-spinel', 'blue'), oval('glass', 'green'), oval('chalcedony', 'grey'),
    ],
  },
  {
    name: 'blue look-alikes',
    slots: [
      oval('aquamarine', 'blue', 10, 8), oval('topaz', 'blue', 10, 8), oval('synthetic-spinel', 'blue', 10, 8),
      oval('apatite', 'blue', 8, 6), oval('sapphire', 'blue', 8, 6), oval('glass', 'blue', 10, 8),
    ],
  },
  {
    name: 'refractometer ladder',
    slots: [
      oval('fluorite', 'violet', 10, 8), oval('moonstone', 'white', 10, 8), oval('amethyst', 'violet', 10, 8),
      oval('peridot', 'green', 8, 6), oval('spinel', 'red', 7, 5), oval('rhodolite', 'red', 8, 6), oval('cubic-zirconia', 'colourless', 8, 6),
    ],
  },
];
