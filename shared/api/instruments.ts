import type { Attribute } from './evidence';

export const INSTRUMENT_KINDS = ['balance', 'refractometer', 'caliper', 'polariscope', 'uv_lamp', 'thermometer'] as const;
export type InstrumentKind = (typeof INSTRUMENT_KINDS)[number];

/** The kind of instrument an attribute is read with; null where the register knows no such kind. */
export const INSTRUMENT_FOR: Readonly<Record<Attribute, InstrumentKind | null>> = {
  length_mm: 'caliper',
  width_mm: 'caliper',
  height_mm: 'caliper',
  sg: 'balance',
  weight_ct: 'balance',
  ri_spot: 'refractometer',
  ri_low: 'refractometer',
  ri_high: 'refractometer',
  polariscope: 'polariscope',
  optic_figure: 'polariscope',
  optic_sign: 'polariscope',
  uv_long: 'uv_lamp',
  uv_short: 'uv_lamp',
  pleochroism: null,
};

/** GET /instruments. Units: ct for a balance, mm for a caliper, refractive index for a refractometer, °C for a thermometer; null where the kind has no number. */
export interface InstrumentView {
  id: string;
  kind: InstrumentKind;
  name: string;
  resolution: number | null;
  /** Standard uncertainty (k = 1) of one reading. */
  standardUncertainty: number | null;
  /** Refractometer: standard uncertainty of a spot reading on a dome. */
  spotUncertainty: number | null;
  /** Refractometer: highest index its contact liquid lets it read. */
  liquidLimitRi: number | null;
  retired: boolean;
  version: number;
}

/** POST /instruments */
export interface NewInstrumentRequest {
  kind: InstrumentKind;
  name: string;
  resolution?: number | null;
  standardUncertainty?: number | null;
  spotUncertainty?: number | null;
  liquidLimitRi?: number | null;
}
/** PATCH /instruments/:instrumentId */
export interface InstrumentChange extends Partial<Omit<NewInstrumentRequest, 'kind'>> { version: number; retired?: boolean }
