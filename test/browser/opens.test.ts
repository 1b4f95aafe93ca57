import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser, openPage } from './page.ts';

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

describe('the page', () => {
  it('opens with a title and without a complaint', async () => {
    const { page, complaints, close } = await openPage(browser);
    await page.waitForLoadState('networkidle');
    expect(await page.title()).toMatch(/Duskveer/);
    expect(await page.locator('body').innerText()).not.toBe('');
    expect(complaints).toEqual([]);
    await close();
  });
});
