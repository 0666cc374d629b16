import type { InstrumentKind, InstrumentView, NewInstrumentRequest } from '@shared/api/instruments';
import { parseNumber } from '@/components/ui';

export interface InstrumentDraft {
  kind: InstrumentKind;
  name: string;
  resolution: string;
  standardUncertainty: string;
  spotUncertainty: string;
  liquidLimitRi: string;
}

export const kindWords: Readonly<Record<InstrumentKind, { label: string; unit: string | null }>> = {
  balance: { label: 'Balance', unit: 'ct' },
  caliper: { label: 'Caliper', unit: 'mm' },
  refractometer: { label: 'Refractometer', unit: 'RI' },
  polariscope: { label: 'Polariscope', unit: null },
  uv_lamp: { label: 'UV lamp', unit: null },
  thermometer: { label: 'Thermometer', unit: '°C' },
};

/** What a new entry of a kind begins with: usual figures of a school's bench (common practice, no source). */
export const usualFigures: Readonly<Record<InstrumentKind, Omit<InstrumentDraft, 'kind' | 'name'>>> = {
  balance: { resolution: '0.01', standardUncertainty: '0.006', spotUncertainty: '', liquidLimitRi: '' },
  caliper: { resolution: '0.01', standardUncertainty: '0.014', spotUncertainty: '', liquidLimitRi: '' },
  refractometer: { resolution: '0.001', standardUncertainty: '0.0015', spotUncertainty: '0.006', liquidLimitRi: '1.81' },
  polariscope: { resolution: '', standardUncertainty: '', spotUncertainty: '', liquidLimitRi: '' },
  uv_lamp: { resolution: '', standardUncertainty: '', spotUncertainty: '', liquidLimitRi: '' },
  thermometer: { resolution: '0.1', standardUncertainty: '0.3', spotUncertainty: '', liquidLimitRi: '' },
};

export function draftOf(instrument: InstrumentView): InstrumentDraft {
  const text = (value: number | null) => (value === null ? '' : String(value));
  return {
    kind: instrument.kind, name: instrument.name, resolution: text(instrument.resolution), standardUncertainty: text(instrument.standardUncertainty),
    spotUncertainty: text(instrument.spotUncertainty), liquidLimitRi: text(instrument.liquidLimitRi),
  };
}

/** The draft as the server takes it: a field that is not a number goes as null and is then refused by name. */
export function toRequest({ kind, name, ...figures }: InstrumentDraft): NewInstrumentRequest {
  if (kindWords[kind].unit === null) return { kind, name };
  const base = { kind, name, resolution: parseNumber(figures.resolution), standardUncertainty: parseNumber(figures.standardUncertainty) };
  if (kind !== 'refractometer') return base;
  return { ...base, spotUncertainty: parseNumber(figures.spotUncertainty), liquidLimitRi: parseNumber(figures.liquidLimitRi) };
}
