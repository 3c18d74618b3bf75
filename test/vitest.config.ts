import { defineConfig } from 'vitest/config';

export default defineConfig({
  root: new URL('..', import.meta.url).pathname,
  test: {
    include: ['test/**/*.test.ts'],
    environment: 'node',
    testTimeout: 30_000,
    hookTimeout: 60_000,
    reporters: ['default'],
    coverage: { provider: 'v8', include: ['core/**/*.ts'], reportsDirectory: '.build/coverage' },
  },
});
