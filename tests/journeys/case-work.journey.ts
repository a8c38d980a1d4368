import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoPassword } from '#server/demo/demo-people.ts';
import { expectAccessible, launchBrowser, openWindow } from '#tests/journeys/support/browser.ts';
import { startMailServer } from '#tests/journeys/support/mail-server.ts';
import { signedIn } from '#tests/journeys/support/people.ts';
import { threePictures } from '#tests/journeys/support/pictures.ts';
import { startServer, type RunningServer } from '#tests/journeys/support/server.ts';

let server: RunningServer;
let mail: Awaited<ReturnType<typeof startMailServer>>;
let browser: Browser;

beforeAll(async () => {
  mail = await startMailServer();
  server = await startServer({ MAIL_SERVER: mail.url });
  browser = await launchBrowser();
});

afterAll(async () => {
  await browser?.close();
  await server?.stop();
  await mail?.stop();
});

const headline = (page: Page) => page.getByRole('heading', { level: 1 });

/** Opens a case of the work list and then its newest exposure. */
async function openExposure(page: Page, title: RegExp, exposure = 'Exposure 1'): Promise<void> {
  await page.goto('/');
  await page.getByRole('link', { name: title }).first().click();
  await page.getByRole('link', { name: exposure, exact: true }).click();
  await page.waitForURL(/\/exposures\//);
}

/** Puts forward what the open exposure's page proposes, and ends on the case. */
async function putForward(page: Page, comment: string): Promise<void> {
  await page.getByRole('button', { name: 'Put forward for review' }).click();
  await page.getByLabel('Comment for the reviewer').fill(comment);
  await expectAccessible(page, 'putting a match forward');
  await page.getByRole('button', { name: 'Put forward', exact: true }).click();
  await page.waitForURL(/\/cases\//);
}

describe('the work on a case', () => {
  it('first morning: the seeded account opens the seeded case and reads its verdict', async () => {
    const { page, complaints } = await openWindow(browser, server.url);
    await page.goto('/');
    await page.getByRole('button', { name: 'Sign in as Tamsin Orrel' }).waitFor();
    await expectAccessible(page, 'sign-in');
    await page.getByLabel('E-mail').fill('tamsin.orrel@example.org');
    await page.getByLabel('Password').fill('not the password');
    await page.getByRole('button', { name: 'Sign in', exact: true }).first().click();
    await page.getByText('No active account has this e-mail address and password').first().waitFor();
    await page.getByLabel('Password').fill(demoPassword);
    await page.getByRole('button', { name: 'Sign in', exact: true }).first().click();
    await headline(page)
      .filter({ hasText: /wait|running|back|nothing/i })
      .waitFor();
    await expectAccessible(page, 'work list');
    await page
      .getByRole('link', { name: /FW-0001/ })
      .first()
      .click();
    await page.getByRole('link', { name: 'Exposure 1', exact: true }).waitFor();
    await expectAccessible(page, 'case');
    await page.getByRole('link', { name: 'Exposure 1', exact: true }).click();
    await headline(page)
      .filter({ hasText: /^Slot, 213\.\d+.*83\.\d+.*long axis at 27\.\d+°/ })
      .waitFor();
    await page.getByText('One shape of the catalogue fits: slot.').first().waitFor();
    await page.getByText('Not told by this image:').waitFor();
    await page.getByText('a half turn gives the same pattern').waitFor();
    await page.getByRole('img', { name: 'Simulated: slot' }).waitFor();
    await expectAccessible(page, 'exposure');
    expect(complaints).toEqual([]);
  });

  it('new work: a case, a bench, three pictures of three kinds, ranked candidates, the seam, a match put forward', async () => {
    const { page, complaints } = await signedIn(browser, server.url, 'Tamsin Orrel');
    await page.getByRole('link', { name: 'New case' }).first().click();
    await page.getByLabel('Title').fill('Window of an unknown mask');
    await expectAccessible(page, 'new case');
    await page.getByRole('button', { name: 'Open the case' }).click();
    await page.getByText('Enter the part.').waitFor();
    await page.getByLabel('Part', { exact: true }).fill('Mask 31');
    await page.getByRole('button', { name: 'Open the case' }).click();
    await page.waitForURL(/\/cases\/[0-9a-f-]{36}$/);
    await page
      .getByLabel('Bench that the exposures are taken on')
      .selectOption({ label: 'Bench 2, 100 mm lens' });
    await page.getByText('never look into the beam', { exact: false }).first().waitFor();
    await page
      .getByLabel('Pictures of the pattern')
      .setInputFiles([
        ...threePictures(),
        { name: 'notes.png', mimeType: 'image/png', buffer: Buffer.from('these are notes, not a picture') },
      ]);
    await page.getByText('The file is a text file, which cannot be measured', { exact: false }).waitFor();
    for (const n of [1, 2, 3]) await page.getByRole('link', { name: `Exposure ${n}`, exact: true }).waitFor();
    await page.getByText('8 bit, PNG').waitFor();
    expect(await page.getByText(/12 bit, (PNG|TIFF)/).count()).toBe(2);
    await expectAccessible(page, 'case with refused upload');
    await page.getByRole('button', { name: 'Leave out notes.png' }).click();
    await page.getByRole('link', { name: 'Exposure 3', exact: true }).click();
    await headline(page)
      .filter({ hasText: /^Rectangle, (300|299)\.\d+.*(140|139)\.\d+.*long axis at 3[45]\.\d+°/ })
      .waitFor({ timeout: 90_000 });
    expect(await page.getByRole('radio', { name: /Rectangle/ }).isChecked()).toBe(true);
    await page.keyboard.press('2');
    expect(await page.getByRole('radio', { name: /Rectangle/ }).isChecked()).toBe(false);
    await page.keyboard.press('1');
    await page.getByText('Along the seam').click();
    await page.getByRole('slider', { name: /Seam at/ }).fill('35');
    await page.getByText('Seam at 35°').waitFor();
    await page.getByRole('img', { name: /joined along the seam/ }).waitFor();
    await expectAccessible(page, 'seam');
    await putForward(page, 'All three exposures say the same.');
    await page.getByText('waits for a decision').first().waitFor();
    await page.getByText('“All three exposures say the same.”').waitFor();
    expect(complaints).toEqual([]);
  });

  it('second person: nobody confirms their own match; a reviewer does, with a signature', async () => {
    const own = await signedIn(browser, server.url, 'Idris Lanmoor');
    await openExposure(own.page, /FW-0006/);
    await putForward(own.page, 'Read off the paper screen.');
    await own.page.goto('/reviews');
    await own.page.getByRole('link', { name: /FW-0006, match 1/ }).click();
    await own.page.getByText('You put this match forward yourself').first().waitFor();
    expect(await own.page.getByLabel('Your password again').count()).toBe(0);
    expect(own.complaints).toEqual([]);

    const { page, complaints } = await signedIn(browser, server.url, 'Maud Kestring');
    await page.getByRole('link', { name: /^Review/ }).click();
    await headline(page)
      .filter({ hasText: /wait for your decision|waits for your decision/ })
      .waitFor();
    await expectAccessible(page, 'review table');
    await page.getByRole('link', { name: /FW-0006, match 1/ }).click();
    await headline(page).filter({ hasText: 'Double slit' }).waitFor();
    await page.getByRole('img', { name: /Simulated/ }).waitFor();
    await expectAccessible(page, 'review');
    await page.getByText('agree with the match as stated', { exact: false }).waitFor();
    await page.getByLabel('Your password again').fill('guessed it');
    await page.getByRole('button', { name: 'Sign and confirm' }).click();
    await page.getByText('This is not your password. Nothing was signed.').waitFor();
    await page.getByLabel('Your password again').fill(demoPassword);
    await page.getByRole('button', { name: 'Sign and confirm' }).click();
    await page.getByText('Maud Kestring confirmed it', { exact: false }).waitFor();
    await page.goto('/reviews?state=confirmed');
    await page.getByRole('row', { name: /FW-0006, match 1.*Maud Kestring confirmed it/ }).waitFor();
    expect(complaints).toEqual([]);
  });

  it('return: the analyst is told by mail why, runs it again and puts it forward anew', async () => {
    const reviewer = await signedIn(browser, server.url, 'Maud Kestring');
    await reviewer.page.goto('/reviews?state=submitted');
    await reviewer.page.getByRole('link', { name: /FW-0002, match 1/ }).click();
    await reviewer.page.getByLabel('Return to the analyst').check();
    await reviewer.page.getByLabel('Your password again').fill(demoPassword);
    await reviewer.page.getByRole('button', { name: 'Sign and send back' }).click();
    await reviewer.page.getByText('Say why, so that the analyst knows what to do.').waitFor();
    await reviewer.page.getByLabel(/^Reason/).fill('Say how far from round it is.');
    await reviewer.page.getByRole('button', { name: 'Sign and send back' }).click();
    await reviewer.page.getByText('Maud Kestring sent it back', { exact: false }).waitFor();
    expect(reviewer.complaints).toEqual([]);

    await expect
      .poll(() => mail.received.find((m) => m.to.includes('joao.verrin@example.org'))?.source, {
        timeout: 20_000,
      })
      .toContain('Say how far from round it is.');

    const { page, complaints } = await signedIn(browser, server.url, 'Joao Verrin');
    await page.getByText('Say how far from round it is.').first().waitFor();
    await openExposure(page, /FW-0002/);
    await page.getByRole('button', { name: 'Run again' }).click();
    await page.getByRole('button', { name: 'Run 2' }).waitFor();
    await page.getByText(/run 2 of 2/).waitFor();
    await headline(page)
      .filter({ hasText: /^Ellipse/ })
      .waitFor({ timeout: 90_000 });
    await putForward(page, 'Major over minor axis is 1.114.');
    await page.getByText('Match 2').waitFor();
    await page.getByText('“Say how far from round it is.”').first().waitFor();
    expect(complaints).toEqual([]);
  });
});
