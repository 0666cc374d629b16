import { computeFigure } from '@shared/gem/figure';
import { figureOfSpecies } from '@shared/gem/figureSpecies';
import { SPECIES_IDS, speciesById } from '@shared/gem/species';

describe('the figure of a species', () => {
  it.each(SPECIES_IDS)('can be drawn for %s', (id) => {
    expect(computeFigure(figureOfSpecies(speciesById(id)), 16)).toHaveLength(4 * 16 * 16);
  });

  it('turns the plane of polarisation in quartz only', () => {
    expect(figureOfSpecies(speciesById('amethyst'))).toMatchObject({ kind: 'axial', axialAngleDeg: 0, rotationDegPerMm: 21.7, thicknessMm: 3 });
    expect(figureOfSpecies(speciesById('aquamarine'))).toMatchObject({ kind: 'axial', axialAngleDeg: 0, rotationDegPerMm: 0 });
  });

  // Topaz 2V 48–68° (from memory of Deer, Howie & Zussman): both axes fit the field.
  it('sees both axes of topaz and one of peridot', () => {
    const topaz = figureOfSpecies(speciesById('topaz'));
    expect(topaz).toMatchObject({ kind: 'axial', view: 'bisectrix' });
    if (topaz.kind === 'axial') expect(topaz.axialAngleDeg).toBeGreaterThan(45);
    if (topaz.kind === 'axial') expect(topaz.axialAngleDeg).toBeLessThan(70);
    expect(figureOfSpecies(speciesById('peridot'))).toMatchObject({ kind: 'axial', view: 'axis' });
  });

  it('shows strain where the table says it is common, and the hatching of synthetic spinel', () => {
    expect(figureOfSpecies(speciesById('almandine'))).toMatchObject({ kind: 'strain', pattern: 'bands' });
    expect(figureOfSpecies(speciesById('synthetic-spinel'))).toMatchObject({ kind: 'strain', pattern: 'tabby' });
    expect(figureOfSpecies(speciesById('spinel'))).toEqual({ kind: 'dark' });
  });
});
