import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { expectAccessible, launchBrowser } from '#tests/journeys/support/browser.ts';
import { signedIn } from '#tests/journeys/support/people.ts';
import { screens } from '#tests/journeys/support/screens.ts';
import { startServer, type RunningServer } from '#tests/journeys/support/server.ts';

let server: RunningServer;
let browser: Browser;

beforeAll(async () => {
  server = await startServer();
  browser = await launchBrowser();
});

afterAll(async () => {
  await browser?.close();
  await server?.stop();
});

async function expectToFit(page: Page, what: string): Promise<void> {
  const beyond = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
  expect(beyond, `${what} runs out of the window`).toBeLessThanOrEqual(0);
}

const people = [...new Set(screens.map((s) => s.person))].filter((person) => person !== null);

describe.each(['daylight', 'darkroom'] as const)('every screen in %s', (theme) => {
  it.each(people)('that %s sees is accessible and fits windows of 1440, 900 and 320 px', async (person) => {
    const { page, complaints } = await signedIn(browser, server.url, person);
    await page.evaluate((value) => localStorage.setItem('fringeward.theme', value), theme);
    for (const screen of screens.filter((s) => s.person === person)) {
      await page.setViewportSize({ width: 1440, height: 900 });
      await page.goto(await screen.path(page));
      await page.getByText(screen.shows).first().waitFor();
      for (const width of [1440, 900, 320]) {
        await page.setViewportSize({ width, height: 900 });
        await expectToFit(page, `${screen.name} at ${width} px`);
        await expectAccessible(page, `${screen.name}, ${theme}, ${width} px`);
      }
      expect(complaints, screen.name).toEqual([]);
    }
    await page.context().close();
  });
});
