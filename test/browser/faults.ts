// What stands in the way of those who cannot see or point, as axe-core finds it on an open page.

import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Page } from 'playwright-core';

const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/** Each fault with the elements that have it; only serious and critical ones unless `least` is `any`. */
export async function faultsOf(page: Page, least: 'serious' | 'any' = 'serious'): Promise<string[]> {
  await page.evaluate(axeSource);
  return page.evaluate(async (all) => {
    const { axe } = window as unknown as {
      axe: { run: () => Promise<{ violations: { id: string; impact: string; nodes: { html: string }[] }[] }> };
    };
    const { violations } = await axe.run();
    return violations
      .filter(({ impact }) => all || impact === 'serious' || impact === 'critical')
      .map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html).join(' | ')}`);
  }, least === 'any');
}
