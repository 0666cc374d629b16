import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';
import { inRoot, root } from './paths.mjs';
import { ensureDebian, has } from './packages.mjs';
import { postgresBinaries } from './postgres.mjs';
import { PlainError } from './say.mjs';

const bin = (name) => inRoot('node_modules', '.bin', name);

/** What the kinds need beyond npm packages, by Debian package. */
const debian = {
  postgresql: () => postgresBinaries() !== undefined,
  chromium: () => existsSync(process.env.CHROMIUM_PATH ?? '/usr/bin/chromium'),
  ffmpeg: () => has('ffmpeg'),
  'poppler-utils': () => has('pdftoppm'),
  'zbar-tools': () => has('zbarimg'),
};
const needs = (...names) => Object.fromEntries(names.map((name) => [name, debian[name]]));
const everything = needs(...Object.keys(debian));

/** Every kind of check, in the order `npm test` runs them: the quick and the telling first. `bench` runs only when asked for. */
export const kinds = {
  types: { run: () => asOne('types', [[bin('expo'), ['customize', 'tsconfig.json']], [bin('tsc'), ['--noEmit', '-p', 'tsconfig.json']]]) },
  // Without eslint's cache: a change of one file's types changes what the rules say about others, which a cache by file cannot see.
  lint: { run: () => asOne('lint', [[bin('eslint'), ['.', '--max-warnings', '0']]]) },
  unit: { run: () => jest('unit') },
  property: { run: () => jest('property') },
  web: { run: () => jest('web') },
  integration: { needs: needs('postgresql', 'poppler-utils', 'zbar-tools'), run: () => jest('integration') },
  faults: { needs: needs('postgresql'), run: () => jest('faults') },
  e2e: { needs: everything, run: () => jest('e2e', ['--runInBand']) },
  bench: { needs: everything, run: () => jest('bench', ['--runInBand']), onlyWhenAsked: true },
};

export function kindNamed(name) {
  if (!Object.hasOwn(kinds, name)) throw new PlainError(`Say which kind: npm run check -- <${Object.keys(kinds).join(' | ')}>`);
  return kinds[name];
}

/** Runs one kind; what it needs is installed first. Returns { passed, failed }; a run that breaks off counts as one failure. */
export async function runKind(name) {
  const kind = kindNamed(name);
  ensureDebian(kind.needs ?? {});
  return kind.run();
}

/** Commands that either all succeed or fail as one check. */
async function asOne(name, commands) {
  for (const [file, args] of commands) {
    if ((await command(file, args)) !== 0) return { passed: 0, failed: 1, names: [name] };
  }
  return { passed: 1, failed: 0, names: [] };
}

async function jest(project, args = []) {
  const results = inRoot('test-results', `${project}.json`);
  mkdirSync(inRoot('test-results'), { recursive: true });
  rmSync(results, { force: true });
  const code = await command(bin('jest'), ['--selectProjects', project, '--json', `--outputFile=${results}`, ...args], { quietOut: true });
  return count(project, code, results);
}

/** A test file that cannot even be loaded has no tests to count; it counts as one that failed. */
function count(project, code, file) {
  if (!existsSync(file)) return { passed: 0, failed: 1, names: [`${project}: the run broke off`] };
  const report = JSON.parse(readFileSync(file, 'utf8'));
  const failed = report.numFailedTests + report.numRuntimeErrorTestSuites;
  const names = report.testResults.filter((suite) => suite.status === 'failed').map((suite) => suite.name.replace(`${root}/`, ''));
  if (code !== 0 && failed === 0) return { passed: report.numPassedTests, failed: 1, names: [`${project}: jest ended with code ${code}`] };
  return { passed: report.numPassedTests, failed, names };
}

/** Runs a command with its output on the terminal. `quietOut` drops its standard output (jest reports on standard error). */
function command(file, args, { quietOut = false } = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(file, args, { cwd: root, stdio: ['ignore', quietOut ? 'ignore' : 'inherit', 'inherit'], env: { ...process.env, EXPO_OFFLINE: '1', EXPO_NO_TELEMETRY: '1' } });
    child.once('error', reject);
    child.once('exit', (code, signal) => resolve(signal ? 1 : code));
  });
}
