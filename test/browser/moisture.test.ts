import { readFileSync } from 'node:fs';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { faultsOf } from './faults.ts';
import { launchBrowser, openPage, type OpenedPage } from './page.ts';

/** A machine that does much else at once takes its time. */
const SOON = { timeout: 15_000 };

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

/** The storm night of the demo, on the page of moisture. */
async function openMoisture(options: Parameters<typeof openPage>[1] = {}): Promise<OpenedPage> {
  const opened = await openPage(browser, options);
  const { page } = opened;
  await page.getByRole('heading', { level: 1 }).filter({ hasText: 'nose' }).waitFor();
  await page.getByText(/^Files \(/).click();
  await page.getByRole('button', { name: /Ashwillow Plain/ }).click();
  await page.getByRole('link', { name: 'Ashwillow Plain' }).waitFor();
  await page.getByRole('link', { name: 'Moisture' }).click();
  await page.getByRole('heading', { level: 1 }).filter({ hasText: 'The wind carries' }).waitFor();
  return opened;
}

const answer = (page: Page, title: string): Promise<string> => page.getByRole('region', { name: title }).innerText();

describe('Moisture', () => {
  it('says in one look transport, growth, arrival and convergence, each with method and age', async () => {
    const { page, complaints, close } = await openMoisture();
    const sentence = await page.locator('h1').innerText();
    expect(sentence).toMatch(/carries \d+ kg\/m\/s of vapour below 3 km toward the north, up from \d+ at 20:10/);
    expect(sentence).toMatch(/humidity of Ashwillow Plain soundings, 1 h old/);
    expect(sentence).toMatch(/gets here at 01:\d\d, in \d+ min/);
    expect(sentence).toMatch(/moisture gathers below 1 km/);
    expect(await answer(page, 'Transport below 3 km')).toMatch(/0 min old[\s\S]*±[\s\S]*∫ ρ q V dz/);
    expect(await answer(page, 'Its growth')).toMatch(/an hour[\s\S]*since 20:10[\s\S]*Sen 1968/);
    expect(await answer(page, 'Moist air gets here')).toMatch(/\d+ min\s*from now[\s\S]*km at \d+\.\d m\/s/);
    expect(await answer(page, 'Convergence below 1 km')).toMatch(/g\/kg an hour[\s\S]*Bellamy 1949/);
    expect(complaints).toEqual([]);
    await close();
  });

  it('paints the flux of a feed that has no humidity of its own, and tells it as a table', async () => {
    const { page, complaints, close } = await openMoisture();
    await page.getByRole('button', { name: 'Table' }).click();
    const cells = page.getByRole('region', { name: 'Table of flux of water vapour' }).locator('tbody td');
    await cells.first().waitFor();
    const values = (await cells.allInnerTexts()).map(Number).filter((value) => Number.isFinite(value));
    // Some hundred grams a square metre and second in a jet of 20 m/s with 15 g/kg: 1.05 x 15 x 20.
    expect(Math.max(...values)).toBeGreaterThan(200);
    expect(Math.max(...values)).toBeLessThan(500);
    const night = page.getByRole('region', { name: 'Table of the moist night' });
    expect(await night.locator('tbody tr').count()).toBeGreaterThan(30);
    expect(await night.locator('tbody tr').first().innerText()).toContain('Ashwillow Plain soundings');
    expect(complaints).toEqual([]);
    await close();
  });

  it('takes the humidity of another station when asked, and says so', async () => {
    const { page, close } = await openMoisture();
    await page.getByLabel('Humidity of').selectOption({ label: 'Dry Fork profiler' });
    await expect
      .poll(() => page.locator('h1').innerText())
      .toMatch(/humidity of Dry Fork profiler, of the same time, 137 km/);
    await close();
  });

  it('counts down with the moment looked at, and afterwards tells what came', async () => {
    const { page, close } = await openMoisture();
    const minutes = async (): Promise<number> =>
      Number(/(\d+) min\s*from now/.exec(await answer(page, 'Moist air gets here'))?.[1]);
    const before = await minutes();
    await page.getByRole('button', { name: 'One profile later' }).click();
    await expect.poll(minutes, SOON).toBeLessThan(before);
    await page.getByRole('button', { name: 'Newest' }).click();
    await expect.poll(() => page.locator('h1').innerText(), SOON).toMatch(/was to come at 01:\d\d and came at 01:\d\d/);
    expect(await page.getByRole('region', { name: 'Past arrivals' }).locator('tbody tr').count()).toBe(4);
    await close();
  });

  it('shows the stations on a map and their layers with errors', async () => {
    const { page, close } = await openMoisture();
    const layers = page.getByRole('region', { name: 'Layers between the stations' });
    expect(await layers.locator('tbody tr').count()).toBe(12);
    expect(await layers.locator('tbody tr').first().innerText()).toMatch(/−\d+\.\d ± \d+\.\d/);
    const map = page.getByRole('img', { name: /^Map of/ });
    const told = await map.getAttribute('aria-label');
    expect(told).toMatch(/Dry Fork profiler \d+\.\d m\/s from 1\d\d°/);
    await page.getByLabel('Wind of').selectOption({ label: '2750 to 3000 m' });
    await expect.poll(() => map.getAttribute('aria-label'), SOON).not.toBe(told);
    await close();
  });

  it('says why and what to do where nothing measures humidity', async () => {
    const { page, close } = await openPage(browser);
    await page.getByRole('heading', { level: 1 }).filter({ hasText: 'nose' }).waitFor();
    await page.getByRole('link', { name: 'Moisture' }).click();
    await page.getByRole('heading', { level: 1 }).filter({ hasText: 'The wind carries' }).waitFor();
    const lines = ['time,height_agl_m,speed_mps,direction_deg,temperature_c,dewpoint_c'];
    for (let z = 40; z <= 1000; z += 40) lines.push(`2024-01-05T20:00:00Z,${z},12,200,,`);
    const chooser = page.locator('input[type=file]');
    await chooser.setInputFiles({ name: 'wind-only.csv', mimeType: 'text/csv', buffer: Buffer.from(lines.join('\n')) });
    await expect
      .poll(() => page.locator('h1').innerText(), SOON)
      .toMatch(/cannot be said: no humidity.*Open a sounding/);
    expect(await page.locator('main').innerText()).not.toMatch(/NaN|undefined/);
    expect(await answer(page, 'Moist air gets here')).toContain('the site file names no station upstream');
    await close();
  });

  it.each([
    { width: 1920, height: 1080, theme: 'dark' },
    { width: 1280, height: 720, theme: 'light' },
    { width: 768, height: 1024, theme: 'red' },
    { width: 390, height: 844, theme: 'dark' },
  ])('has no fault that axe finds at $width x $height, $theme, and nothing hangs over the edge', async (size) => {
    const { width, height, theme } = size;
    const { page, close } = await openMoisture({ viewport: { width, height } });
    await page.getByText('Display', { exact: true }).click();
    await page.getByLabel('Colours').selectOption(theme);
    await page.keyboard.press('Escape');
    await page.getByRole('region', { name: 'Layers between the stations' }).waitFor();
    expect(await page.evaluate(() => document.documentElement.scrollWidth - innerWidth)).toBeLessThanOrEqual(0);
    const violations = await faultsOf(page, 'any');
    expect(violations).toEqual([]);
    await close();
  });

  it('saves its numbers', async () => {
    const { page, close } = await openMoisture();
    await page.getByText('Save', { exact: true }).click();
    const waiting = page.waitForEvent('download');
    await page.getByRole('button', { name: 'The night’s moisture as CSV' }).click();
    const file = await waiting;
    expect(file.suggestedFilename()).toBe('duskveer-ashwillow-plain-moisture-20240628T0630Z.csv');
    expect(readFileSync(await file.path(), 'utf8')).toMatch(/^time_utc,status,why,humidity_from/);
    await close();
  });
});
