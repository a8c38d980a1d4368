import { defineConfig } from 'vitest/config';

/** Not a test run: takes the pictures of every screen into docs/screens. */
export default defineConfig({
  test: {
    include: ['tests/journeys/support/take-screens.ts'],
    testTimeout: 600_000,
    hookTimeout: 180_000,
  },
});
