import type { Browser, Page } from 'playwright-core';
import { openWindow } from '#tests/journeys/support/browser.ts';

/** A window in which somebody of the demo laboratory has signed in by one press. */
export async function signedIn(
  browser: Browser,
  url: string,
  name: string,
): Promise<{ page: Page; complaints: string[] }> {
  const { page, complaints } = await openWindow(browser, url);
  await page.goto('/sign-in');
  await page.getByRole('button', { name: `Sign in as ${name}` }).click();
  await page.getByRole('heading', { level: 1 }).waitFor();
  await page.waitForURL((address) => !address.pathname.startsWith('/sign-in'));
  return { page, complaints };
}
