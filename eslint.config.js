const tseslint = require('typescript-eslint');
const imports = require('eslint-plugin-import');
const hooks = require('eslint-plugin-react-hooks');

/** Who may import whom (a folder or a file); what is not listed is refused. Tests may import anything. */
const layers = {
  shared: [],
  hooks: ['shared'],
  components: ['hooks', 'shared', 'fonts', 'assets'],
  app: ['components', 'hooks', 'shared', 'fonts', 'assets'],
  'server/store': ['shared', 'server/config.ts'],
  'server/files': ['shared', 'server/config.ts'],
  'server/mail': ['shared', 'server/config.ts'],
  'server/services': ['server/store', 'server/files', 'server/mail', 'server/config.ts', 'shared'],
  'server/auth': ['server/services', 'server/config.ts', 'shared'],
  'server/routes': ['server/services', 'server/auth', 'server/config.ts', 'shared'],
  workers: ['server/services', 'server/config.ts', 'shared'],
  migrations: [],
};
const folders = [
  'app',
  'components',
  'hooks',
  'shared',
  'server',
  'workers',
  'migrations',
  'scripts',
  'tests',
  'fonts',
  'assets',
];
const zones = Object.entries(layers).flatMap(([layer, allowed]) =>
  folders.flatMap((folder) => {
    const inside = [layer, ...allowed].filter((a) => a === folder || a.startsWith(`${folder}/`));
    if (inside.includes(folder)) return [];
    const except = inside.map((a) => `./${a.slice(folder.length + 1)}`); // relative to "from"
    return [
      {
        target: `./${layer}`,
        from: `./${folder}`,
        except,
        message: `${layer} may import only: ${allowed.join(', ') || 'itself'}.`,
      },
    ];
  }),
);
const pure = {
  patterns: [
    'node:*',
    'react',
    'react-dom',
    'react-native',
    'react-native-*',
    'expo*',
    'express',
    'knex',
    'pg',
    'swr',
  ],
};

module.exports = [
  { ignores: ['node_modules', 'dist*', '.expo', '.cache', 'expo-env.d.ts'] },
  ...tseslint.configs.recommended.map((c) => ({ ...c, files: ['**/*.{ts,tsx}'] })),
  {
    files: ['**/*.{ts,tsx}'],
    plugins: { import: imports },
    settings: { 'import/resolver': { typescript: { project: 'tsconfig.json' } } },
    rules: {
      'import/no-restricted-paths': ['error', { zones }],
      '@typescript-eslint/no-require-imports': 'off',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
    },
  },
  {
    files: ['{app,components,hooks}/**/*.{ts,tsx}'],
    plugins: { 'react-hooks': hooks },
    rules: { 'react-hooks/rules-of-hooks': 'error', 'react-hooks/exhaustive-deps': 'error' },
  },
  {
    files: ['shared/**/*.ts'],
    ignores: ['**/*.test.ts'],
    rules: {
      'no-restricted-globals': [
        'error',
        'window',
        'document',
        'process',
        'Buffer',
        'fetch',
        'require',
        'localStorage',
      ],
      'no-restricted-imports': ['error', pure],
    },
  },
  {
    files: ['**/*.{ts,tsx}'],
    ignores: ['**/*.test.{ts,tsx}'],
    rules: { 'max-lines': ['error', { max: 300, skipBlankLines: true }] },
  },
  {
    files: ['server/**/*.ts', 'workers/**/*.ts'],
    ignores: ['server/config.ts', '**/*.test.ts'],
    rules: {
      'no-restricted-properties': [
        'error',
        { object: 'process', property: 'env', message: 'Only server/config.ts reads the environment.' },
      ],
    },
  },
  { files: ['**/*.test.{ts,tsx}'], rules: { 'import/no-restricted-paths': 'off' } },
  { files: ['**/*.{js,mjs}'], rules: { 'no-unused-vars': ['error', { argsIgnorePattern: '^_' }] } },
];
