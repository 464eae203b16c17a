import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    include: [
      'src-core/**/*.test.ts',
      'schemas/**/*.test.ts',
      'server/**/*.test.ts',
      'client/**/*.test.ts',
      'test/unit/**/*.test.ts',
      'test/cli/**/*.test.ts',
      'test/preview/**/*.test.ts',
      'test/protocol/**/*.test.ts',
    ],
    globalSetup: ['test/global-setup.ts'],
    // A ceiling for a loaded machine, not a target.
    testTimeout: 60_000,
    hookTimeout: 60_000,
  },
});
