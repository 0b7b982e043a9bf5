// The store's client would print on every run that it will want a newer Node some day.
process.env.AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED ??= 'true';

// Four projects: node (server, workers, shared, scripts), e2e (browser), ui (native render), web (DOM render).
const moduleNameMapper = { '^@/(.*)$': '<rootDir>/$1' };
const cacheDirectory = '<rootDir>/.cache/jest'; // not the system's temporary folder, which a test run empties
const esm = ['@tus', 'srvx', 'ml-levenberg-marquardt', 'is-any-array']; // ESM-only, so babel makes them CommonJS
const roots = (...folders) => folders.map((folder) => `<rootDir>/${folder}`); // jest then need not crawl packages
const node = {
  testEnvironment: 'node',
  moduleNameMapper,
  cacheDirectory,
  transform: { '\\.[cm]?[jt]sx?$': ['babel-jest', { configFile: false, presets: ['babel-preset-expo'] }] },
  transformIgnorePatterns: [`/node_modules/(?!(${esm.join('|')})/)`],
  setupFiles: ['<rootDir>/tests/fastCheck.ts'],
  globalSetup: '<rootDir>/tests/setup.ts',
  globalTeardown: '<rootDir>/tests/teardown.ts',
};
module.exports = {
  testTimeout: 60000, // met by no test on a quiet machine; others may be at work on this one
  maxWorkers: 2,
  projects: [
    {
      ...node,
      displayName: 'node',
      roots: roots('server', 'workers', 'shared', 'scripts', 'tests'),
      testMatch: ['<rootDir>/{server,workers,shared,scripts,tests/api}/**/*.test.ts'],
    },
    {
      ...node,
      displayName: 'e2e',
      roots: roots('tests'),
      testMatch: ['<rootDir>/tests/e2e/**/*.test.ts'],
    },
    {
      preset: 'jest-expo/ios',
      displayName: 'ui',
      setupFilesAfterEnv: ['<rootDir>/tests/fastCheck.ts'],
      cacheDirectory,
      moduleNameMapper,
      roots: roots('components', 'hooks'),
      testMatch: ['<rootDir>/{components,hooks}/**/*.test.{ts,tsx}'],
      testPathIgnorePatterns: ['/node_modules/', '\\.web\\.test\\.tsx$'],
    },
    {
      preset: 'jest-expo/web',
      displayName: 'web',
      setupFilesAfterEnv: ['<rootDir>/tests/fastCheck.ts'],
      cacheDirectory,
      moduleNameMapper,
      roots: roots('components', 'hooks'),
      testMatch: ['<rootDir>/{components,hooks}/**/*.web.test.tsx'],
    },
  ],
};
