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
      eqeqeq: ['error', 'always'],
      'no-console': 'error',
      'import/no-default-export': 'error',
    },
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
