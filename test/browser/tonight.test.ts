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

/** The demo is there once the sentence tells of it and the section has been painted. */
async function demoShown(page: Page): Promise<void> {
  await page.getByRole('heading', { level: 1 }).filter({ hasText: 'nose' }).waitFor();
  await painted(page);
}

/** Waits until the section holds more colours than an empty one has. */
async function painted(page: Page): Promise<void> {
  await page.waitForFunction(() => {
    const canvas = document.querySelector<HTMLCanvasElement>('.uplot canvas');
    const pen = canvas?.getContext('2d');
    if (canvas === null || pen === null || pen === undefined) return false;
    // Up through the picture: the wind changes with height even in a night that stays the same.
    const row = pen.getImageData(Math.floor(canvas.width * 0.4), 0, 1, canvas.height).data;
    const colours = new Set<number>();
    for (let k = 0; k < row.length; k += 4) colours.add((row[k]! << 16) | (row[k + 1]! << 8) | row[k + 2]!);
    return colours.size > 10;
  });
}

/** A night of one's own: a nose of 16 m/s at 280 m over an invented station. */
function ownNight(): { name: string; mimeType: string; buffer: Buffer } {
  const lines = ['time,height_agl_m,speed_mps,direction_deg'];
  for (let k = 0; k < 30; k++) {
    const time = new Date(Date.UTC(2024, 0, 5, 20, 10 * k)).toISOString();
    for (let z = 40; z <= 1000; z += 40) {
      lines.push(`${time},${z},${(6 + 10 * Math.exp(-(((z - 280) / 180) ** 2))).toFixed(2)},200`);
    }
  }
  return { name: 'own-night.csv', mimeType: 'text/csv', buffer: Buffer.from(lines.join('\n')) };
}

async function drop(page: Page, file: { name: string; mimeType: string; buffer: Buffer }): Promise<void> {
  const transfer = await page.evaluateHandle(
    ({ name, text, type }) => {
      const data = new DataTransfer();
      data.items.add(new File([text], name, { type }));
      return data;
    },
    { name: file.name, text: file.buffer.toString('latin1'), type: file.mimeType },
  );
  for (const type of ['dragenter', 'dragover', 'drop']) {
    await page.dispatchEvent('body', type, { dataTransfer: transfer });
  }
}

describe('Tonight', () => {
  it('opens with the invented night, told in a sentence, with units, ages and the cautions', async () => {
    const { page, complaints, close } = await openPage(browser);
    await demoShown(page);
    await expect.poll(() => page.locator('h1').innerText()).toMatch(/nose at \d+ m, \d+\.\d m\/s from the/);
    const body = await page.locator('body').innerText();
    expect(body).toContain('demo: place, turbines and weather are invented');
    expect(body).toContain('Official warnings come from the national weather service');
    expect(body).toContain('Not for air navigation');
    for (const title of ['Jet nose', 'Wind on the disc', 'Moisture below 3 km']) expect(body).toContain(title);
    expect(complaints).toEqual([]);
    await close();
  });

  it('opens a dropped file in place of the demo, shows its jet and disc, and takes it back', async () => {
    const { page, complaints, close } = await openPage(browser);
    await demoShown(page);
    const before = await page.locator('h1').innerText();
    await drop(page, ownNight());
    await expect.poll(() => page.locator('h1').innerText()).toContain('280 m');
    await painted(page);
    const jet = page.getByRole('region', { name: 'Jet nose' });
    expect(await jet.innerText()).toMatch(/280\s*m[\s\S]*16\.0\s*m\/s/);
    expect(await page.getByRole('region', { name: /^Wind on the disc, 40–160 m/ }).innerText()).toMatch(
      /\d+\.\d\s*m\/s/,
    );
    await page.getByRole('button', { name: 'Undo' }).click();
    await expect.poll(() => page.locator('h1').innerText()).toBe(before);
    expect(complaints).toEqual([]);
    await close();
  });

  it('says what is wrong with a file it cannot read, and keeps the rest', async () => {
    const { page, close } = await openPage(browser);
    await demoShown(page);
    await drop(page, { name: 'note.bin', mimeType: 'application/octet-stream', buffer: Buffer.from([1, 2, 3, 4, 5]) });
    const problems = page.getByRole('region', { name: 'What could not be read' });
    await problems.waitFor();
    expect(await problems.innerText()).toContain('note.bin');
    await close();
  });

  it('changes field and units, remembers them, and tells the same numbers in the table', async () => {
    const { page, complaints, close } = await openPage(browser);
    await demoShown(page);
    await page.getByLabel('Show', { exact: true }).selectOption({ label: 'wind direction' });
    await page.getByText('Display', { exact: true }).click();
    await page.getByLabel('Speed in', { exact: true }).selectOption({ label: 'kt' });
    await expect.poll(() => page.locator('h1').innerText()).toMatch(/\d+ kt from the/);
    await page.reload();
    await page.getByRole('heading', { level: 1 }).filter({ hasText: 'nose' }).waitFor();
    expect(await page.getByLabel('Show', { exact: true }).locator('option:checked').innerText()).toBe('wind direction');
    expect(await page.locator('h1').innerText()).toMatch(/\d+ kt from the/);

    await page.getByRole('button', { name: 'Table' }).click();
    const table = page.getByRole('region', { name: 'Table of the night' });
    await table.waitFor();
    const answer = await page.getByRole('region', { name: 'Jet nose' }).locator('.value').allInnerTexts();
    const cells = await table.locator('tbody tr').first().locator('td').allInnerTexts();
    // Columns: jet, nose height, nose speed …
    expect([cells[1], cells[2]]).toEqual(answer);
    expect(complaints).toEqual([]);
    await close();
  });

  it('reads under the cursor what the file holds, and the table says the same', async () => {
    const { page, close } = await openPage(browser, { viewport: { width: 1600, height: 900 } });
    await demoShown(page);
    await drop(page, ownNight());
    await expect.poll(() => page.locator('h1').innerText()).toContain('280 m');
    await painted(page);
    // The cursor reads the measured value nearest to it; the nose of the file is 16.0 m/s at 280 m throughout.
    const section = page.getByRole('application');
    const box = (await section.locator('.u-over').boundingBox())!;
    // The picture reaches up to 1000 m, the top of the file's levels.
    await page.mouse.move(box.x + box.width * 0.5, box.y + box.height * (1 - 280 / 1000));
    await expect.poll(() => page.locator('.readout').innerText()).toMatch(/280 m at \d\d:\d\d/);
    expect(await page.locator('.readout').innerText()).toContain('16.0 m/s from 200°');
    await page.getByRole('button', { name: 'Table' }).click();
    const table = page.getByRole('region', { name: 'Table of wind speed' });
    await table.waitFor();
    const layers = await table.locator('thead th').allInnerTexts();
    // Levels are 40 m apart, so the one at 280 m owns the layer from 260 to 300 m.
    const column = layers.indexOf('260–300');
    const cells = await table.locator('tbody tr').first().locator('th, td').allInnerTexts();
    expect(cells[column]).toBe('16.0');
    await close();
  });

  it('is driven by the keyboard: cursor, moment looked at, zoom and back', async () => {
    const { page, complaints, close } = await openPage(browser);
    await demoShown(page);
    const section = page.getByRole('application');
    await section.focus();
    await page.keyboard.press('ArrowLeft');
    await expect.poll(() => page.locator('.readout').innerText()).toMatch(/site time, \d+ m/);
    const clock = await page.locator('header .clock strong').innerText();
    await page.keyboard.press(',');
    await expect.poll(() => page.locator('header .clock strong').innerText()).not.toBe(clock);
    await page.keyboard.press('+');
    await expect
      .poll(() => page.getByLabel('Span', { exact: true }).locator('option:checked').innerText())
      .toBe('as zoomed');
    await page.keyboard.press('0');
    await expect
      .poll(() => page.getByLabel('Span', { exact: true }).locator('option:checked').innerText())
      .toBe('the night');
    expect(complaints).toEqual([]);
    await close();
  });

  it('saves the picture and its numbers', async () => {
    const { page, close } = await openPage(browser);
    await demoShown(page);
    for (const [words, ending] of [
      ['The picture as PNG', '.png'],
      ['Its numbers as CSV', '.csv'],
    ] as const) {
      await page.getByText('Save', { exact: true }).click();
      const [download] = await Promise.all([
        page.waitForEvent('download'),
        page.getByRole('button', { name: words }).click(),
      ]);
      expect(download.suggestedFilename()).toMatch(new RegExp(`^duskveer-larkmoor-ridge-.*\\${ending}$`));
      expect(readFileSync(await download.path()).length).toBeGreaterThan(5000);
      await page.keyboard.press('Escape');
    }
    await close();
  });

  it('has no serious fault for those who cannot see or point, on either page, dark and light', async () => {
    for (const path of ['', '#/feeds']) {
      const { page, close } = await openPage(browser, { path });
      if (path === '') await demoShown(page);
      else await page.getByRole('heading', { name: 'Larkmoor Ridge lidar, lidar' }).waitFor();
      for (const theme of ['dark', 'light']) {
        if (path === '') {
          await page.getByText('Display', { exact: true }).click();
          await page.getByLabel('Colours', { exact: true }).selectOption({ label: theme });
          await page.keyboard.press('Escape');
        }
        const faults = await faultsOf(page);
        expect(faults).toEqual([]);
      }
      await close();
    }
  });
});
