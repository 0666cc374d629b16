// One configuration, one project per kind of test. `npx jest tests/integration/loans.test.ts` runs one file;
// `npm run check -- integration` runs one kind.

const aliases = { '^@/(.*)$': '<rootDir>/$1', '^@shared/(.*)$': '<rootDir>/shared/$1' };

/** A project that runs in plain Node, compiled by swc with the root's .swcrc (decorator metadata included). */
function nodeProject(kind, extra = {}) {
  return {
    displayName: kind,
    testMatch: [`<rootDir>/tests/${kind}/**/*.test.ts`],
    testEnvironment: 'node',
    transform: { '^.+\\.ts$': ['@swc/jest'] },
    moduleFileExtensions: ['ts', 'js', 'cjs', 'mjs', 'json', 'node'],
    moduleNameMapper: aliases,
    modulePathIgnorePatterns: ['<rootDir>/dist', '<rootDir>/.trayward'],
    ...extra,
  };
}

/** These kinds work on real databases, cloned from a migrated template in a cluster shared by the run. */
const withDatabases = {
  globalSetup: '<rootDir>/tests/support/clusterSetup.ts',
  globalTeardown: '<rootDir>/tests/support/clusterTeardown.ts',
};

// Its watch plug-ins belong to the whole run, not to a project; jest warns about them.
const { watchPlugins: _watchPlugins, ...webPreset } = require('jest-expo/web/jest-preset');

module.exports = {
  // A stack in Chromium or a cold template takes seconds, not milliseconds; a pure test that needs this long shows in the report anyway.
  testTimeout: 60_000,
  maxWorkers: 2,
  projects: [
    nodeProject('unit'),
    nodeProject('property', { setupFiles: ['<rootDir>/tests/support/propertySeed.ts'] }),
    nodeProject('integration', withDatabases),
    nodeProject('faults', withDatabases),
    nodeProject('e2e', withDatabases),
    nodeProject('bench', withDatabases),
    {
      ...webPreset,
      displayName: 'web',
      testMatch: ['<rootDir>/tests/web/**/*.test.ts?(x)'],
      // d3 is published as ES modules; each package also carries a build that Node can require.
      moduleNameMapper: { ...webPreset.moduleNameMapper, ...aliases, '^(d3-[a-z-]+)$': '<rootDir>/node_modules/$1/dist/$1.js' },
      modulePathIgnorePatterns: ['<rootDir>/dist', '<rootDir>/.trayward'],
      setupFiles: [...(webPreset.setupFiles ?? []), '<rootDir>/tests/support/web/stubs.ts'],
      setupFilesAfterEnv: [...(webPreset.setupFilesAfterEnv ?? []), '<rootDir>/tests/support/web/matchers.ts'],
    },
  ],
};
