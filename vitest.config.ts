import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    projects: [
      {
        test: {
          name: 'unit',
          include: ['test/{engine,contract,formats,models,house,src,published,queue}/**/*.test.ts'],
          testTimeout: 120_000,
          sequence: { groupOrder: 0 },
        },
      },
      {
        test: {
          name: 'reference',
          include: ['test/reference/**/*.test.ts'],
          testTimeout: 300_000,
          sequence: { groupOrder: 0 },
        },
      },
      {
        // These start servers and workers of their own and kill them: one file at a time, so that
        // none of them waits for the processor of another.
        test: {
          name: 'api',
          include: ['test/{server,db,jobs}/**/*.test.ts'],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          pool: 'forks',
          maxWorkers: 1,
          sequence: { groupOrder: 1 },
        },
      },
    ],
  },
});
