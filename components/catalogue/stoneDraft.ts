import type { StoneColour, StoneFlag, StoneShape } from '@shared/api/evidence';
import type { NewStoneRequest, StoneView } from '@shared/api/kits';
import { formatMinor, parseMoney } from '@shared/money';

/** A stone's details as they are being typed. */
export interface StoneDraft {
  slot: string;
  species: string;
  colour: StoneColour | '';
  shape: StoneShape;
  nominalSize: string;
  neutralDescription: string;
  marks: string;
  source: string;
  value: string;
  flags: StoneFlag[];
}

export function emptyStone(slot: string): StoneDraft {
  return { slot, species: '', colour: '', shape: 'oval', nominalSize: '', neutralDescription: '', marks: '', source: '', value: '', flags: [] };
}

export function draftOf(stone: StoneView): StoneDraft {
  const { slot, species, colour, shape, nominalSize, neutralDescription, marks, source, flags } = stone;
  return { slot, species, colour: colour ?? '', shape, nominalSize, neutralDescription, marks, source, flags, value: formatMinor(stone.replacementValueMinor, stone.currency) };
}

export type StoneFields = { ok: true; stone: NewStoneRequest } | { ok: false; faults: Partial<Record<keyof NewStoneRequest, string>> };

/** The draft as the server takes it, or what is wrong with it by field. */
export function stoneFields(draft: StoneDraft, currency: string): StoneFields {
  const faults: Partial<Record<keyof NewStoneRequest, string>> = {};
  const money = parseMoney(draft.value, currency);
  if (!/^[A-Z]$/.test(draft.slot.trim().toUpperCase())) faults.slot = 'One letter, A to Z, as on the jar.';
  if (draft.species === '') faults.species = 'Choose what the stone is.';
  if (draft.neutralDescription.trim() === '') faults.neutralDescription = 'Say what anyone can see, for instance: pale blue oval, 8×6.';
  if (!money.ok) faults.replacementValueMinor = 'Type what replacing it costs, such as 25.00.';
  if (!money.ok || Object.keys(faults).length > 0) return { ok: false, faults };
  const { colour, value: _value, ...rest } = draft;
  return { ok: true, stone: { ...rest, slot: draft.slot.trim().toUpperCase(), colour: colour === '' ? null : colour, replacementValueMinor: money.amountMinor } };
}
