import { contrastRatio } from '@/components/theme/contrast';
import { edgePairs, textPairs, themes } from '@/components/theme/themes';

describe('contrast', () => {
  // WCAG 2.2, definition of contrast ratio: from 1 to 21.
  it('is 21 between black and white, either way round', () => {
    expect(contrastRatio('#000000', '#FFFFFF')).toBeCloseTo(21, 10);
    expect(contrastRatio('#FFFFFF', '#000000')).toBeCloseTo(21, 10);
  });

  it('is 1 between a colour and itself', () => {
    expect(contrastRatio('#2B2A86', '#2B2A86')).toBe(1);
  });

  // #767676 is the lightest grey that passes 4.5:1 on white (common practice among WCAG checkers, from memory).
  it('puts the well-known limit grey just above 4.5 on white', () => {
    expect(contrastRatio('#767676', '#FFFFFF')).toBeGreaterThan(4.5);
    expect(contrastRatio('#777777', '#FFFFFF')).toBeLessThan(4.5);
  });

  it('refuses what is not a colour', () => {
    expect(() => contrastRatio('red', '#FFFFFF')).toThrow(RangeError);
  });
});

describe.each(Object.values(themes))('the $name scheme', ({ colors }) => {
  it.each(textPairs)('sets %s on %s at 4.5:1 or more', (text, ground) => {
    expect(contrastRatio(colors[text], colors[ground])).toBeGreaterThanOrEqual(4.5);
  });

  it.each(edgePairs)('draws %s on %s at 3:1 or more', (edge, ground) => {
    expect(contrastRatio(colors[edge], colors[ground])).toBeGreaterThanOrEqual(3);
  });

  it('tests every colour that is a text or a ground', () => {
    const decoration = ['rule', 'veil'];
    const tested = new Set([...textPairs, ...edgePairs].flat());
    expect(Object.keys(colors).filter((name) => !decoration.includes(name) && !tested.has(name as keyof typeof colors))).toEqual([]);
  });
});

describe('the light scheme', () => {
  it('is the palette of the design', () => {
    expect(themes.light.colors).toMatchObject({
      ground: '#EDF0F1', sheet: '#FFFFFF', ink: '#16141D', soft: '#565B66', rule: '#CFD5DA', field: '#0B0A10',
      same: '#0A6B4E', sameGround: '#DDF2E8', open: '#7A4D00', openGround: '#FFEFC9',
      different: '#A8152F', differentGround: '#FCE1E4', action: '#2B2A86', actionGround: '#E4E5FA',
    });
  });
});
