import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

export default defineConfig({
  root: fileURLToPath(new URL('../..', import.meta.url)),
  test: {
    include: ['test/**/*.test.ts'],
    testTimeout: 120_000,
    hookTimeout: 120_000,
    reporters: process.env['CI']
      ? [
          ['default', { summary: false }],
          ['json', { outputFile: '.test-results/vitest.json' }],
        ]
      : ['default'],
    coverage: { include: ['src/**/*.ts'], exclude: ['**/*.d.ts'] },
  },
});
