import nextCoreWebVitals from 'eslint-config-next/core-web-vitals'
import tseslint from 'typescript-eslint'

const typed = ['**/*.ts', '**/*.tsx']

export default tseslint.config(
  { ignores: ['.next/**', '.data/**', 'node_modules/**', 'next-env.d.ts', 'test-results/**'] },
  ...nextCoreWebVitals,
  {
    files: typed,
    extends: [...tseslint.configs.strict],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    linterOptions: { reportUnusedDisableDirectives: 'error' },
    rules: {
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: { attributes: false } }],
      '@typescript-eslint/switch-exhaustiveness-check': [
        'error',
        { considerDefaultExhaustiveForUnions: true },
      ],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-console': 'error',
      // An apostrophe in a sentence is an apostrophe; a module is a part of a car; a full load after a change of
      // person is deliberate.
      'react/no-unescaped-entities': 'off',
      '@next/next/no-assign-module-variable': 'off',
      '@next/next/no-location-assign-relative-destination': 'off',
      'import/no-default-export': 'error',
    },
  },
  {
    // Numerical code indexes arrays whose lengths it made itself; tests fail anyway where nothing is.
    files: ['diagrams/**', 'tests/**'],
    rules: { '@typescript-eslint/no-non-null-assertion': 'off' },
  },
  {
    // The environment is read and parsed in one file.
    files: ['app/**', 'components/**', 'lib/**', 'db/**', 'diagrams/**', 'migrations/**'],
    ignores: ['lib/server/env.ts'],
    rules: {
      'no-restricted-properties': [
        'error',
        { object: 'process', property: 'env', message: 'Read lib/server/env.ts instead.' },
      ],
    },
  },
  {
    // Which modes a site has, the document has checked: switches over them end in a thrown error.
    files: ['diagrams/**', 'tests/**'],
    rules: { '@typescript-eslint/switch-exhaustiveness-check': 'off' },
  },
  {
    // Answers of the product are read as they come, and `use…` is a word like any other.
    files: ['tests/**/*.ts'],
    rules: { '@typescript-eslint/no-explicit-any': 'off', 'react-hooks/rules-of-hooks': 'off' },
  },
  {
    // Programs speak to a terminal.
    files: ['scripts/**', 'tests/**'],
    rules: { 'no-console': 'off' },
  },
  {
    // Where a framework demands a default export.
    files: [
      'app/**/{page,layout,loading,error,not-found,template,default,global-error,manifest,icon,robots}.{ts,tsx}',
      'app/{global-error,not-found}.tsx',
      'proxy.ts',
      '*.config.{ts,mjs}',
      'tests/support/stop-test-cluster.ts',
    ],
    rules: { 'import/no-default-export': 'off' },
  },
)
