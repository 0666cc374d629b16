import { execFileSync } from 'node:child_process';
import path from 'node:path';

// Measured in a Node of its own: inside the test runner every use of a global such as Math costs a multiple.
const measure = `
  const { computeFigure } = require('./shared/gem/figure');
  const quartz = { kind: 'axial', birefringence: 0.009, thicknessMm: 3, axialAngleDeg: 0, turnDeg: 0, coneDeg: 36, rotationDegPerMm: 21.7, view: 'bisectrix' };
  const times = Array.from({ length: 30 }, () => { const start = performance.now(); computeFigure(quartz, 96); return performance.now() - start; });
  process.stdout.write(String(Math.min(...times)));
`;

it('computes an emblem of 96 pixels in less than 20 ms', () => {
  const root = path.resolve(__dirname, '../../..');
  const best = Number(execFileSync(process.execPath, ['-r', '@swc-node/register', '-e', measure], { cwd: root, encoding: 'utf8' }));
  expect(best).toBeGreaterThan(0);
  expect(best).toBeLessThan(20);
});
