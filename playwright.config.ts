import { defineConfig } from '@playwright/test';

const port = process.env.HEDDLE_E2E_PORT ?? '8790';
const baseURL = `http://127.0.0.1:${port}`;

export default defineConfig({
  testDir: 'e2e',
  outputDir: 'test-results',
  timeout: 120_000,
  expect: { timeout: 20_000 },
  // One house serves all tests; the first journey needs it empty.
  workers: 1,
  fullyParallel: false,
  forbidOnly: true,
  use: {
    baseURL,
    locale: 'en-GB',
    timezoneId: 'UTC',
    screenshot: 'only-on-failure',
    launchOptions: {
      executablePath: '/usr/bin/chromium',
      args: [
        '--no-sandbox',
        '--disable-gpu',
        '--disable-quic',
        '--no-first-run',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
      ],
    },
  },
  projects: [
    { name: 'empty instance', testMatch: 'firstJourney.spec.ts' },
    {
      name: 'shared instance',
      testIgnore: 'firstJourney.spec.ts',
      dependencies: ['empty instance'],
    },
  ],
  webServer: {
    command: 'node e2e/serve.mjs',
    url: `${baseURL}/health`,
    timeout: 60_000,
    gracefulShutdown: { signal: 'SIGTERM', timeout: 30_000 },
    env: { PORT: port },
    stdout: 'pipe',
  },
});
