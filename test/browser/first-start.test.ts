import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { accessibilityFaults } from '../support/axe.js';
import {
  browserPath,
  noBrowser,
  openBrowser,
  startProgram,
  type StartedProgram,
} from '../support/browser.js';

if (browserPath === undefined) console.warn(noBrowser);

describe.skipIf(browserPath === undefined)('a first start, in a real browser', () => {
  let program: StartedProgram;
  let browser: Browser;
  beforeAll(async () => {
    program = startProgram();
    browser = await openBrowser();
  });
  afterAll(async () => {
    await browser.close();
    await program.stop();
  });

  it('leads from the printed link to a signed-in administrator, by keyboard alone', async () => {
    const [, link = ''] = await program.line(/(http:\/\/\S+\/first\/\S+)/);
    const context = await browser.newContext({ viewport: { width: 320, height: 640 } });
    const page = await context.newPage();
    const complaints: string[] = [];
    page.on('console', (message) => {
      // A refused form answers 422, which the browser logs as a failed load.
      if (message.type() === 'error' && !message.text().includes('422'))
        complaints.push(message.text());
    });
    const check = async (where: string) => {
      expect(await accessibilityFaults(page), where).toEqual([]);
      const { scroll, width } = await page.evaluate(() => ({
        scroll: document.documentElement.scrollWidth,
        width: document.documentElement.clientWidth,
      }));
      expect(scroll, `${where} at 320 px`).toBeLessThanOrEqual(width);
    };

    await page.goto(link);
    await check('the first link');

    await page.getByLabel('Your name').focus();
    await page.keyboard.type('Ada Example');
    await page.keyboard.press('Tab');
    await page.keyboard.type('ada@example.org');
    await page.keyboard.press('Tab');
    await page.keyboard.type('too short');
    await page.keyboard.press('Tab');
    await page.keyboard.type('too short');
    await page.keyboard.press('Enter');
    await page.getByRole('alert').waitFor();
    await check('the refused form');
    expect(await page.getByLabel('Your name').inputValue()).toBe('Ada Example');
    await page.getByRole('link', { name: 'Choose a password of at least 10 characters' }).click();
    expect(await page.evaluate(() => document.activeElement?.getAttribute('name'))).toBe(
      'password',
    );

    await page.getByLabel('Password', { exact: true }).fill('four unrelated words here');
    await page.getByLabel('Password again').fill('four unrelated words here');
    await page.getByRole('button', { name: 'Create the account' }).click();
    await page.getByRole('status').waitFor();
    expect(await page.getByRole('heading', { level: 1 }).textContent()).toBe('Stillair');
    await check('home');

    await page.getByRole('link', { name: 'Ada Example' }).click();
    await page.getByRole('heading', { name: 'Your account' }).waitFor();
    await check('the account');

    await page.getByRole('button', { name: 'Sign out' }).click();
    await page.getByRole('heading', { name: 'Sign in' }).waitFor();
    await check('sign-in');

    await page.goBack();
    await page.reload();
    expect(new URL(page.url()).pathname).toBe('/sign-in');
    expect(complaints).toEqual([]);
    await context.close();
  });

  it.each(['light', 'dark'] as const)('meets contrast in %s colours', async (colorScheme) => {
    const [, address = ''] = await program.line(/listens on (http:\S+)/);
    const context = await browser.newContext({ colorScheme, reducedMotion: 'reduce' });
    const page = await context.newPage();
    await page.goto(`${address}/sign-in`);

    expect(await accessibilityFaults(page)).toEqual([]);
    await context.close();
  });
});
