import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { duskveer } from '../relay/command-line.ts';
import { killMidway, resultBytes } from '../relay/scan/kill-midway.ts';
import { writeYear, type MadeYear } from '../relay/scan/made-year.ts';
import { faultsOf } from './faults.ts';
import { launchBrowser, openPage } from './page.ts';

const folder = mkdtempSync(join(tmpdir(), 'duskveer-nights-'));
const year = join(folder, 'year');
const killed = join(folder, 'killed');
const OPTIONS = ['--criteria', 'whiteman-1997', '--hub', '110', '--diameter', '120'];

let browser: Browser;
let made: MadeYear;
beforeAll(async () => {
  browser = await launchBrowser();
  made = writeYear(year);
  // A scan that dies after a third of the year, then is called again.
  expect(await killMidway(['scan', year, '--out', killed, ...OPTIONS, '--workers', '1'], killed, 4)).toBeLessThan(12);
  const { code, err } = await duskveer(['scan', year, '--out', killed, ...OPTIONS, '--workers', '2']);
  expect(code).toBe(0);
  expect(err).toMatch(/12 files, (?:[1-9]|1[01]) of them to read/);
}, 180_000);
afterAll(async () => {
  await browser.close();
  rmSync(folder, { recursive: true });
});

interface Dropped {
  readonly name: string;
  readonly bytes: Buffer;
}
const table = (name: string): Dropped => ({ name, bytes: readFileSync(join(killed, name)) });

/** Lays files ready to be dropped, so that the page's own work can be told from the test's. */
async function carry(page: Page, files: readonly Dropped[]): Promise<() => Promise<void>> {
  const transfer = await page.evaluateHandle(
    (given) => {
      const data = new DataTransfer();
      for (const { name, base64 } of given) {
        data.items.add(new File([Uint8Array.from(atob(base64), (letter) => letter.charCodeAt(0))], name));
      }
      return data;
    },
    files.map(({ name, bytes }) => ({ name, base64: bytes.toString('base64') })),
  );
  return async () => {
    for (const type of ['dragenter', 'dragover', 'drop']) {
      await page.dispatchEvent('body', type, { dataTransfer: transfer });
    }
  };
}

async function drop(page: Page, files: readonly Dropped[]): Promise<void> {
  const letGo = await carry(page, files);
  await letGo();
}

const TABLES = ['profiles.csv', 'nights.csv', 'columns.json'];

async function withTables(page: Page, names: readonly string[] = TABLES): Promise<void> {
  await page.getByRole('link', { name: 'Nights' }).waitFor();
  await drop(page, names.map(table));
  await page.getByRole('heading', { level: 1 }).filter({ hasText: 'Reed Fen' }).waitFor();
}

/** The figures in a cell of a page's table, thin spaces taken out. */
const plainText = (text: string): string => text.replaceAll('\u2009', '');

describe('a year of nights', () => {
  it('scanned, killed and taken up again, comes to the same bytes as undisturbed', async () => {
    const whole = join(folder, 'whole');
    expect(await duskveer(['scan', year, '--out', whole, ...OPTIONS, '--workers', '1'])).toMatchObject({ code: 0 });
    expect(resultBytes(killed)).toEqual(resultBytes(whole));
  });

  it('shows on the page out of its tables, within a couple of seconds', async () => {
    const { page, complaints, close } = await openPage(browser);
    await page.getByRole('link', { name: 'Nights' }).waitFor();
    const letGo = await carry(page, TABLES.map(table));
    // While the tables are read the page answers: its longest silence is told by its own frames.
    await page.evaluate(() => {
      const state = { longest: 0, last: performance.now() };
      (window as unknown as { silence: typeof state }).silence = state;
      const tick = (): void => {
        const now = performance.now();
        state.longest = Math.max(state.longest, now - state.last);
        state.last = now;
        requestAnimationFrame(tick);
      };
      requestAnimationFrame(tick);
    });
    const beganMs = performance.now();
    await letGo();
    await page.getByRole('heading', { level: 1 }).filter({ hasText: 'Reed Fen' }).waitFor();
    // Generous, for a machine that is busy with other things.
    expect(performance.now() - beganMs).toBeLessThan(20_000);
    const { longest } = await page.evaluate(() => (window as unknown as { silence: { longest: number } }).silence);
    expect(longest).toBeLessThan(2000);

    const told = await page.locator('h1').innerText();
    const nights = /In (\d+) assessable nights at Reed Fen a jet blew in (\d+) of 100/.exec(told)!;
    expect(Number(nights[1])).toBeGreaterThan(330);
    // What was made is what is told: nights with a jet, of the nights that can be judged.
    expect(Number(nights[2])).toBeCloseTo((100 * made.jetNights.length) / Number(nights[1]), -0.3);
    expect(told).toMatch(/most often in (May|June|July|August) between 2[2-4] and 0[2-5] h/);
    expect(told).toMatch(/nose near 3\d0\sm/);
    const answer = page.getByRole('region', { name: 'Nights with a jet' });
    expect(plainText(await answer.innerText())).toContain(
      `${made.jetNights.length} of ${nights[1]} assessable nights with a jet`,
    );
    expect(plainText(await answer.innerText())).toContain(`of ${made.profiles} profiles`);
    expect(await page.locator('body').innerText()).not.toContain('invented');
    expect(complaints).toEqual([]);
    await close();
  });

  it('says the same as Parquet', async () => {
    const { page, complaints, close } = await openPage(browser);
    await withTables(page);
    const told = await page.locator('h1').innerText();
    await withTables(page, ['profiles.parquet', 'nights.parquet', 'columns.json', 'jets.parquet', 'problems.parquet']);
    await page.getByText('from profiles.parquet').waitFor();
    expect(await page.locator('h1').innerText()).toBe(told);
    expect(complaints).toEqual([]);
    await close();
  });

  it('lists its nights, sorted and sifted by keyboard, and names the file of one that is not open', async () => {
    const { page, complaints, close } = await openPage(browser);
    await withTables(page);
    const list = page.getByRole('region', { name: 'List of nights' });
    await list.getByLabel('Show', { exact: true }).selectOption({ label: 'nights with a jet' });
    expect(await list.getByRole('status').innerText()).toContain(`${made.jetNights.length} of `);
    await list.getByLabel('Month', { exact: true }).selectOption({ label: 'July' });
    const july = made.jetNights.filter((night) => night.startsWith('2023-07'));
    const dates = (): Promise<string[]> => list.locator('tbody th').allInnerTexts();
    expect(await dates()).toEqual([...july].reverse());
    const byNight = list.getByRole('button', { name: 'night of', exact: true });
    await byNight.focus();
    await page.keyboard.press('Enter');
    expect(await dates()).toEqual(july);
    expect(await list.getByRole('columnheader', { name: 'night of' }).getAttribute('aria-sort')).toBe('ascending');
    await list.getByRole('button', { name: /fastest nose/ }).click();
    const speeds = (await list.locator('tbody tr td:nth-child(7)').allInnerTexts()).map(Number);
    expect(speeds).toEqual([...speeds].sort((a, b) => b - a));

    const night = july[3]!;
    await list.getByRole('button', { name: `Open the night of ${night}` }).click();
    await expect
      .poll(() => page.locator('main').innerText())
      .toContain(`The profiles of the night of ${night} are not open.`);
    expect(await page.locator('.wanted').innerText()).toContain('year-07.nc');

    await drop(page, [{ name: 'year-07.nc', bytes: readFileSync(join(year, 'year-07.nc')) }]);
    await page.getByText('Opened year-07.nc').waitFor();
    await list.getByRole('button', { name: `Open the night of ${night}` }).click();
    await page
      .getByRole('heading', { level: 1 })
      .filter({ hasText: /jet since|nose/ })
      .waitFor();
    expect(page.url()).toContain('#/tonight');
    const day = new Date(Date.parse(night) + 86_400_000).getUTCDate();
    expect(await page.locator('header .clock').innerText()).toMatch(new RegExp(`\\b${day} Jul\\b`));
    expect(complaints).toEqual([]);
    await close();
  });

  it('gives each picture as a table, PNG and CSV with the same numbers', async () => {
    const { page, close } = await openPage(browser);
    await withTables(page);
    await page.getByRole('button', { name: 'Table of How often' }).click();
    const shown = page.getByRole('region', { name: 'Table: How often' });
    const rows = await shown.locator('tbody tr').allInnerTexts();
    expect(rows).toHaveLength(12);
    for (const [words, ending] of [
      ['PNG of How often', '.png'],
      ['CSV of How often', '.csv'],
    ] as const) {
      const [download] = await Promise.all([
        page.waitForEvent('download'),
        page.getByRole('button', { name: words }).click(),
      ]);
      expect(download.suggestedFilename()).toBe(`duskveer-nights-how-often-by-month-and-hour${ending}`);
      const bytes = readFileSync(await download.path());
      if (ending === '.png') expect(bytes.length).toBeGreaterThan(10_000);
      else {
        const lines = bytes.toString().trimEnd().split('\n');
        const july = rows[6]!.split('\t').map((cell) => plainText(cell).replace('–', ''));
        expect(lines[7]!.split(',')).toEqual(july);
      }
    }
    await close();
  });

  it('says what is wrong with a table that is cut short, and shows the rest', async () => {
    const { page, close } = await openPage(browser);
    await page.getByRole('link', { name: 'Nights' }).waitFor();
    const { bytes } = table('profiles.csv');
    await drop(page, [{ name: 'profiles.csv', bytes: bytes.subarray(0, bytes.length / 3) }, table('nights.csv')]);
    await page.getByRole('heading', { level: 1 }).filter({ hasText: 'Reed Fen' }).waitFor();
    const problems = page.getByRole('region', { name: 'What could not be read' });
    expect(await problems.innerText()).toContain('A row of profiles.csv is cut short');
    await close();
  });
});

describe('Nights', () => {
  it('shows the demo and says how little it rests on', async () => {
    const { page, complaints, close } = await openPage(browser, { path: '#/nights' });
    await page.getByRole('heading', { level: 1 }).filter({ hasText: 'too few for a climate' }).waitFor();
    const text = await page.locator('main').innerText();
    expect(text).toContain('2 nights: too few for a climate');
    expect(text).toContain('all of them invented');
    await page.getByRole('button', { name: 'Open the night of 2024-05-21 in Tonight' }).click();
    await page.getByRole('heading', { level: 1 }).filter({ hasText: 'nose at' }).waitFor();
    expect(complaints).toEqual([]);
    await close();
  });

  it('says what to do when nothing is open', async () => {
    const { page, close } = await openPage(browser);
    await page.route('**/demo/manifest.json', (route) => route.fulfill({ json: { opens: '', nights: [] } }));
    await page.goto(new URL('#/nights', page.url()).href);
    await page.reload();
    await page.getByRole('heading', { name: 'No night is open.' }).waitFor();
    expect(await page.locator('main').innerText()).toMatch(/Drop profile files[\s\S]*scan FOLDER --out TABLES/);
    await close();
  });

  it.each([
    [1280, 'dark'],
    [390, 'light'],
    [768, 'deep red, for dark rooms'],
  ])('fits %d pixels and has no serious fault for those who cannot see or point, %s', async (width, theme) => {
    const { page, close } = await openPage(browser, { viewport: { width, height: 844 } });
    await page.getByText('Display', { exact: true }).click();
    await page.getByLabel('Colours', { exact: true }).selectOption({ label: theme });
    await page.keyboard.press('Escape');
    await withTables(page);
    await page.getByRole('button', { name: 'Table of From where' }).click();
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(width);
    const faults = await faultsOf(page);
    expect(faults).toEqual([]);
    await close();
  });
});
