import type { Locator, Page } from '@playwright/test';

/** Presses Tab until `target` has the focus. @throws if it is not met within `most` steps. */
export async function tabTo(page: Page, target: Locator, most = 60): Promise<void> {
  await target.waitFor();
  for (let step = 0; step < most; step++) {
    if (await target.evaluate((element) => element === document.activeElement)) return;
    await page.keyboard.press('Tab');
  }
  throw new Error(`The Tab key does not reach ${String(target)} within ${most} steps.`);
}
