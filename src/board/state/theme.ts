// The page wears the same colours as the pictures: the tokens of `plot` become the style sheet's variables.

import { THEMES, type ThemeName } from '../../plot/index.ts';

const TOKENS = ['ground', 'raise', 'rule', 'ink', 'soft', 'call', 'day', 'dusk', 'night'] as const;

export function applyTheme(name: ThemeName): void {
  const { documentElement } = document;
  documentElement.dataset['theme'] = name;
  for (const token of TOKENS) documentElement.style.setProperty(`--${token}`, THEMES[name][token]);
}
