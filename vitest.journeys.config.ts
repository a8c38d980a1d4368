import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    include: ['tests/journeys/**/*.journey.ts'],
    fileParallelism: false,
    testTimeout: 180_000,
    hookTimeout: 180_000,
  },
});
