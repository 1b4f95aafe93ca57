// Colours in OKLCH, in which equal steps look equal, and their way to the screen's sRGB bytes.
// Source: Bjorn Ottosson (2020), "A perceptual color space for image processing"; sRGB transfer curve: IEC 61966-2-1.

/** Lightness 0 to 1, chroma 0 to about 0.3, hue in degrees. */
export type Oklch = readonly [lightness: number, chroma: number, hue: number];
/** Lightness and the two opponent axes, green to red and blue to yellow. */
export type Oklab = readonly [lightness: number, a: number, b: number];
/** Red, green, blue in linear light, 0 to 1 inside the screen's gamut. */
export type LinearRgb = readonly [red: number, green: number, blue: number];
/** Red, green, blue as bytes, 0 to 255. */
export type Bytes = readonly [red: number, green: number, blue: number];

const RADIANS = Math.PI / 180;

export function oklabOf([lightness, chroma, hue]: Oklch): Oklab {
  return [lightness, chroma * Math.cos(hue * RADIANS), chroma * Math.sin(hue * RADIANS)];
}

export function oklchOf([lightness, a, b]: Oklab): Oklch {
  return [lightness, Math.hypot(a, b), (Math.atan2(b, a) / RADIANS + 360) % 360];
}

export function linearOfOklab([lightness, a, b]: Oklab): LinearRgb {
  const l = (lightness + 0.3963377774 * a + 0.2158037573 * b) ** 3;
  const m = (lightness - 0.1055613458 * a - 0.0638541728 * b) ** 3;
  const s = (lightness - 0.0894841775 * a - 1.291485548 * b) ** 3;
  return [
    4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s,
    -1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s,
    -0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s,
  ];
}

export function oklabOfLinear([red, green, blue]: LinearRgb): Oklab {
  const l = Math.cbrt(0.4122214708 * red + 0.5363325363 * green + 0.0514459929 * blue);
  const m = Math.cbrt(0.2119034982 * red + 0.6806995451 * green + 0.1073969566 * blue);
  const s = Math.cbrt(0.0883024619 * red + 0.2817188376 * green + 0.6299787005 * blue);
  return [
    0.2104542553 * l + 0.793617785 * m - 0.0040720468 * s,
    1.9779984951 * l - 2.428592205 * m + 0.4505937099 * s,
    0.0259040371 * l + 0.7827717662 * m - 0.808675766 * s,
  ];
}

const encoded = (light: number): number => (light <= 0.0031308 ? 12.92 * light : 1.055 * light ** (1 / 2.4) - 0.055);
const decoded = (value: number): number => (value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4);
const byte = (light: number): number => Math.round(255 * encoded(Math.min(1, Math.max(0, light))));

export function linearOfBytes([red, green, blue]: Bytes): LinearRgb {
  return [decoded(red / 255), decoded(green / 255), decoded(blue / 255)];
}

const inGamut = (rgb: LinearRgb): boolean => rgb.every((light) => light >= -1e-6 && light <= 1 + 1e-6);

/** The screen's bytes. A colour beyond the screen's reach keeps lightness and hue and gives up chroma. */
export function bytesOf(colour: Oklch): Bytes {
  const [lightness, , hue] = colour;
  let chroma = colour[1];
  if (!inGamut(linearOfOklab(oklabOf(colour)))) {
    let low = 0;
    let high = chroma;
    for (let step = 0; step < 24; step++) {
      chroma = (low + high) / 2;
      if (inGamut(linearOfOklab(oklabOf([lightness, chroma, hue])))) low = chroma;
      else high = chroma;
    }
    chroma = low;
  }
  const [red, green, blue] = linearOfOklab(oklabOf([lightness, chroma, hue]));
  return [byte(red), byte(green), byte(blue)];
}

/** `#rrggbb`, for canvas and style sheets. */
export function hexOf(bytes: Bytes): string {
  return `#${bytes.map((value) => value.toString(16).padStart(2, '0')).join('')}`;
}

/** Difference of two colours as the eye has it: distance in OKLab; 0.02 is just seen side by side. */
export function colourDifference(a: Bytes, b: Bytes): number {
  const first = oklabOfLinear(linearOfBytes(a));
  const second = oklabOfLinear(linearOfBytes(b));
  return Math.hypot(first[0] - second[0], first[1] - second[1], first[2] - second[2]);
}

/** Relative luminance, 0 to 1 (WCAG 2.2, from IEC 61966-2-1). */
export function luminanceOf(bytes: Bytes): number {
  const [red, green, blue] = linearOfBytes(bytes);
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

/** Contrast ratio of two colours, 1 to 21 (WCAG 2.2). */
export function contrastOf(a: Bytes, b: Bytes): number {
  const first = luminanceOf(a);
  const second = luminanceOf(b);
  return (Math.max(first, second) + 0.05) / (Math.min(first, second) + 0.05);
}
