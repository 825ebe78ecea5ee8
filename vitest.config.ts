import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    include: ['tests/**/*.test.ts'],
    // By default a core is left idle, which on two cores is half of the machine.
    maxWorkers: '100%',
    // Vetting a large functional takes seconds, and two run side by side.
    testTimeout: 120_000,
  },
});
