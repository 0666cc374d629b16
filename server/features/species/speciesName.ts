import { findSpecies } from '@shared/gem';

/** The trade name of a species id, or the id itself for a row that an older record names and the table no longer has. */
export const speciesName = (id: string): string => findSpecies(id)?.name ?? id;
