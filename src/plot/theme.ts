// The colours that every drawing takes as an argument. Values in OKLCH, told once here; the page's style sheet and the
// canvas use the same bytes.

import { bytesOf, hexOf, type Bytes, type Oklch } from './colour.ts';

/** `red` keeps eyes adapted to the dark: one hue on black, lightness only. */
export type ThemeName = 'dark' | 'light' | 'red';

export interface Theme {
  readonly name: ThemeName;
  /** The page. */
  readonly ground: string;
  /** Menus and cards. */
  readonly raise: string;
  /** Hairlines. */
  readonly rule: string;
  /** Text, thread, now line. */
  readonly ink: string;
  /** Labels and ages. */
  readonly soft: string;
  /** What needs a person, nothing else. */
  readonly call: string;
  /** The strip of light under a time axis. */
  readonly day: string;
  readonly dusk: string;
  readonly night: string;
  /** Bytes of `ground`, for painting pixels, and of `ink`. */
  readonly groundBytes: Bytes;
  readonly inkBytes: Bytes;
}

type Token = Exclude<keyof Theme, 'name' | 'groundBytes' | 'inkBytes'>;

const TOKENS: Readonly<Record<ThemeName, Readonly<Record<Token, Oklch>>>> = {
  dark: {
    ground: [0.165, 0.018, 255],
    raise: [0.205, 0.018, 255],
    rule: [0.33, 0.02, 255],
    ink: [0.94, 0.012, 90],
    soft: [0.74, 0.018, 255],
    call: [0.82, 0.15, 78],
    day: [0.84, 0.06, 95],
    dusk: [0.55, 0.035, 290],
    night: [0.29, 0.04, 275],
  },
  light: {
    ground: [0.985, 0.006, 90],
    raise: [0.96, 0.008, 90],
    rule: [0.86, 0.01, 90],
    ink: [0.22, 0.02, 255],
    soft: [0.46, 0.02, 255],
    call: [0.52, 0.13, 60],
    day: [0.9, 0.06, 95],
    dusk: [0.68, 0.045, 290],
    night: [0.42, 0.05, 275],
  },
  red: {
    ground: [0, 0, 27],
    raise: [0.15, 0.04, 27],
    rule: [0.28, 0.1, 27],
    ink: [0.62, 0.2, 27],
    soft: [0.59, 0.185, 27],
    call: [0.7, 0.2, 27],
    day: [0.58, 0.18, 27],
    dusk: [0.4, 0.14, 27],
    night: [0.22, 0.08, 27],
  },
};

/** The three themes by name. */
export const THEMES: Readonly<Record<ThemeName, Theme>> = {
  dark: themeOf('dark'),
  light: themeOf('light'),
  red: themeOf('red'),
};

function themeOf(name: ThemeName): Theme {
  const tokens = TOKENS[name];
  const colours = Object.fromEntries(
    Object.entries(tokens).map(([token, colour]) => [token, hexOf(bytesOf(colour))]),
  ) as Record<Token, string>;
  return { name, ...colours, groundBytes: bytesOf(tokens.ground), inkBytes: bytesOf(tokens.ink) };
}
