// Four projects: node (server, workers, shared), e2e (browser), ui (native render), web (DOM render).
const moduleNameMapper = { '^@/(.*)$': '<rootDir>/$1' };
const esm = ['@tus', 'srvx', 'ml-levenberg-marquardt', 'is-any-array']; // ESM-only, so babel makes them CommonJS
const node = {
  testEnvironment: 'node',
  moduleNameMapper,
  transform: { '\\.[cm]?[jt]sx?$': ['babel-jest', { configFile: false, presets: ['babel-preset-expo'] }] },
  transformIgnorePatterns: [`/node_modules/(?!(${esm.join('|')})/)`],
  globalSetup: '<rootDir>/tests/setup.ts',
  globalTeardown: '<rootDir>/tests/teardown.ts',
};
module.exports = {
  testTimeout: 20000,
  projects: [
    {
      ...node,
      displayName: 'node',
      testMatch: ['<rootDir>/{server,workers,shared,scripts,tests/api}/**/*.test.ts'],
    },
    { ...node, displayName: 'e2e', testMatch: ['<rootDir>/tests/e2e/**/*.test.ts'] },
    {
      preset: 'jest-expo/ios',
      displayName: 'ui',
      moduleNameMapper,
      testMatch: ['<rootDir>/{components,hooks}/**/*.test.tsx'],
      testPathIgnorePatterns: ['/node_modules/', '\\.web\\.test\\.tsx$'],
    },
    {
      preset: 'jest-expo/web',
      displayName: 'web',
      moduleNameMapper,
      testMatch: ['<rootDir>/{components,hooks}/**/*.web.test.tsx'],
    },
  ],
};
