import { colourMatching, linearWeights, wavelengthsNm } from '@shared/gem/cie';
import { colourSeries, crossedIntensity, retardationColour, rotationDegPerMm } from '@shared/gem/figureColour';

describe('colour matching functions', () => {
  // CIE 1931 2° observer, tabulated values at 10 nm (CIE 015, from memory); the fit's own paper gives errors of about 0.02.
  it.each([
    [450, 0.3362, 0.038, 1.7721],
    [500, 0.0049, 0.323, 0.272],
    [550, 0.4334, 0.995, 0.0087],
    [600, 1.0622, 0.631, 0.0008],
    [650, 0.2835, 0.107, 0.0],
  ])('come near the table at %d nm', (nm, x, y, z) => {
    const [fx, fy, fz] = colourMatching(nm);
    expect(Math.abs(fx - x)).toBeLessThan(0.04);
    expect(Math.abs(fy - y)).toBeLessThan(0.04);
    expect(Math.abs(fz - z)).toBeLessThan(0.04);
  });

  it('make light of all wavelengths the white of the screen', () => {
    const sum = [0, 1, 2].map((channel) => linearWeights.reduce((total, weight) => total + weight[channel]!, 0));
    for (const channel of sum) expect(channel).toBeCloseTo(1, 3);
    expect(linearWeights).toHaveLength(wavelengthsNm.length);
  });
});

describe('rotation of quartz', () => {
  // Degrees per mm along the axis at the Fraunhofer lines C, D, e, F, g (from memory of the CRC Handbook).
  it.each([[656.3, 17.32], [589.3, 21.7], [546.1, 25.5], [486.1, 32.8], [435.8, 41.5]])('at %d nm is %d degrees per mm', (nm, degrees) => {
    expect(Math.abs(rotationDegPerMm(nm, 21.7) - degrees)).toBeLessThan(0.15);
  });
});

describe('an elliptical retarder between crossed polars', () => {
  it('is sin²(δ/2)·sin²2ψ without rotation', () => {
    for (const [delta, azimuth] of [[0.7, 0.3], [3, 1.1], [9, -0.4]] as const) {
      expect(crossedIntensity({ delta, turn: 0, azimuth })).toBeCloseTo(Math.sin(delta / 2) ** 2 * Math.sin(2 * azimuth) ** 2, 12);
    }
  });

  // Centre of quartz's figure, I = sin²(ρt) with ρ = 21.7°/mm, rounded to whole per cent (CRC Handbook's ρ, from memory).
  it.each([[0.5, 3], [1, 14], [2, 47], [3, 82], [4, 100], [5, 90]])('passes along the axis of %d mm of quartz %d per cent of sodium light', (mm, percent) => {
    const turn = (rotationDegPerMm(589.3, 21.7) * mm * Math.PI) / 180;
    expect(Math.abs(100 * crossedIntensity({ delta: 0, turn, azimuth: 0.2 }) - percent)).toBeLessThan(0.6);
  });

  it('is the off-diagonal of a product of thin retarders and rotators', () => {
    // Another way to the same matrix: many thin slices of retarder and rotator one after another (Jones 1948).
    for (const parameters of [{ delta: 2.1, turn: 0.6, azimuth: 0.35 }, { delta: 5, turn: 1.4, azimuth: -0.7 }]) {
      expect(crossedIntensity(parameters)).toBeCloseTo(slicedIntensity(parameters, 20_000), 3);
    }
  });

  it('never passes less than nothing or more than all', () => {
    for (let step = 0; step < 200; step++) {
      const intensity = crossedIntensity({ delta: step * 0.37, turn: step * 0.11, azimuth: step * 0.23 });
      expect(intensity).toBeGreaterThanOrEqual(0);
      expect(intensity).toBeLessThanOrEqual(1 + 1e-12);
    }
  });
});

describe('the interference colour series', () => {
  // The Michel-Lévy chart, from memory of the chart: colours of the first order and a half, each roughly where it lies.
  it.each([[0, 'black'], [100, 'grey'], [250, 'white'], [330, 'yellow'], [450, 'orange'], [505, 'red'], [550, 'violet'], [660, 'blue'], [800, 'green'], [910, 'yellow']])(
    'passes %s nm as %s, in the order of the chart',
    (nm, name) => {
      expect(nameOf(retardationColour(nm))).toBe(name);
    },
  );

  it('pales towards white in high orders', () => {
    const spreadOf = ([r, g, b]: readonly number[]) => Math.max(r!, g!, b!) - Math.min(r!, g!, b!);
    expect(spreadOf(retardationColour(15_000))).toBeLessThan(12);
    expect(spreadOf(retardationColour(1100))).toBeGreaterThan(80);
  });

  it('is refused for a negative retardation and for none', () => {
    expect(() => retardationColour(-1)).toThrow(RangeError);
    expect(() => retardationColour(Number.NaN)).toThrow(RangeError);
  });

  it('comes as many colours as asked for', () => {
    expect(colourSeries(5)).toHaveLength(5);
    expect(colourSeries(3)[0]).toBe('rgb(0, 0, 0)');
  });
});

/** Plain name of a colour by brightness and hue. */
function nameOf([r, g, b]: readonly [number, number, number]): string {
  const [high, low] = [Math.max(r, g, b), Math.min(r, g, b)];
  if (high < 12) return 'black';
  const hue = hueOf(r, g, b, high, low);
  // The chart calls a pale blue grey or white, and a pale yellow yellow.
  const pale = (high - low) / high < (hue > 100 ? 0.4 : 0.15);
  if (pale) return high < 230 ? 'grey' : 'white';
  const names: [number, string][] = [[10, 'red'], [46, 'orange'], [75, 'yellow'], [170, 'green'], [255, 'blue'], [305, 'violet'], [360, 'red']];
  return names.find(([limit]) => hue <= limit)?.[1] ?? 'red';
}

function hueOf(r: number, g: number, b: number, high: number, low: number): number {
  const span = high - low;
  const sixth = high === r ? (g - b) / span : high === g ? 2 + (b - r) / span : 4 + (r - g) / span;
  return (sixth * 60 + 360) % 360;
}

type Complex = readonly [number, number];

function slicedIntensity({ delta, turn, azimuth }: { delta: number; turn: number; azimuth: number }, slices: number): number {
  let field: [Complex, Complex] = [[1, 0], [0, 0]];
  const [c, s] = [Math.cos(azimuth), Math.sin(azimuth)];
  const half = delta / slices / 2;
  const [ct, st] = [Math.cos(turn / slices), Math.sin(turn / slices)];
  for (let slice = 0; slice < slices; slice++) {
    const [x, y] = field;
    const slow = phase([c * x[0] + s * y[0], c * x[1] + s * y[1]], -half);
    const fast = phase([-s * x[0] + c * y[0], -s * x[1] + c * y[1]], half);
    const back: [Complex, Complex] = [[c * slow[0] - s * fast[0], c * slow[1] - s * fast[1]], [s * slow[0] + c * fast[0], s * slow[1] + c * fast[1]]];
    field = [[ct * back[0][0] - st * back[1][0], ct * back[0][1] - st * back[1][1]], [st * back[0][0] + ct * back[1][0], st * back[0][1] + ct * back[1][1]]];
  }
  return field[1][0] ** 2 + field[1][1] ** 2;
}

function phase([re, im]: Complex, angle: number): Complex {
  return [re * Math.cos(angle) - im * Math.sin(angle), re * Math.sin(angle) + im * Math.cos(angle)];
}
