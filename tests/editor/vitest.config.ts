import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    root: new URL('../..', import.meta.url).pathname,
    include: ['tests/editor/**/*.test.ts'],
    globalSetup: ['tests/editor/setup.ts'],
    fileParallelism: false,
    testTimeout: 150_000,
    hookTimeout: 180_000,
    // A browser under load draws when it likes; what fails three times running is wrong.
    retry: 2,
    reporters: ['default', 'json'],
    outputFile: { json: '.cache/editor-tests.json' },
  },
});
