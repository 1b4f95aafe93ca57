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

/** Opens the demo's storm night and the page Inflow with the wind of Ashwillow's profiler. */
async function stormNight(page: Page): Promise<void> {
  await page.getByRole('heading', { level: 1 }).filter({ hasText: 'nose' }).waitFor();
  await page
    .getByText(/^Files/)
    .first()
    .click();
  await page.getByRole('button', { name: /Ashwillow/ }).click();
  await page.waitForFunction(() => document.querySelector('header .name')?.textContent === 'Ashwillow Plain');
  await page.getByRole('link', { name: 'Inflow' }).click();
  await page
    .getByLabel('Wind from', { exact: true })
    .selectOption({ label: 'Ashwillow Plain profiler, wind-profiler' });
  await page.getByRole('heading', { level: 1 }).filter({ hasText: 'cluster' }).waitFor();
}

const answer = (page: Page, name: string | RegExp): Promise<string> => page.getByRole('region', { name }).innerText();

describe('Inflow', () => {
  it('tells parcel, lift and cluster motion in a sentence, each with its age and method', async () => {
    const { page, complaints, close } = await openPage(browser);
    await stormNight(page);
    const sentence = await page.locator('h1').innerText();
    expect(sentence).toMatch(/storms could feed on air from \d+ to \d+ m/);
    expect(sentence).toMatch(/has \d+ J\/kg and (needs \d+ m of lift|rises freely)/);
    expect(sentence).toMatch(/building upwind moves [a-z-]+ at [\d.]+ m\/s, building downwind [a-z-]+ at [\d.]+ m\/s/);
    expect(sentence).toMatch(/Wind \d+ min old, above \d+ m 1 h; temperature and humidity 1 h\./);
    expect(await answer(page, /^Energy of/)).toMatch(/air 1 h old[\s\S]*J\/kg CAPE[\s\S]*Doswell & Rasmussen 1994/);
    expect(await answer(page, 'Clusters move')).toMatch(/aloft 1 h[\s\S]*Corfidi 2003/);
    expect(await answer(page, 'Ingredients')).toMatch(/Official warnings come from the national weather service/);
    expect(await page.locator('.rests').innerText()).toContain('Ashwillow Plain soundings (radiosonde) at 23:30');
    expect(complaints).toEqual([]);
    await close();
  });

  it('reads out diagram, wind and hodograph at one height, by mouse and by keyboard', async () => {
    const { page, close } = await openPage(browser);
    await stormNight(page);
    const picture = page.getByRole('application');
    const box = (await picture.boundingBox())!;
    await page.mouse.move(box.x + 0.4 * box.width, box.y + 0.5 * box.height);
    const readout = page.locator('.readout');
    await expect
      .poll(() => readout.innerText())
      .toMatch(/^\d+ m, \d+ hPa, temperature −?[\d.]+ °C, dew point .*parcel .* K, wind [\d.]+ m\/s from \d{3}°$/);
    await page.mouse.move(2, 2);
    await picture.focus();
    await page.keyboard.press('PageUp');
    await page.keyboard.press('ArrowUp');
    await expect.poll(() => readout.innerText()).toMatch(/^550 m,/);
    await page.keyboard.press('Escape');
    await expect.poll(() => readout.innerText()).toMatch(/^Point at/);
    await close();
  });

  it('follows a storm that is dragged, moved by keys or typed, and goes back to Bunkers', async () => {
    const { page, complaints, close } = await openPage(browser, { viewport: { width: 1280, height: 900 } });
    await stormNight(page);
    const helicity = async (): Promise<number> =>
      Number(
        (await page.getByRole('region', { name: 'Helicity 0–3 km' }).locator('.value').innerText()).replace('−', '-'),
      );
    const before = await helicity();
    const handle = page.getByRole('slider', { name: /Storm motion/ });
    const at = (await handle.boundingBox())!;
    const middle = { x: at.x + at.width / 2, y: at.y + at.height / 2 };
    await page.mouse.move(middle.x, middle.y);
    await page.mouse.down();
    await page.mouse.move(middle.x + 60, middle.y - 20, { steps: 4 });
    await page.mouse.up();
    await expect.poll(helicity).not.toBe(before);
    expect(await answer(page, 'Helicity 0–3 km')).toContain('motion set by hand');
    const dragged = await helicity();
    await handle.focus();
    await page.keyboard.press('Shift+ArrowRight');
    await expect.poll(helicity).not.toBe(dragged);
    await page.getByLabel('Storm comes from').fill('270');
    await page.getByLabel('Storm comes from').press('Tab');
    await page.getByLabel('at', { exact: true }).fill('10');
    await page.getByLabel('at', { exact: true }).press('Tab');
    await expect.poll(() => handle.getAttribute('aria-valuetext')).toBe('10.0 m/s from 270°');
    await page.getByRole('button', { name: 'Back to Bunkers' }).click();
    await expect.poll(helicity).toBe(before);
    expect(complaints).toEqual([]);
    await close();
  });

  it('follows the hand within a frame', async () => {
    const { page, close } = await openPage(browser, { viewport: { width: 1280, height: 900 } });
    await stormNight(page);
    const handle = page.getByRole('slider', { name: /Storm motion/ });
    await handle.focus();
    const longest = await handle.evaluate(async (element) => {
      const times: number[] = [];
      for (let turn = 0; turn < 30; turn++) {
        const began = performance.now();
        element.dispatchEvent(
          new KeyboardEvent('keydown', { key: turn % 2 === 0 ? 'ArrowRight' : 'ArrowUp', bubbles: true }),
        );
        // State, text and drawing are settled in microtasks before the next frame.
        await Promise.resolve();
        await new Promise((resolve) => queueMicrotask(() => resolve(null)));
        times.push(performance.now() - began);
      }
      return times.sort((a, b) => a - b)[15]!;
    });
    expect(longest).toBeLessThan(16);
    await close();
  });

  it('saves picture and numbers, lists them, and prints on one sheet of light ground', async () => {
    const { page, complaints, close } = await openPage(browser);
    await stormNight(page);
    const saved = async (name: string): Promise<Buffer> => {
      await page.getByText('Save', { exact: true }).click();
      const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('button', { name }).click()]);
      await page.keyboard.press('Escape');
      return readFileSync(await download.path());
    };
    expect((await saved('The pictures as PNG')).subarray(1, 4).toString()).toBe('PNG');
    const air = (await saved('Air and parcel as CSV')).toString().split('\n');
    expect(air[0]).toMatch(/^wind_station,air_station,air_time_utc,height_agl_m,pressure_pa/);
    expect(air[1]).toMatch(/^ashwillow,ashwillow-sonde,2024-06-28T05:30:00.000Z,0,96300,/);
    expect((await saved('All numbers as CSV')).toString()).toContain('cape_j_per_kg');
    await page.getByRole('button', { name: 'Table' }).click();
    const rows = page.getByRole('region', { name: 'Table of air and wind by height' }).locator('tbody tr');
    expect(await rows.count()).toBe(51);
    const pdf = (await page.pdf({ format: 'A4', printBackground: true })).toString('latin1');
    expect(pdf.match(/\/Type\s*\/Page[^s]/g)).toHaveLength(1);
    await page.evaluate(() => dispatchEvent(new Event('beforeprint')));
    expect(await page.evaluate(() => document.documentElement.dataset['theme'])).toBe('light');
    await page.evaluate(() => dispatchEvent(new Event('afterprint')));
    expect(await page.evaluate(() => document.documentElement.dataset['theme'])).toBe('dark');
    expect(complaints).toEqual([]);
    await close();
  });

  it('says what is missing of winds without air, and what to do', async () => {
    const { page, complaints, close } = await openPage(browser);
    await page.getByRole('heading', { level: 1 }).filter({ hasText: 'nose' }).waitFor();
    const lines = ['time,height_agl_m,speed_mps,direction_deg'];
    for (let z = 40; z <= 2000; z += 40)
      lines.push(`2024-01-05T20:00:00Z,${z},${(6 + z / 400).toFixed(2)},${200 + z / 50}`);
    await page
      .getByLabel('Files to open')
      .setInputFiles({ name: 'wind.csv', mimeType: 'text/csv', buffer: Buffer.from(lines.join('\n')) });
    await page.getByRole('link', { name: 'Inflow' }).click();
    await expect.poll(() => page.locator('h1').innerText()).toMatch(/cannot be said.*No sounding/);
    expect(await answer(page, 'Wind for storms')).toMatch(/Shear 0–1 km\s+[\d.]+ m\/s/);
    expect(await answer(page, 'Wind for storms')).toMatch(/6000 m are needed/);
    expect(complaints).toEqual([]);
    await close();
  });

  it('gives axe nothing to find, in every theme and at every size', async () => {
    for (const viewport of [
      { width: 1920, height: 1080 },
      { width: 768, height: 1024 },
      { width: 390, height: 844 },
    ]) {
      const { page, close } = await openPage(browser, { viewport });
      await stormNight(page);
      expect(await faultsOf(page)).toEqual([]);
      expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(viewport.width);
      await close();
    }
    for (const theme of ['light', 'red']) {
      const { page, close } = await openPage(browser);
      await page.evaluate(
        (name) => localStorage.setItem('duskveer/preferences', JSON.stringify({ theme: name })),
        theme,
      );
      await page.reload();
      await stormNight(page);
      expect(await faultsOf(page)).toEqual([]);
      await close();
    }
  });
});
