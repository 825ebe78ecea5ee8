import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    include: ['tests/**/*.test.ts'],
    // Vetting a large functional takes seconds, and two run side by side.
    testTimeout: 120_000,
  },
});
