import { mkdir } from 'node:fs/promises';
import { it } from 'vitest';
import { launchBrowser, openWindow } from '#tests/journeys/support/browser.ts';
import { signedIn } from '#tests/journeys/support/people.ts';
import { screens } from '#tests/journeys/support/screens.ts';
import { startServer } from '#tests/journeys/support/server.ts';

it('takes a picture of every screen in both themes, 1440 and 900 px wide', async () => {
  await mkdir('docs/screens', { recursive: true });
  const server = await startServer();
  const browser = await launchBrowser();
  try {
    for (const theme of ['daylight', 'darkroom'] as const)
      for (const screen of screens) {
        const { page } = screen.person
          ? await signedIn(browser, server.url, screen.person)
          : await openWindow(browser, server.url);
        await page.goto('/sign-in');
        await page.evaluate((value) => localStorage.setItem('fringeward.theme', value), theme);
        await page.goto(await screen.path(page));
        await page.getByText(screen.shows).first().waitFor();
        for (const width of [1440, 900]) {
          await page.setViewportSize({ width, height: 900 });
          // Pictures and their colours arrive after the text.
          await page.waitForTimeout(1200);
          await page.screenshot({ path: `docs/screens/${screen.name}-${theme}-${width}.png` });
        }
        await page.context().close();
      }
  } finally {
    await browser.close();
    await server.stop();
  }
});
