import { useMemo } from 'react';
import { figureOfSpecies } from '@shared/gem/figureSpecies';
import { findSpecies } from '@shared/gem/species';
import { Figure, type FigureProps } from './Figure';

/**
 * The emblem of a species by its id; a plain disc for an unknown one. It carries the species table, so import it from
 * this file, and only in screens of people who may see names.
 */
export function FigureOfSpecies({ species, heightMm, ...rest }: { species: string; heightMm?: number } & Omit<FigureProps, 'parameters'>) {
  const parameters = useMemo(() => {
    const row = findSpecies(species);
    return row ? figureOfSpecies(row, heightMm ? { heightMm } : {}) : null;
  }, [species, heightMm]);
  return <Figure {...rest} parameters={parameters} />;
}
