import { defineConfig, globalIgnores } from 'eslint/config';
import tseslint from 'typescript-eslint';
import reactHooks from 'eslint-plugin-react-hooks';
import reactRefresh from 'eslint-plugin-react-refresh';

/** Folders that files under `from` may not import; the arrows of DEVELOPERS.md, kept by the linter. */
const boundary = (files, forbidden) => ({
  files,
  rules: {
    'no-restricted-imports': [
      'error',
      {
        patterns: forbidden.map(([group, message]) => ({ group, message })),
      },
    ],
  },
});

export default defineConfig([
  globalIgnores(['dist', '.data', 'node_modules', 'db/migrations']),
  {
    files: ['**/*.{ts,tsx}'],
    extends: [tseslint.configs.recommendedTypeChecked],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/no-misused-promises': [
        'error',
        { checksVoidReturn: { arguments: false, attributes: false } },
      ],
      '@typescript-eslint/consistent-type-imports': 'error',
      eqeqeq: 'error',
    },
  },
  {
    files: ['client/**/*.{ts,tsx}'],
    extends: [reactHooks.configs.flat.recommended, reactRefresh.configs.vite],
    rules: { 'react-hooks/incompatible-library': 'off' },
  },
  boundary(
    ['client/**/*.{ts,tsx}'],
    [
      [['**/server/**', '**/db/**', '**/seed/**', '**/tests/**'], 'client imports shared/ only'],
    ],
  ),
  boundary(
    ['client/pages/**/*.{ts,tsx}'],
    [
      [['**/server/**', '**/db/**', '**/seed/**', '**/tests/**'], 'client imports shared/ only'],
      [['../[a-z]*/**'], 'a page never imports the folder of another page'],
    ],
  ),
  boundary(
    ['client/charts/**/*.{ts,tsx}'],
    [
      [['**/server/**', '**/db/**', '**/seed/**', '**/tests/**'], 'client imports shared/ only'],
      [['**/api/**', '**/pages/**'], 'a chart gets data and draws it; it does not fetch'],
    ],
  ),
  boundary(
    ['shared/**/*.ts'],
    [[['**/client/**', '**/server/**', '**/db/**', '**/tests/**', '**/seed/**'], 'shared imports nothing outside itself']],
  ),
  boundary(
    ['server/engine/**/*.ts'],
    [
      [['**/db/**', '**/services/**', '**/routes/**', '**/jobs/**', '**/adapters/**', '**/formats/**'], 'the engine imports shared/astro only'],
      [['express', 'pg', 'drizzle-orm', 'drizzle-orm/*'], 'the engine knows neither HTTP nor SQL'],
    ],
  ),
  boundary(
    ['server/services/**/*.ts'],
    [
      [['**/routes/**', '**/jobs/**', '**/middleware/**'], 'services know nothing of HTTP or of the queue workers'],
      [['express'], 'services know nothing of HTTP'],
    ],
  ),
  boundary(
    ['server/routes/**/*.ts'],
    [
      [['**/engine/**', '**/jobs/**'], 'a route calls one service'],
      [['drizzle-orm', 'drizzle-orm/*', 'pg'], 'no SQL in routes'],
    ],
  ),
  boundary(
    ['server/jobs/**/*.ts'],
    [[['**/routes/**', '**/engine/**', '**/middleware/**'], 'a job is a thin call of a service']],
  ),
  boundary(
    ['db/**/*.ts'],
    [[['**/client/**', '**/server/**', '**/tests/**', '**/seed/**'], 'db imports shared/words only']],
  ),
]);
