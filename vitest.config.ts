import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    include: [
      'src-core/**/*.test.ts',
      'schemas/**/*.test.ts',
      'server/**/*.test.ts',
      'client/**/*.test.ts',
      'test/unit/**/*.test.ts',
      'test/preview/**/*.test.ts',
      'test/protocol/**/*.test.ts',
    ],
    globalSetup: ['test/global-setup.ts'],
  },
});
