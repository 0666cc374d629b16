import type { StoneFlag } from '../api/evidence';
import type { SpeciesRow } from './speciesRow';

/**
 * What a stone of a species must be spared. From memory of handbooks and care tables (GIA; Read, Gemmology), except
 * that metamict zircon may be weakly radioactive, which was read on a dealer's page.
 */
export interface Cares {
  /** Takes up liquid: gains weight when wet, is stained or harmed by contact liquid, and gives no hydrostatic SG. */
  readonly porous: boolean;
  /** Contact liquid attacks or stains it. */
  readonly sparesContactLiquid: boolean;
  /** Cleaves, chips or abrades easily. */
  readonly fragile: boolean;
  /** Scratched by ordinary handling; Mohs hardness below 6. */
  readonly soft: boolean;
  readonly heatSensitive: boolean;
  readonly lightSensitive: boolean;
  readonly radioactive: boolean;
}

const POROUS = new Set(['opal', 'turquoise', 'lapis-lazuli']);
const ATTACKED = new Set(['opal', 'turquoise', 'lapis-lazuli', 'plastic', 'amber', 'jet', 'malachite', 'rhodochrosite']);
const CLEAVES = new Set([
  'topaz', 'topaz-imperial', 'fluorite', 'moonstone', 'orthoclase', 'amazonite', 'labradorite', 'sunstone', 'spodumene',
  'kyanite', 'diopside', 'calcite', 'tanzanite', 'zircon-high', 'zircon-medium', 'zircon-low', 'sphene',
]);
const HEAT = new Set(['opal', 'emerald', 'tanzanite', 'moonstone', 'fluorite', 'amber', 'turquoise']);
const FADES = new Set(['spodumene', 'amethyst', 'smoky-quartz', 'topaz-imperial']);

export function caresOf(row: SpeciesRow, flags: readonly StoneFlag[] = []): Cares {
  const treated = flags.includes('coated_or_filled');
  const porous = POROUS.has(row.id) || flags.includes('porous');
  return {
    porous,
    sparesContactLiquid: porous || treated || ATTACKED.has(row.id),
    fragile: CLEAVES.has(row.id) || flags.includes('fragile'),
    soft: row.hardnessMohs[0] < 6,
    heatSensitive: HEAT.has(row.id) || treated,
    lightSensitive: FADES.has(row.id),
    radioactive: row.id === 'zircon-low' || flags.includes('metamict'),
  };
}

/** True where the species' stones let light through well enough for polariscope and figure. */
export function isTransparentEnough(row: SpeciesRow): boolean {
  return !row.polariscope.includes('opaque');
}
