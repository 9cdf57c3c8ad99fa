import next from 'eslint-config-next';
import tseslint from 'typescript-eslint';

/** Import direction: stats, shared <- trees, position <- schema <- checks <- sync <- client | server <- app. */
const directions = [
  { from: ['lib/stats', 'lib/shared'], deny: ['trees', 'position', 'schema', 'checks', 'sync', 'client', 'server', 'cli'] },
  { from: ['lib/trees', 'lib/position'], deny: ['schema', 'checks', 'sync', 'client', 'server', 'cli'] },
  { from: ['lib/schema'], deny: ['checks', 'sync', 'client', 'server', 'cli'] },
  { from: ['lib/checks'], deny: ['sync', 'client', 'server', 'cli'] },
  { from: ['lib/sync'], deny: ['client', 'server', 'cli'] },
  { from: ['lib/client'], deny: ['server', 'cli'], alsoModels: true },
  { from: ['lib/server'], deny: ['client', 'cli'] },
  { from: ['models'], deny: ['checks', 'sync', 'client', 'server', 'cli'] },
  { from: ['components'], deny: ['client', 'server', 'cli'], alsoModels: true },
];

export default tseslint.config(
  { ignores: ['node_modules/**', '.next/**', '.data/**', '.test-data/**', 'public/**', 'next-env.d.ts', '**/*.mjs'] },
  ...next,
  ...tseslint.configs.strict,
  {
    files: ['**/*.ts', '**/*.tsx'],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/switch-exhaustiveness-check': ['error', { considerDefaultExhaustiveForUnions: true }],
      '@typescript-eslint/require-array-sort-compare': 'error',
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/no-non-null-assertion': 'off',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/no-invalid-void-type': 'off',
    },
  },
  ...directions.map(({ from, deny, alsoModels }) => ({
    files: from.map((folder) => `${folder}/**/*.{ts,tsx}`),
    rules: {
      'no-restricted-imports': ['error', {
        patterns: [
          { group: deny.flatMap((name) => [`@/lib/${name}`, `@/lib/${name}/**`]), message: 'This import runs against the import direction (see DEVELOPERS.md).' },
          ...(alsoModels ? [{ group: ['@/models', '@/models/**'], message: 'The browser never imports the database.' }] : []),
        ],
      }],
    },
  })),
);
