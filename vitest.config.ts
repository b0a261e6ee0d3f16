import { defaultServerConditions } from 'vite';
import { defineConfig } from 'vitest/config';

export default defineConfig({
  // Tests read the TypeScript sources, never a stale build. Only `ssr.resolve` is honoured for Node tests.
  ssr: { resolve: { conditions: ['@tailpair/source', ...defaultServerConditions] } },
  test: {
    include: ['test/**/*.test.ts'],
    testTimeout: 30_000,
  },
});
