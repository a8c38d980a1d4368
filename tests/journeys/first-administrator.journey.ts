import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { expectAccessible, launchBrowser, openWindow } from '#tests/journeys/support/browser.ts';
import { startServer, type RunningServer } from '#tests/journeys/support/server.ts';

let server: RunningServer;
let browser: Browser;

beforeAll(async () => {
  server = await startServer({ DEMO: 'off', LABORATORY: 'North bench' });
  browser = await launchBrowser();
});

afterAll(async () => {
  await browser?.close();
  await server?.stop();
});

it('an own installation: the code on the console makes the administrator, who adds an analyst, who signs in', async () => {
  const code = /one-time code ([A-Z0-9-]+)/.exec(server.output())?.[1];
  expect(code).toMatch(/^[A-Z0-9]{4}-[A-Z0-9]{4}-[A-Z0-9]{4}$/);
  const { page, complaints } = await openWindow(browser, server.url);
  await page.goto('/');
  await page.getByLabel(/code/i).fill('AAAA-BBBB-CCCC');
  await page.getByLabel(/^(Your )?name/i).fill('Wren Tallis');
  await page.getByLabel('E-mail').fill('wren.tallis@example.org');
  await page.getByLabel('Password').fill('seven quiet copper lanterns');
  await expectAccessible(page, 'first administrator');
  const create = page.getByRole('button', { name: /administrator/i });
  await create.click();
  await page.getByText('This is not the code', { exact: false }).waitFor();
  await page.getByLabel(/code/i).fill(code!);
  await create.click();
  await page
    .getByRole('link', { name: /Work list/ })
    .first()
    .waitFor();
  await page.goto('/people/new');
  await page.getByLabel('Name').fill('Osric Dane');
  await page.getByLabel('E-mail').fill('osric.dane@example.org');
  await page.getByLabel('analyst', { exact: false }).first().check();
  await page.getByLabel(/password/i).fill('eleven amber river stones');
  await page.getByRole('button', { name: /^Add/ }).click();
  await page.getByText('osric.dane@example.org').waitFor();
  expect(complaints).toEqual([]);

  const other = await openWindow(browser, server.url);
  await other.page.goto('/');
  await other.page.getByLabel('E-mail').fill('osric.dane@example.org');
  await other.page.getByLabel('Password').fill('eleven amber river stones');
  await other.page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await other.page.getByRole('link', { name: 'New case' }).first().waitFor();
  expect(other.complaints).toEqual([]);
});
