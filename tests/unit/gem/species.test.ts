import { STONE_COLOURS } from '@shared/api/evidence';
import { caresOf, findMaterial, findSpecies, indexExtent, isSpeciesId, listSpecies, MATERIALS, refractiveIndex, SODIUM_D_UM, speciesById, SPECIES_ROWS } from '@shared/gem';
import { DEFAULT_SETTINGS } from '@shared/evidence';
import { speciesModels } from '@shared/evidence/components';
import { reactionsOf } from '@shared/evidence/optics';

describe('the species table', () => {
  it('lists 76 species under ids of their own', () => {
    expect(new Set(SPECIES_ROWS.map((row) => row.id)).size).toBe(76);
  });

  it.each(SPECIES_ROWS.map((row) => [row.id, row] as const))('keeps the ranges of %s in order', (_, row) => {
    const { low, high } = indexExtent(row);
    expect(low[0]).toBeLessThanOrEqual(low[1]);
    expect(high[0]).toBeLessThanOrEqual(high[1]);
    expect(low[0]).toBeLessThanOrEqual(high[0]);
    expect(row.sg[0]).toBeLessThan(row.sg[1]);
    expect(row.colours.every((colour) => STONE_COLOURS.includes(colour))).toBe(true);
    expect(row.source).toMatch(/\(\d{4}\)|Deer/);
  });

  it('says of every summary that its figures come from memory', () => {
    expect(listSpecies().every((summary) => summary.sourceKind === 'memory')).toBe(true);
  });

  it('finds no species that is not in the table', () => {
    expect(findSpecies('paste')).toBeUndefined();
    expect(isSpeciesId('__proto__')).toBe(false);
    expect(() => speciesById('paste')).toThrow(RangeError);
  });

  it('agrees with measured dispersion where both exist [read: refractiveindex.info database, CC0]', () => {
    for (const [id, material] of [['rock-crystal', 'quartz'], ['sapphire', 'corundum (sapphire)'], ['calcite', 'calcite'], ['diamond', 'diamond'], ['fluorite', 'fluorite']] as const) {
      const { low, high } = indexExtent(speciesById(id));
      for (const ray of Object.values(findMaterial(material)?.rays ?? {})) {
        const n = refractiveIndex(ray, SODIUM_D_UM);
        expect(n).toBeGreaterThan(low[0] - 0.001);
        expect(n).toBeLessThan(high[1] + 0.001);
      }
    }
  });

  it('evaluates every material of the dispersion table at the D line', () => {
    for (const { rays } of MATERIALS) for (const ray of Object.values(rays)) expect(refractiveIndex(ray, SODIUM_D_UM)).toBeGreaterThan(1.3);
  });

  it('knows that opal drinks and topaz cleaves', () => {
    expect(caresOf(speciesById('opal')).porous).toBe(true);
    expect(caresOf(speciesById('topaz')).fragile).toBe(true);
    expect(caresOf(speciesById('rock-crystal'), ['porous']).porous).toBe(true);
  });
});

describe('species as the engine sees them', () => {
  it.each(speciesModels(DEFAULT_SETTINGS).map((model) => [model.row.id, model] as const))('spreads %s over shares that sum to one', (_, { row, components }) => {
    expect(components.reduce((sum, piece) => sum + piece.weight, 0)).toBeCloseTo(1, 12);
    expect(components.every((piece) => piece.uSg > 0 && piece.uIndex > 0 && piece.low <= piece.high)).toBe(true);
    expect(Object.values(reactionsOf(row)).reduce((sum, share) => sum + share, 0)).toBeCloseTo(1, 12);
  });
});
