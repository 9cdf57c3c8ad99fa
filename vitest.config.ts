import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const root = path.dirname(fileURLToPath(import.meta.url));
const serverOnly = path.join(root, 'tests/support/empty-module.ts');
const alias = { '@': root, 'server-only': serverOnly, 'client-only': serverOnly };
const env = { TZ: 'UTC', NODE_ENV: 'test' } as const;

export default defineConfig({
  resolve: { alias },
  test: {
    env,
    projects: [
      {
        resolve: { alias },
        test: { name: 'unit', env, include: ['tests/{lib,contracts,arch,seeders}/**/*.test.{ts,tsx}'], exclude: ['tests/lib/server/**'] },
      },
      {
        resolve: { alias },
        test: {
          name: 'integration', env, include: ['tests/integration/**/*.test.ts', 'tests/lib/server/**/*.test.ts'],
          testTimeout: 60_000, hookTimeout: 120_000, pool: 'forks',
        },
      },
      {
        resolve: { alias },
        test: {
          name: 'browser', env, include: ['tests/e2e/**/*.test.ts'],
          testTimeout: 600_000, hookTimeout: 600_000, pool: 'forks', fileParallelism: false,
        },
      },
    ],
  },
});
