// Files of the kinds that stations and instruments send, dropped on the page: each opens, and what cannot is told.

import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { joined } from '../support/bufr-writer.ts';
import { madeBulletin } from '../support/made-bulletin.ts';
import { madeScan } from '../support/made-scan.ts';
import { profilerReport } from '../support/profiler-report.ts';
import { launchBrowser, openPage } from './page.ts';

interface Dropped {
  readonly name: string;
  readonly bytes: Uint8Array | string;
}

let browser: Browser;
beforeAll(async () => {
  browser = await launchBrowser();
});
afterAll(() => browser.close());

/** Lets go of the files over the page. */
async function drop(page: Page, files: readonly Dropped[]): Promise<void> {
  const plain = files.map(({ name, bytes }) => ({ name, base64: Buffer.from(bytes).toString('base64') }));
  const transfer = await page.evaluateHandle((list) => {
    const data = new DataTransfer();
    const lastModified = Date.UTC(2031, 9, 16);
    for (const { name, base64 } of list) {
      const bytes = Uint8Array.from(atob(base64), (character) => character.charCodeAt(0));
      data.items.add(new File([bytes], name, { lastModified }));
    }
    return data;
  }, plain);
  for (const type of ['dragenter', 'dragover', 'drop'])
    await page.dispatchEvent('body', type, { dataTransfer: transfer });
}

/** The page with its demo open. */
async function demo(): Promise<Awaited<ReturnType<typeof openPage>>> {
  const opened = await openPage(browser);
  await opened.page.getByRole('heading', { level: 1 }).filter({ hasText: 'nose' }).waitFor();
  return opened;
}

const text = (page: Page): Promise<string> => page.locator('body').innerText();

const PROFILER: Dropped = {
  name: 'profiler.bufr',
  bytes: joined(...Array.from({ length: 6 }, (_, k) => profilerReport(7, 30 * k))),
};
const BULLETIN: Dropped = { name: 'bulletin.txt', bytes: madeBulletin(10_999, false) };
const SCAN: Dropped = { name: 'scan.nc', bytes: madeScan(3) };
const BROKEN: Dropped = { name: 'broken.bufr', bytes: profilerReport(8, 0).subarray(0, 200) };
const STATIONS: Dropped = { name: 'ours.csv', bytes: 'id,name,lat,lon,elevation\n10999,Fenmoor,52.5,8.25,130\n' };

describe('a dropped file', () => {
  it.each([
    [PROFILER, '99007, wind-profiler', '4 Oct'],
    [BULLETIN, '10999, radiosonde', '15 Oct'],
    [SCAN, 'scan, lidar', '1 Jun'],
  ])('$name opens on Tonight', async (file, feed, day) => {
    const { page, complaints, close } = await demo();
    await drop(page, [file]);
    await expect.poll(() => text(page)).toContain(`Opened ${file.name}.`);
    await expect.poll(() => text(page)).toContain(feed);
    expect(await text(page)).toContain(day);
    // The profile is there: its panel says for when.
    expect(await text(page)).toMatch(/m\/s at \d\d:\d\d/);
    expect(complaints).toEqual([]);
    await close();
  });
});

describe('Feeds', () => {
  it('tells of every source, of unreadable files, and of places once a list of stations has come', async () => {
    const { page, complaints, close } = await demo();
    await drop(page, [PROFILER, BULLETIN, BROKEN]);
    await expect.poll(() => text(page)).toContain('Opened profiler.bufr, bulletin.txt, broken.bufr.');
    await page.getByRole('link', { name: 'Feeds' }).click();
    const feeds = page.getByRole('main');
    await expect.poll(() => feeds.innerText()).toContain('10999, radiosonde');
    const before = await feeds.innerText();
    expect(before).toContain('99007, wind-profiler');
    expect(before).toContain('not known: name the station in a site file or drop a list of stations');
    expect(before).toMatch(/broken\.bufr, record 1, byte 0\s+The message should be \d+ bytes long/);

    await drop(page, [STATIONS]);
    await expect.poll(() => feeds.innerText()).toContain('52.500° N, 8.250° E, 130 m above sea level');
    expect(await feeds.innerText()).toContain('Fenmoor, radiosonde');
    expect(await feeds.innerText()).toContain('99007, wind-profiler');
    expect(complaints).toEqual([]);
    await close();
  });
});
