import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { accessibilityFaults } from '../support/axe.js';
import { browserPath, noBrowser, openBrowser } from '../support/browser.js';
import { hall } from '../support/plans.js';
import { administrator, startServer, type TestServer } from '../support/server.js';

if (browserPath === undefined) process.stderr.write(`${noBrowser}\n`);

const phone = { width: 390, height: 844 };
const desktop = { width: 1280, height: 900 };
const words = ['Go', 'Go with conditions', 'Not enough known', 'No-go'];

describe.skipIf(browserPath === undefined)('planning in a real browser', () => {
  let server: TestServer;
  let browser: Browser;
  let planPath = '';
  const folder = mkdtempSync(join(tmpdir(), 'stillair-walk-'));

  beforeAll(async () => {
    server = await startServer();
    const ada = await server.signedIn();
    browser = await openBrowser();
    // Two hours of two hundred people breathing: without fresh air carbon dioxide fails its aim.
    const file = hall({
      acts: [
        {
          id: 'pipe',
          title: 'Pipe in a bag',
          space: 'hall',
          minute: 10,
          releases: {
            planned: [{ gas: 'He', volumeM3: 0.02, durationS: 40, manner: 'gentle', heightM: 1.2 }],
            worstCredible: [],
          },
        },
      ],
    });
    file.event.performances = [{ startsAt: '19:00', durationMin: 120 }];
    const answer = await ada.post('/plans/import', { text: JSON.stringify(file) });
    planPath = answer.location?.replace(/\?.*/, '') ?? '';
  });
  afterAll(async () => {
    await browser.close();
    await server.close();
    rmSync(folder, { recursive: true, force: true });
  });

  async function signedIn(
    viewport: { width: number; height: number },
    javaScriptEnabled = true,
  ): Promise<{ context: BrowserContext; page: Page }> {
    const context = await browser.newContext({ viewport, javaScriptEnabled });
    const page = await context.newPage();
    await page.goto(`${server.url}/sign-in`);
    await page.getByLabel('Email').fill(administrator.email);
    await page.getByLabel('Password').fill(administrator.password);
    await page.getByRole('button', { name: 'Sign in' }).click();
    return { context, page };
  }

  async function word(page: Page): Promise<string> {
    await page.goto(`${server.url}${planPath}`);
    return (await page.locator('.decision-word').first().textContent()) ?? '';
  }

  async function setAirChanges(page: Page, value: string): Promise<void> {
    await page.goto(`${server.url}${planPath}`);
    await page.getByRole('link', { name: 'Open the venue' }).click();
    await page.locator('summary', { hasText: 'per hour' }).click();
    const field = page.locator('input[name="infiltration.0.airChangesPerHour"]');
    await field.fill(value);
    await page.getByRole('button', { name: 'Save the venue' }).first().click();
    await page.getByText('Saved.').waitFor();
  }

  test.each([
    ['phone', phone, true],
    ['desktop', desktop, true],
    ['phone without script', phone, false],
  ] as const)(
    'more air at the venue makes the word better, less brings it back, on a %s',
    async (_, viewport, script) => {
      const { context, page } = await signedIn(viewport, script);
      await setAirChanges(page, '0.1');
      const still = words.indexOf(await word(page));
      await setAirChanges(page, '12');
      const aired = words.indexOf(await word(page));
      expect(still).toBe(words.indexOf('No-go'));
      expect(aired).toBeGreaterThanOrEqual(0);
      expect(aired).toBeLessThan(still);
      await setAirChanges(page, '0.1');
      expect(words.indexOf(await word(page))).toBe(still);
      await context.close();
    },
  );

  test('the risk sheet downloads from the page of the plan', async () => {
    const { context, page } = await signedIn(desktop);
    await page.goto(`${server.url}${planPath}`);
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('link', { name: 'Risk sheet (PDF)' }).click(),
    ]);
    const path = join(folder, 'sheet.pdf');
    await download.saveAs(path);
    expect(download.suggestedFilename()).toBe('Evening-of-gases-risk-sheet.pdf');
    expect(readFileSync(path).subarray(0, 5).toString()).toBe('%PDF-');
    await context.close();
  });

  test('a refused entry without script comes back filled in, its row open, its message read out', async () => {
    const { context, page } = await signedIn(phone, false);
    await page.goto(`${server.url}${planPath}`);
    await page.locator('summary', { hasText: 'Pipe in a bag' }).first().click();
    await page.locator('summary', { hasText: 'at the site' }).first().click();
    const amount = page.locator('input[name="acts.0.releases.planned.0.amount"]');
    await amount.fill('plenty');
    await page.getByRole('button', { name: 'Save the plan' }).first().click();
    await expect.poll(() => page.title()).toContain('Error:');
    expect(await amount.inputValue()).toBe('plenty');
    expect(await amount.isVisible()).toBe(true);
    expect(await amount.getAttribute('aria-invalid')).toBe('true');
    await context.close();
  });

  test('without script the section is shown at the chosen moment, with its numbers', async () => {
    const { context, page } = await signedIn(phone, false);
    await page.goto(`${server.url}${planPath}`);
    const moments = page.getByLabel('Moment shown');
    const before = await page.locator('#moment-view table').textContent();
    const first = await moments.locator('option').first().textContent();
    await moments.selectOption({ index: 0 });
    await page.getByRole('button', { name: 'Show it' }).click();
    await page.waitForURL(/at=planned-/);
    expect(await page.locator('#moment-view caption').textContent()).toContain(first);
    expect(await page.locator('#moment-view table').textContent()).not.toBe(before);
    await context.close();
  });

  test('with script one step by keyboard moves the section and the line on the open curve', async () => {
    const { context, page } = await signedIn(desktop);
    await page.goto(`${server.url}${planPath}`);
    const line = page.locator('details.more[open] svg.moment-mark.wide line').first();
    const slider = page.getByRole('slider', { name: 'Moment shown' });
    const place = async () => Number(await line.getAttribute('x1'));
    const [before, said] = [await place(), await slider.getAttribute('aria-valuetext')];
    expect(before).toBeGreaterThan(0);
    await slider.focus();
    await page.keyboard.press('ArrowLeft');
    const now = (await slider.getAttribute('aria-valuetext')) ?? '';
    expect(now).not.toBe(said);
    expect(await place()).toBeLessThan(before);
    await expect
      .poll(() => page.locator('#moment-view caption').textContent())
      .toContain(now.trim());
    for (const name of ['Earlier', 'Later']) {
      const box = await page.getByRole('button', { name }).boundingBox();
      expect(box?.height).toBeGreaterThanOrEqual(44);
    }
    await context.close();
  });

  test('the picture of a curve fits a phone and is drawn for its width', async () => {
    const { context, page } = await signedIn(phone);
    await page.goto(`${server.url}${planPath}`);
    const picture = page.locator('details.more[open] .curve img').first();
    await picture.scrollIntoViewIfNeeded();
    await expect
      .poll(() => picture.evaluate((img: HTMLImageElement) => img.naturalWidth), {
        timeout: 20_000,
      })
      .toBe(340);
    expect(await picture.evaluate((img: HTMLImageElement) => img.currentSrc)).toContain('narrow');
    await context.close();
  });

  test.each([
    ['phone', phone],
    ['desktop', desktop],
    ['narrow phone', { width: 320, height: 700 }],
  ] as const)('every page passes axe-core and fits the width on a %s', async (_, viewport) => {
    const { context, page } = await signedIn(viewport);
    await page.goto(`${server.url}${planPath}`);
    const venue = await page.getByRole('link', { name: 'Open the venue' }).getAttribute('href');
    const paths = [
      '/venues',
      '/venues/new',
      venue ?? '',
      '/plans',
      '/plans/new',
      '/plans/import',
      planPath,
    ];
    for (const path of paths) {
      await page.goto(`${server.url}${path}`);
      await page.evaluate(() => {
        for (const part of document.querySelectorAll('details')) part.open = true;
      });
      expect(await accessibilityFaults(page), path).toEqual([]);
      const width = await page.evaluate(() => document.documentElement.scrollWidth);
      expect(width, path).toBeLessThanOrEqual(viewport.width);
    }
    await context.close();
  });
});
