// The one number of a site file that the page itself can find: what the farm yields of its curves.

import { applyEdits, modify } from 'jsonc-parser';

/** The text of a site file with this farm factor in it; all else, comments too, stays as it was. */
export function withFarmFactor(text: string, factor: number): string {
  const formattingOptions = { insertSpaces: true, tabSize: 2 };
  return applyEdits(text, modify(text, ['farm_factor'], Number(factor.toFixed(3)), { formattingOptions }));
}
