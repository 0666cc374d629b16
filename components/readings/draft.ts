import type { Attribute, CategoryValue } from '@shared/api/evidence';
import { INSTRUMENT_FOR, type InstrumentKind } from '@shared/api/instruments';
import type { ReadingEntry } from '@shared/api/kits';
import { parseNumber } from '@/components/ui';
import { attributeWords } from './attributes';

/** One line of the entry form as it is being typed. */
export interface DraftReading {
  key: string;
  attribute: Attribute;
  value: string;
  overLimit: boolean;
  airCt: string;
  waterCt: string;
  waterC: string;
}

export type Instruments = Partial<Record<InstrumentKind, string>>;

export function emptyDraft(attribute: Attribute, key: string): DraftReading {
  return { key, attribute, value: '', overLimit: false, airCt: '', waterCt: '', waterC: '' };
}

export function isBlank(draft: DraftReading): boolean {
  return draft.value === '' && !draft.overLimit && draft.airCt === '' && draft.waterCt === '' && draft.waterC === '';
}

export type DraftFaults = Readonly<Record<string, string>>;

/** What is wrong with the lines that were begun, by `key.field`; blank lines are left out of the entry, not refused. */
export function draftFaults(drafts: readonly DraftReading[]): DraftFaults {
  const faults: Record<string, string> = {};
  for (const draft of drafts.filter((one) => !isBlank(one))) {
    const { entry, label } = attributeWords[draft.attribute];
    if (entry === 'weighing') {
      if (parseNumber(draft.airCt) === null) faults[`${draft.key}.airCt`] = 'Type the weight in air, in carats.';
      if (parseNumber(draft.waterCt) === null) faults[`${draft.key}.waterCt`] = 'Type the weight in water, in carats.';
      if (parseNumber(draft.waterC) === null) faults[`${draft.key}.waterC`] = 'Type the temperature of the water, in °C.';
    } else if (entry !== 'category' && !draft.overLimit && parseNumber(draft.value) === null) {
      faults[`${draft.key}.value`] = `Type the ${label.toLowerCase()} as a number, such as 1.54.`;
    }
  }
  return faults;
}

/** The lines that were filled in, as the server takes them. `keys[i]` is the line behind entry `i`. */
export function toEntries(drafts: readonly DraftReading[], instruments: Instruments): { entries: ReadingEntry[]; keys: string[] } {
  const filled = drafts.filter((draft) => !isBlank(draft));
  return { entries: filled.map((draft) => toEntry(draft, instruments)), keys: filled.map((draft) => draft.key) };
}

function toEntry(draft: DraftReading, instruments: Instruments): ReadingEntry {
  const { attribute } = draft;
  const kind = INSTRUMENT_FOR[attribute];
  const instrumentId = kind === null ? undefined : instruments[kind];
  const common = { attribute, ...(instrumentId === undefined ? {} : { instrumentId }) };
  const { entry } = attributeWords[attribute];
  if (entry === 'category') return { ...common, category: draft.value as CategoryValue };
  if (entry === 'weighing') {
    return { ...common, airCt: number(draft.airCt), waterCt: number(draft.waterCt), waterC: number(draft.waterC) };
  }
  return draft.overLimit ? { ...common, overLimit: true } : { ...common, value: number(draft.value) };
}

const number = (text: string): number => parseNumber(text) ?? Number.NaN;

/** Errors of the server by its own paths (`readings[2].value`), as faults of the lines they belong to. */
export function faultsOfServer(errors: readonly { field: string; message: string }[], keys: readonly string[]): DraftFaults {
  const faults: Record<string, string> = {};
  for (const { field, message } of errors) {
    const match = /^readings\[(\d+)\]\.(\w+)$/.exec(field);
    const key = match ? keys[Number(match[1])] : undefined;
    if (match && key !== undefined) faults[`${key}.${match[2] === 'category' || match[2] === 'overLimit' ? 'value' : match[2] ?? ''}`] = message;
  }
  return faults;
}
