import { readFileSync } from 'node:fs';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { faultsOf } from './faults.ts';
import { launchBrowser, openPage } from './page.ts';

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

const sentence = (page: Page) => page.getByRole('heading', { level: 1 });
const rotorShown = (page: Page): Promise<void> => sentence(page).filter({ hasText: 'MW' }).waitFor();

async function drop(page: Page, name: string, text: string): Promise<void> {
  const transfer = await page.evaluateHandle(
    (file) => {
      const data = new DataTransfer();
      data.items.add(new File([file.text], file.name, { type: 'text/csv' }));
      return data;
    },
    { name, text },
  );
  for (const type of ['dragenter', 'dragover', 'drop']) {
    await page.dispatchEvent('body', type, { dataTransfer: transfer });
  }
}

describe('Rotor', () => {
  it('tells the demo night without a manual: power, what the jet takes, when the nose came, which ramp and why', async () => {
    const { page, complaints, close } = await openPage(browser, { path: '#/rotor' });
    await rotorShown(page);
    expect(await sentence(page).innerText()).toMatch(
      /^At 03:00 the wind over the discs is good for \d+\.\d MW of 239; the jet takes \d+\.\d MW against hub-height reckoning\. The nose entered the discs at 02:10 and stands at 1[45]0 m\. Output rose by \d+\.\d MW \(\d+ % of capacity\) in \d+ min from 01:\d\d: the nose came down through the disc's upper tip/,
    );
    const body = await page.locator('body').innerText();
    for (const words of [
      'Wakes, availability and curtailment are not in it',
      "Stops, lifts and climbs follow the site's rules, the maker's limits and the person in charge",
      'IEC 61400-12-1',
      'Whose winds these are',
      'Larkmoor Ridge mast (mast): 10 to 120 m, 4 levels',
    ]) {
      expect(body).toContain(words);
    }
    expect(body).not.toMatch(/\d\d:\d\d UTC(?! ·)/);
    expect(
      await page.getByRole('img', { name: /^Wind across the disc of Plover 140/ }).getAttribute('aria-label'),
    ).toMatch(/120 m {2}\d+\.\d m\/s {2}\d{3}° {2}mast/);
    expect(complaints).toEqual([]);
    await close();
  });

  it('fits the farm’s factor, reckons with it and takes it back', async () => {
    const { page, complaints, close } = await openPage(browser, { path: '#/rotor' });
    await rotorShown(page);
    const before = await sentence(page).innerText();
    const actual = page.getByRole('region', { name: 'Actual output' });
    expect(await actual.innerText()).toMatch(
      /yields 0\.9\d\d ± 0\.0\d\d of what its curves make .* over \d+ intervals/,
    );
    const button = actual.getByRole('button', { name: /^Reckon with 0\.9/ });
    const factor = (await button.innerText()).replace('Reckon with ', '');
    expect(await actual.locator('code').innerText()).toBe(`"farm_factor": ${factor}`);
    await button.click();
    // All files are read again.
    const PATIENT = { timeout: 15_000 };
    await expect.poll(() => actual.innerText(), PATIENT).toContain(`the site's one factor of ${factor}`);
    expect(await sentence(page).innerText()).not.toBe(before);
    await page.getByRole('button', { name: 'Undo' }).click();
    await expect.poll(() => sentence(page).innerText(), PATIENT).toBe(before);
    expect(complaints).toEqual([]);
    await close();
  });

  it('takes a dropped table of output beside what is open', async () => {
    const { page, close } = await openPage(browser, { path: '#/rotor' });
    await rotorShown(page);
    const rows = Array.from({ length: 60 }, (_, k) => `${new Date(Date.UTC(2024, 4, 22, 0, 10 * k)).toISOString()},50`);
    await drop(page, 'zz-own.csv', ['time,output_mw', ...rows].join('\n'));
    const actual = page.getByRole('region', { name: 'Actual output' });
    await expect.poll(() => actual.innerText(), { timeout: 15_000 }).toContain('zz-own.csv');
    expect(await actual.innerText()).toContain('the farm reported 50.0 MW');
    expect(await sentence(page).innerText()).toMatch(/^At 03:00/);
    await close();
  });

  it('shows the other type, the table for the log and the whole record, and saves them', async () => {
    const { page, complaints, close } = await openPage(browser, { path: '#/rotor' });
    await rotorShown(page);
    await page.getByLabel('Turbine', { exact: true }).selectOption({ index: 1 });
    await page.getByRole('img', { name: /^Wind across the disc of Curlew 164/ }).waitFor();
    await page.getByRole('button', { name: 'Table', exact: true }).click();
    const table = page.getByRole('region', { name: "Table of the rotor's night" });
    const cells = await table.locator('tbody tr').first().locator('th, td').allInnerTexts();
    const power = /good for (\d+\.\d) MW/.exec(await sentence(page).innerText())![1];
    // Columns: time, hub, from, disc, shear, veer, nose, in the disc, by hub, by profile …
    expect([cells[0], cells[9]]).toEqual(['03:00', power]);
    const save = async (words: string): Promise<Buffer> => {
      await page.getByText('Save', { exact: true }).click();
      const [download] = await Promise.all([
        page.waitForEvent('download'),
        page.getByRole('button', { name: words }).click(),
      ]);
      await page.keyboard.press('Escape');
      return readFileSync(await download.path());
    };
    expect((await save('Disc and power as PNG')).subarray(1, 4).toString()).toBe('PNG');
    expect((await save('The numbers as CSV')).toString()).toMatch(/^time_utc,turbine,status,why,coverage,/);
    await page.getByLabel('Span', { exact: true }).selectOption({ label: 'whole record' });
    await expect
      .poll(() => sentence(page).innerText())
      .toMatch(/the wind was good for \d+ MWh: \d+ MWh .* less than hub/);
    expect((await save('The numbers as CSV')).toString()).toMatch(/^time_utc,farm_power_kw,/);
    expect(complaints).toEqual([]);
    await close();
  });

  it('says why where the disc lies outside the data, and what to do where nothing is open', async () => {
    const { page, close } = await openPage(browser, { path: '#/rotor' });
    await rotorShown(page);
    const lines = ['time,height_agl_m,speed_mps,direction_deg'];
    for (let k = 0; k < 12; k++) {
      const time = new Date(Date.UTC(2024, 0, 5, 20, 10 * k)).toISOString();
      for (let z = 300; z <= 1000; z += 50) lines.push(`${time},${z},${k === 11 ? 0 : 9},${(355 + k) % 360}`);
    }
    await drop(page, 'high.csv', lines.join('\n'));
    await expect
      .poll(() => page.locator('main').innerText(), { timeout: 15_000 })
      .toContain('the rotor lies outside the data');
    expect(await page.locator('main').innerText()).toContain('Not assessable');
    await close();
  });

  it('has no serious fault for those who cannot see or point, in every colour', async () => {
    const { page, close } = await openPage(browser);
    await page.getByText('Display', { exact: true }).waitFor();
    for (const theme of ['dark', 'light', 'deep red, for dark rooms']) {
      await page.evaluate(() => (location.hash = '#/tonight'));
      await page.getByText('Display', { exact: true }).click();
      await page.getByLabel('Colours', { exact: true }).selectOption({ label: theme });
      await page.keyboard.press('Escape');
      await page.evaluate(() => (location.hash = '#/rotor'));
      await page.getByRole('region', { name: 'Loads watch' }).waitFor();
      const faults = await faultsOf(page);
      expect(faults, theme).toEqual([]);
    }
    await close();
  });
});
