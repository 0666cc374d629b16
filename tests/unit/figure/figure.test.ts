import { computeFigure, type AxialFigure, type FigureParameters } from '@shared/gem/figure';

const size = 121;
const beryl: AxialFigure = { kind: 'axial', birefringence: 0.006, thicknessMm: 3, axialAngleDeg: 0, turnDeg: 0, coneDeg: 36, rotationDegPerMm: 0, view: 'bisectrix' };
const quartz: AxialFigure = { ...beryl, birefringence: 0.009, rotationDegPerMm: 21.7 };
const topaz: AxialFigure = { ...beryl, birefringence: 0.009, thicknessMm: 1, axialAngleDeg: 60, coneDeg: 48, turnDeg: 45 };

describe('the figure of a uniaxial stone', () => {
  const at = sampler(beryl);

  it('has its dark cross along the polars', () => {
    for (const r of [0.15, 0.35, 0.6, 0.85]) {
      for (const [x, y] of [[r, 0], [-r, 0], [0, r], [0, -r]] as const) expect(at(x, y)).toBeLessThan(12);
    }
  });

  it('is light between the arms of the cross', () => {
    expect(at(0.6, 0.6)).toBeGreaterThan(120);
    expect(at(-0.6, 0.6)).toBeGreaterThan(120);
  });

  it('is dark at the centre and looks the same after a quarter turn', () => {
    expect(at(0, 0)).toBeLessThan(12);
    const turned = sampler({ ...beryl, turnDeg: 90 });
    for (const [x, y] of [[0.3, 0.2], [-0.5, 0.4]] as const) expect(turned(x, y)).toBe(at(x, y));
  });

  // First red ring at Γ = t·Δn·sin²θ ≈ 551 nm (sensitive tint; from memory): its radius follows from the cone.
  it('has its first red ring where the retardation is one order', () => {
    const sine = Math.sqrt(551e-6 / (3 * 0.006));
    const radius = sine / Math.sin((36 * Math.PI) / 180) / Math.SQRT2;
    const [r, g, b] = pixel(beryl, radius, radius);
    expect(Math.max(r, b)).toBeGreaterThan(g + 60);
  });

  it('has more rings in a thicker stone', () => {
    expect(turningPoints({ ...beryl, thicknessMm: 3 })).toBeGreaterThan(turningPoints({ ...beryl, thicknessMm: 1 }));
  });
});

describe('the figure of quartz', () => {
  it('stops its cross short of a bright, coloured centre', () => {
    const at = sampler(quartz);
    expect(at(0, 0)).toBeGreaterThan(120);
    expect(at(0.85, 0)).toBeLessThan(40);
  });

  it('has a centre that grows lighter from a thin piece to 4 mm', () => {
    const centres = [0.5, 1, 2, 3, 4].map((thicknessMm) => sampler({ ...quartz, thicknessMm })(0, 0));
    expect([...centres].sort((a, b) => a - b).slice(0, 3)).toEqual(centres.slice(0, 3));
    expect(centres[0]).toBeLessThan(80);
  });
});

describe('the figure of a biaxial stone', () => {
  it('has dark melatopes at half the axial angle', () => {
    // Orthographic projection of the cone: an axis at V from the centre lies at sin V / sin cone.
    const radius = Math.sin(Math.PI / 6) / Math.sin((48 * Math.PI) / 180) / Math.SQRT2;
    expect(darkestNear(topaz, radius, radius)).toBeLessThan(40);
    expect(darkestNear(topaz, -radius, -radius)).toBeLessThan(40);
    expect(darkestNear(topaz, radius, -radius)).toBeGreaterThan(60);
  });

  it('parts its brushes at 45 degrees and joins them to a cross at 0', () => {
    expect(sampler(topaz)(0, 0)).toBeGreaterThan(60);
    const joined = sampler({ ...topaz, turnDeg: 0 });
    for (const r of [0, 0.3, 0.8]) {
      expect(joined(r, 0)).toBeLessThan(12);
      expect(joined(0, r)).toBeLessThan(12);
    }
  });

  it('becomes uniaxial as its axes come together', () => {
    const [near, one] = [sampler({ ...beryl, axialAngleDeg: 0.01 }), sampler(beryl)];
    for (const [x, y] of [[0.4, 0.4], [0.2, 0.6]] as const) expect(Math.abs(near(x, y) - one(x, y))).toBeLessThanOrEqual(2);
  });

  it('shows one brush through the centre when seen along an axis', () => {
    const at = sampler({ ...topaz, axialAngleDeg: 88, view: 'axis' });
    expect(darkestNear({ ...topaz, axialAngleDeg: 88, view: 'axis' }, 0, 0)).toBeLessThan(40);
    expect(at(0.5, -0.5)).toBeLessThan(60);
    expect(at(0.5, 0.1)).toBeGreaterThan(60);
  });
});

describe('stones without a figure', () => {
  it('stay dark when singly refractive', () => {
    const picture = computeFigure({ kind: 'dark' }, 32);
    for (let at = 0; at < picture.length; at += 4) expect([picture[at], picture[at + 1], picture[at + 2]]).toEqual([0, 0, 0]);
  });

  it('show dark lines and low colours when strained', () => {
    const values = allOf({ kind: 'strain', pattern: 'bands', seed: 3 });
    expect(share(values, (value) => value < 20)).toBeGreaterThan(0.02);
    expect(share(values, (value) => value > 120)).toBeGreaterThan(0.1);
  });

  it('never go dark as an aggregate', () => {
    const values = allOf({ kind: 'aggregate', seed: 2 });
    expect(share(values, (value) => value < 40)).toBe(0);
  });

  it('always show the same texture for the same stone', () => {
    const strain: FigureParameters = { kind: 'strain', pattern: 'tabby', seed: 9 };
    expect(computeFigure(strain, 40)).toEqual(computeFigure(strain, 40));
    expect(computeFigure(strain, 40)).not.toEqual(computeFigure({ ...strain, seed: 10 }, 40));
  });
});

describe('a computed picture', () => {
  it('is a disc: clear outside, opaque inside', () => {
    const picture = computeFigure(beryl, 40);
    expect(picture[3]).toBe(0);
    expect(picture[4 * (20 * 40 + 20) + 3]).toBe(255);
  });

  it.each([0, 1.5, 4000, Number.NaN])('is refused at %d pixels', (pixels) => {
    expect(() => computeFigure(beryl, pixels)).toThrow(RangeError);
  });

  it.each<[string, Partial<AxialFigure>]>([
    ['a negative birefringence', { birefringence: -0.1 }],
    ['no thickness', { thicknessMm: 0 }],
    ['an axial angle over 90', { axialAngleDeg: 91 }],
    ['a turn that is no number', { turnDeg: Number.NaN }],
    ['a cone wider than the sky', { coneDeg: 90 }],
  ])('is refused for %s', (_, wrong) => {
    expect(() => computeFigure({ ...beryl, ...wrong }, 20)).toThrow(RangeError);
  });
});

/** Brightness 0…255 (mean of the channels) at a place of the field, −1 to 1, y upwards. */
function sampler(parameters: FigureParameters): (x: number, y: number) => number {
  const picture = computeFigure(parameters, size);
  return (x, y) => {
    const at = 4 * (Math.round(((1 - y) * (size - 1)) / 2) * size + Math.round(((1 + x) * (size - 1)) / 2));
    return (picture[at]! + picture[at + 1]! + picture[at + 2]!) / 3;
  };
}

function pixel(parameters: FigureParameters, x: number, y: number): [number, number, number] {
  const picture = computeFigure(parameters, size);
  const at = 4 * (Math.round(((1 - y) * (size - 1)) / 2) * size + Math.round(((1 + x) * (size - 1)) / 2));
  return [picture[at]!, picture[at + 1]!, picture[at + 2]!];
}

/** The darkest place within a hundredth of the field, in a picture fine enough to resolve a melatope. */
function darkestNear(parameters: FigureParameters, x: number, y: number): number {
  const fine = 301;
  const picture = computeFigure(parameters, fine);
  const [column, row] = [Math.round(((1 + x) * (fine - 1)) / 2), Math.round(((1 - y) * (fine - 1)) / 2)];
  let darkest = 255;
  for (let dy = -2; dy <= 2; dy++) {
    for (let dx = -2; dx <= 2; dx++) {
      const at = 4 * ((row + dy) * fine + column + dx);
      darkest = Math.min(darkest, (picture[at]! + picture[at + 1]! + picture[at + 2]!) / 3);
    }
  }
  return darkest;
}

/** How often the brightness turns between the centre and the edge, along the diagonal. */
function turningPoints(parameters: FigureParameters): number {
  const at = sampler(parameters);
  const line = Array.from({ length: 40 }, (_, step) => at((step / 40) * 0.7, (step / 40) * 0.7));
  return line.filter((value, index) => index > 0 && index < 39 && (value - line[index - 1]!) * (line[index + 1]! - value) < 0).length;
}

function allOf(parameters: FigureParameters): number[] {
  const at = sampler(parameters);
  const values: number[] = [];
  for (let x = -0.65; x <= 0.65; x += 0.03) for (let y = -0.65; y <= 0.65; y += 0.03) values.push(at(x, y));
  return values;
}

function share(values: readonly number[], holds: (value: number) => boolean): number {
  return values.filter(holds).length / values.length;
}
