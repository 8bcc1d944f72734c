import { defineConfig } from 'vitest/config';

const shared = {
  resolve: {
    tsconfigPaths: true,
    alias: { 'server-only': new URL('./test/server-only.ts', import.meta.url).pathname },
  },
};

export default defineConfig({
  test: {
    projects: [
      {
        ...shared,
        test: {
          name: 'unit',
          include: ['test/unit/**/*.test.{ts,tsx}'],
          env: { TZ: 'Asia/Kathmandu' },
          // Seconds of work stay seconds; a machine that does three other things needs patience.
          testTimeout: 60_000,
        },
      },
      {
        ...shared,
        test: {
          name: 'reference',
          include: ['test/reference/**/*.test.ts'],
          env: { TZ: 'Asia/Kathmandu' },
          testTimeout: 120_000,
        },
      },
      {
        ...shared,
        test: {
          name: 'integration',
          include: ['test/integration/**/*.test.ts'],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
      {
        ...shared,
        test: {
          name: 'browser',
          include: ['test/browser/**/*.test.ts'],
          testTimeout: 240_000,
          hookTimeout: 300_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
