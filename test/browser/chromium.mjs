// Finds a browser to drive: one that is installed, else one fetched by the ordinary means of the platform.

import { execFileSync, spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { delimiter, join } from 'node:path';

const COMMAND_NAMES = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable', 'chrome', 'msedge'];

const USUAL_PLACES = {
  darwin: [
    '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
    '/Applications/Chromium.app/Contents/MacOS/Chromium',
    '/Applications/Microsoft Edge.app/Contents/MacOS/Microsoft Edge',
  ],
  win32: [
    'C:/Program Files/Google/Chrome/Application/chrome.exe',
    'C:/Program Files (x86)/Google/Chrome/Application/chrome.exe',
    'C:/Program Files (x86)/Microsoft/Edge/Application/msedge.exe',
  ],
  linux: ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/opt/google/chrome/chrome', '/snap/bin/chromium'],
};

const WHAT_TO_DO =
  'No Chromium or Chrome was found and none could be fetched: install one (Debian: apt install chromium), or set CHROME_PATH to it.';

/** @returns {Promise<string>} path of a browser that starts
 *  @throws Error saying in one line what to install */
export async function findChromium() {
  const stated = process.env.CHROME_PATH;
  if (stated !== undefined && stated !== '') {
    if (existsSync(stated)) return stated;
    throw new Error(`CHROME_PATH says ${stated}, but there is no such file.`);
  }
  const installed = installedBrowser();
  if (installed !== undefined) return installed;

  const { chromium } = await import('playwright-core');
  if (!existsSync(chromium.executablePath())) {
    process.stderr.write('No Chromium or Chrome found; fetching one ...\n');
    const cli = join(import.meta.dirname, '../../node_modules/playwright-core/cli.js');
    spawnSync(process.execPath, [cli, 'install', 'chromium'], { stdio: ['ignore', 2, 2], timeout: 300_000 });
  }
  if (starts(chromium.executablePath())) return chromium.executablePath();
  throw new Error(WHAT_TO_DO);
}

function installedBrowser() {
  const onPath = (process.env.PATH ?? '')
    .split(delimiter)
    .flatMap((folder) =>
      COMMAND_NAMES.map((name) => join(folder, process.platform === 'win32' ? `${name}.exe` : name)),
    );
  return [...onPath, ...(USUAL_PLACES[process.platform] ?? [])].find((path) => existsSync(path) && starts(path));
}

/** A fetched or half-installed browser may lack system libraries: only one that tells its version counts. */
function starts(path) {
  // On Windows the browser opens a window instead of telling its version.
  if (process.platform === 'win32') return existsSync(path);
  try {
    execFileSync(path, ['--version'], { stdio: 'pipe', timeout: 20_000 });
    return true;
  } catch {
    return false;
  }
}
