import type { Browser } from 'playwright-core';
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

describe('every screen', () => {
  for (const theme of ['daylight', 'darkroom'] as const)
    for (const width of [1440, 900, 320])
      it(`is accessible and fits a window ${width} px wide in ${theme}`, async () => {
        for (const screen of screens.filter((s) => s.person !== null)) {
          const { page, complaints } = await signedIn(browser, server.url, screen.person!);
          await page.evaluate((value) => localStorage.setItem('fringeward.theme', value), theme);
          await page.setViewportSize({ width, height: 900 });
          await page.goto(await screen.path(page));
          await page.getByText(screen.shows).first().waitFor();
          await expectAccessible(page, `${screen.name}, ${theme}, ${width} px`);
          const beyond = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
          expect(beyond, `${screen.name} at ${width} px runs out of the window`).toBeLessThanOrEqual(0);
          expect(complaints).toEqual([]);
          await page.context().close();
        }
      });
});
