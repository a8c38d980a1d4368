import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core';
import type axeCore from 'axe-core';
import { expect } from 'vitest';

const flags = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export function launchBrowser(): Promise<Browser> {
  return chromium.launch({ executablePath: '/usr/bin/chromium', args: flags });
}

/** A window of its own (own session) whose unexpected errors end up in `complaints`. */
export async function openWindow(
  browser: Browser,
  url: string,
): Promise<{ context: BrowserContext; page: Page; complaints: string[] }> {
  const context = await browser.newContext({
    baseURL: url,
    viewport: { width: 1440, height: 900 },
    reducedMotion: 'reduce',
    bypassCSP: false,
  });
  const page = await context.newPage();
  page.setDefaultTimeout(30_000);
  const complaints: string[] = [];
  page.on('pageerror', (error) => complaints.push(String(error)));
  page.on('console', (message) => {
    // The browser itself reports every refused request; refusals are part of some journeys.
    if (message.type() === 'error' && !message.text().startsWith('Failed to load resource'))
      complaints.push(message.text());
  });
  return { context, page, complaints };
}

let axeSource: string | undefined;

/** No violation of WCAG 2.2 A and AA on the page as it stands (rules of axe-core). */
export async function expectAccessible(page: Page, what: string): Promise<void> {
  axeSource ??= await readFile(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
  await page.evaluate(axeSource);
  const violations = await page.evaluate(async () => {
    const axe = (window as unknown as { axe: typeof axeCore }).axe;
    const result = await axe.run(document, {
      runOnly: {
        type: 'tag',
        values: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'],
      },
    });
    return result.violations.map(
      (v) => `${v.id}: ${v.help} — ${v.nodes.map((n) => n.target.join(' ')).join('; ')}`,
    );
  });
  expect(violations, `accessibility of ${what}`).toEqual([]);
}
