import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    root: new URL('..', import.meta.url).pathname,
    include: ['tests/**/*.test.ts'],
    exclude: ['tests/editor/**', 'tests/fuzz/long/**'],
    globalSetup: ['tests/support/build.ts'],
    testTimeout: 60_000,
    hookTimeout: 60_000,
    reporters: ['default', 'json'],
    outputFile: { json: '.cache/tests.json' },
  },
});
