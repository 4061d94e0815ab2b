import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    projects: [
      {
        test: {
          name: 'unit',
          include: ['test/{engine,contract,formats,house,src,published,queue}/**/*.test.ts'],
          testTimeout: 60_000,
        },
      },
      {
        test: {
          name: 'reference',
          include: ['test/reference/**/*.test.ts'],
          testTimeout: 300_000,
        },
      },
      {
        test: {
          name: 'api',
          include: ['test/{server,db,jobs}/**/*.test.ts'],
          testTimeout: 60_000,
          hookTimeout: 60_000,
          pool: 'forks',
        },
      },
    ],
  },
});
