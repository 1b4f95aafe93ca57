// How drawings look on this screen.

import { FONT, THEMES, type Look, type ThemeName } from '../../plot/index.ts';

export function lookOf(theme: ThemeName, ratio: number): Look {
  return { theme: THEMES[theme], ratio, font: FONT };
}
