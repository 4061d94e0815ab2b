import { test as base, expect, type PlaywrightWorkerArgs } from '@playwright/test';
import { House } from './house';
import { BandPart } from './pages/BandPart';
import { BenchPage } from './pages/BenchPage';
import { DatasetPage } from './pages/DatasetPage';
import { GrowPage } from './pages/GrowPage';
import { ImportPage } from './pages/ImportPage';
import { SignInPage } from './pages/SignInPage';
import { SignUpPage } from './pages/SignUpPage';
import { UploadPage } from './pages/UploadPage';
import { WorkspacePage } from './pages/WorkspacePage';

interface Fixtures {
  band: BandPart;
  signInPage: SignInPage;
  signUpPage: SignUpPage;
  workspacePage: WorkspacePage;
  uploadPage: UploadPage;
  datasetPage: DatasetPage;
  benchPage: BenchPage;
  importPage: ImportPage;
  growPage: GrowPage;
  /** Another browser-less session, for preparing what the test does not show. */
  house: House;
  /** One more session, of somebody else. */
  otherHouse: House;
  /** Fails the test if the page throws, or if the content policy blocks anything. */
  quietPage: void;
}

async function withHouse(
  playwright: PlaywrightWorkerArgs['playwright'],
  baseURL: string | undefined,
  use: (house: House) => Promise<void>,
): Promise<void> {
  const request = await playwright.request.newContext({
    baseURL,
    extraHTTPHeaders: { origin: baseURL ?? '' },
  });
  await use(new House(request));
  await request.dispose();
}

export const test = base.extend<Fixtures>({
  band: async ({ page }, use) => use(new BandPart(page)),
  signInPage: async ({ page }, use) => use(new SignInPage(page)),
  signUpPage: async ({ page }, use) => use(new SignUpPage(page)),
  workspacePage: async ({ page }, use) => use(new WorkspacePage(page)),
  uploadPage: async ({ page }, use) => use(new UploadPage(page)),
  datasetPage: async ({ page }, use) => use(new DatasetPage(page)),
  benchPage: async ({ page }, use) => use(new BenchPage(page)),
  importPage: async ({ page }, use) => use(new ImportPage(page)),
  growPage: async ({ page }, use) => use(new GrowPage(page)),
  house: async ({ playwright, baseURL }, use) => withHouse(playwright, baseURL, use),
  otherHouse: async ({ playwright, baseURL }, use) => withHouse(playwright, baseURL, use),
  quietPage: [
    async ({ page }, use) => {
      const complaints: string[] = [];
      page.on('pageerror', (error) => complaints.push(error.message));
      page.on('console', (message) => {
        if (/Content Security Policy/i.test(message.text())) complaints.push(message.text());
      });
      await use();
      expect(complaints, 'errors of the page').toEqual([]);
    },
    { auto: true },
  ],
});

export { expect };
