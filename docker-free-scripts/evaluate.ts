/**
 * How good the verdicts are, on simulated returns that are not drawn from the engine's own model.
 * `npm run evaluate -- [--returns 10000] [--seed 1] [--json figures.json]`; `--returns` counts per kind and demo set.
 */
import { writeFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { DEMO_SETS } from '../tests/evaluation/demoSets';
import { describeFigures, figuresOf, pool, simulateAll } from '../tests/evaluation/report';
import { DEFAULT_WORLD } from '../tests/evaluation/world';

const { values } = parseArgs({ options: { returns: { type: 'string', default: '10000' }, seed: { type: 'string', default: '1' }, json: { type: 'string' } } });
const returns = Number(values.returns);
const seed = Number(values.seed);
if (!Number.isInteger(returns) || returns < 1 || !Number.isInteger(seed)) {
  console.error('--returns takes a whole number from 1, --seed a whole number.');
  process.exit(2);
}

console.log(`seed ${String(seed)}; weight to 0.01 ct (u 0.006), calipers to 0.01 mm (u 0.014), polariscope; depth of cut spread 6 %\n`);
const results = DEMO_SETS.map((set) => {
  const result = simulateAll(set, returns, seed, DEFAULT_WORLD);
  console.log(`${describeFigures(figuresOf(set.name, result))}\n`);
  return result;
});
const all = figuresOf('all sets', pool(results));
console.log(describeFigures(all));
if (values.json !== undefined) {
  const sets = DEMO_SETS.map((set, i) => figuresOf(set.name, results[i] ?? pool([])));
  writeFileSync(values.json, `${JSON.stringify({ seed, world: DEFAULT_WORLD, all, sets }, null, 2)}\n`);
}
