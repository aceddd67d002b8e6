import reactHooks from 'eslint-plugin-react-hooks'
import tseslint from 'typescript-eslint'

export default tseslint.config(
  { ignores: ['dist', 'data', 'node_modules', 'coverage'] },
  ...tseslint.configs.recommended,
  {
    files: ['**/*.{ts,tsx}'],
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-restricted-properties': [
        'error',
        { object: 'Date', property: 'now', message: 'Time comes from server/clock.ts, or as `now`.' },
      ],
    },
  },
  { files: ['server/clock.ts', 'tests/**', 'src/**'], rules: { 'no-restricted-properties': 'off' } },
  { files: ['src/**/*.{ts,tsx}'], ...reactHooks.configs.flat['recommended'] },
)
