// Opens the page for a test and listens for whatever goes wrong on it.

import { chromium, type Browser, type BrowserContextOptions, type Page } from 'playwright-core';
import { inject } from 'vitest';

export interface OpenedPage {
  readonly page: Page;
  /** Errors and warnings of the console, exceptions, requests that failed; empty on a page that is well. */
  readonly complaints: readonly string[];
  readonly close: () => Promise<void>;
}

export interface OpenPageOptions extends BrowserContextOptions {
  /** Path and query below the served address. */
  readonly path?: string;
}

/** The browser of a test file; close it when the file is done. */
export function launchBrowser(): Promise<Browser> {
  return chromium.launch({
    executablePath: inject('browserPath'),
    // Containers offer little shared memory and often run as root.
    args: ['--no-sandbox', '--disable-dev-shm-usage', '--force-color-profile=srgb'],
  });
}

/** A fresh visit, with nothing remembered from earlier ones, at 1280 x 720 in UTC unless said otherwise. */
export async function openPage(browser: Browser, options: OpenPageOptions = {}): Promise<OpenedPage> {
  const { path = '', ...contextOptions } = options;
  const context = await browser.newContext({
    viewport: { width: 1280, height: 720 },
    timezoneId: 'UTC',
    locale: 'en-GB',
    acceptDownloads: true,
    ...contextOptions,
  });
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on('console', (message) => {
    if (message.type() !== 'error' && message.type() !== 'warning') return;
    complaints.push(`${message.text()} (${message.location().url})`);
  });
  page.on('pageerror', (error) => complaints.push(`${error.name}: ${error.message}`));
  page.on('requestfailed', (request) =>
    complaints.push(`${request.url()}: ${request.failure()?.errorText ?? 'failed'}`),
  );
  page.on('response', (response) => {
    if (response.status() >= 400) complaints.push(`${response.url()}: ${response.status()}`);
  });
  await page.goto(new URL(path, inject('pageAddress')).href);
  return { page, complaints, close: () => context.close() };
}
