// How colours look with a missing kind of cone, for checks of the scales.
// Source: Machado, Oliveira & Fernandes (2009, IEEE Trans. Vis. Comput. Graph. 15), matrices for severity 1.0, applied to
// linear light.

import { bytesOf, linearOfBytes, luminanceOf, oklabOfLinear, oklchOf, type Bytes } from '../../src/plot/colour.ts';

const MATRICES = {
  protanopia: [
    [0.152286, 1.052583, -0.204868],
    [0.114503, 0.786281, 0.099216],
    [-0.003882, -0.048116, 1.051998],
  ],
  deuteranopia: [
    [0.367322, 0.860646, -0.227968],
    [0.280085, 0.672501, 0.047413],
    [-0.01182, 0.04294, 0.968881],
  ],
  tritanopia: [
    [1.255528, -0.076749, -0.178779],
    [-0.078411, 0.930809, 0.147602],
    [0.004733, 0.691367, 0.303901],
  ],
} as const;

export type Deficiency = keyof typeof MATRICES;
export const DEFICIENCIES = Object.keys(MATRICES) as Deficiency[];

export function seenWith(deficiency: Deficiency, bytes: Bytes): Bytes {
  const light = linearOfBytes(bytes);
  const [red, green, blue] = MATRICES[deficiency].map((row) =>
    Math.min(1, Math.max(0, row[0] * light[0] + row[1] * light[1] + row[2] * light[2])),
  ) as [number, number, number];
  return bytesOf(oklchOf(oklabOfLinear([red, green, blue])));
}

/** As on a grey print. */
export function greyOf(bytes: Bytes): Bytes {
  const luminance = luminanceOf(bytes);
  return bytesOf(oklchOf(oklabOfLinear([luminance, luminance, luminance])));
}

export function lightnessOf(bytes: Bytes): number {
  return oklabOfLinear(linearOfBytes(bytes))[0];
}
