import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

export default defineConfig({
  resolve: {
    // The examples in the documentation import the package by its name; here they run against the sources.
    alias: [
      { find: /^leadline$/, replacement: fileURLToPath(new URL('src/index.ts', import.meta.url)) },
      {
        find: /^leadline\/conformance$/,
        replacement: fileURLToPath(new URL('src/conformance/index.ts', import.meta.url)),
      },
      {
        find: /^leadline\/numeric$/,
        replacement: fileURLToPath(new URL('src/numeric/index.ts', import.meta.url)),
      },
    ],
  },
  test: {
    include: ['test/**/*.test.ts'],
    // Statistical tests and training runs share two cores with each other; the limit is there to catch a hang.
    testTimeout: 240_000,
    hookTimeout: 480_000,
    maxWorkers: 2,
    // A test left focused would silence all others in its file.
    allowOnly: false,
  },
});
