import tseslint from 'typescript-eslint';

const top = new URL('../..', import.meta.url).pathname;
const worldBans = [
  { object: 'Date', property: 'now', message: 'core has no clock: take the time as an argument' },
  { object: 'Math', property: 'random', message: 'core has no chance: take the generator as an argument' },
];

export default tseslint.config(
  { ignores: ['.build/**', 'node_modules/**', 'test/house/directions.cjs', '**/*.d.ts'] },
  {
    files: ['**/*.ts'],
    extends: [tseslint.configs.recommendedTypeChecked],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: top } },
    rules: {
      'max-lines': ['error', { max: 250, skipBlankLines: true, skipComments: true }],
      'max-params': ['error', 6],
      'no-console': 'error',
      eqeqeq: 'error',
      'no-restricted-syntax': [
        'error',
        { selector: 'ExportAllDeclaration', message: 'name each export' },
        { selector: 'TSEnumDeclaration', message: 'use a union' },
      ],
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/explicit-module-boundary-types': 'error',
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-non-null-assertion': 'error',
      '@typescript-eslint/switch-exhaustiveness-check': ['error', { considerDefaultExhaustiveForUnions: true }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true }],
    },
  },
  {
    files: ['core/**/*.ts'],
    rules: {
      'no-restricted-properties': ['error', ...worldBans],
      'no-restricted-globals': ['error', 'setTimeout', 'setInterval', 'console', 'process', 'fetch', 'performance', 'crypto'],
    },
  },
  {
    files: ['test/**/*.ts'],
    rules: {
      'max-lines': ['error', { max: 450, skipBlankLines: true, skipComments: true }],
      '@typescript-eslint/no-non-null-assertion': 'off',
      'no-console': 'off',
    },
  },
);
