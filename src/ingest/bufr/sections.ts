// Sections 0 to 4 of one message: where its data lie and what its header says (WMO-No. 306, FM 94, editions 2 to 4).

import { damaged } from './trouble.ts';

export interface MessageHeader {
  readonly edition: number;
  /** 0 for meteorology. */
  readonly masterTable: number;
  readonly centre: number;
  /** Table A. */
  readonly category: number;
  /** Common code table C-13, edition 4 only; 255: none. */
  readonly subCategory: number;
  /** How many corrections came before. */
  readonly revision: number;
  /** UTC, ms; nominal, the data section knows better. NaN when it is no date. */
  readonly timeMs: number;
  readonly reports: number;
  readonly compressed: boolean;
  /** Section 3's list. */
  readonly descriptors: Uint16Array;
  /** Bytes of the message: first of the data, one after the last. */
  readonly dataStart: number;
  readonly dataEnd: number;
}

/** Section 3 lists of real templates hold some hundred descriptors at most. */
const MOST_DESCRIPTORS = 10_000;

export const uint16 = (bytes: Uint8Array, at: number): number => (bytes[at]! << 8) | bytes[at + 1]!;
export const uint24 = (bytes: Uint8Array, at: number): number => (uint16(bytes, at) << 8) | bytes[at + 2]!;

/** Byte positions of the sections as their own lengths have them. */
export interface Layout {
  readonly section1: number;
  readonly section3: number;
  readonly section4: number;
  /** Where section 5, `7777`, should stand. */
  readonly section5: number;
}

const SHORTEST = { section1: 17, section2: 4, section3: 7, section4: 4 } as const;

/**
 * Follows the sections' own lengths.
 * @param bytes from `BUFR` on, as many as are at hand
 * @returns undefined where the bytes end before, or a length is impossible
 */
export function layoutOf(bytes: Uint8Array): Layout | undefined {
  const section1 = 8;
  if (bytes.length < section1 + SHORTEST.section1) return undefined;
  const length1 = uint24(bytes, section1);
  if (length1 < SHORTEST.section1) return undefined;
  const hasSection2 = (bytes[section1 + (bytes[7] === 4 ? 9 : 7)]! & 0x80) !== 0;
  let at = section1 + length1;
  if (hasSection2) {
    if (bytes.length < at + 3) return undefined;
    const length2 = uint24(bytes, at);
    if (length2 < SHORTEST.section2) return undefined;
    at += length2;
  }
  const section3 = at;
  if (bytes.length < section3 + SHORTEST.section3) return undefined;
  const length3 = uint24(bytes, section3);
  if (length3 < SHORTEST.section3) return undefined;
  const section4 = section3 + length3;
  if (bytes.length < section4 + 3) return undefined;
  const length4 = uint24(bytes, section4);
  if (length4 < SHORTEST.section4) return undefined;
  return { section1, section3, section4, section5: section4 + length4 };
}

/** What messages are called by their category (Table A), for those that are passed over. */
export const CATEGORY_WORDS: Readonly<Record<number, string>> = {
  0: 'surface observations on land',
  1: 'surface observations at sea',
  2: 'vertical soundings',
  3: 'satellite soundings',
  4: 'aircraft and other single-level observations',
  5: 'satellite winds and other single-level satellite data',
  6: 'weather radar data',
  7: 'synoptic features',
  8: 'chemical constituents',
  9: 'dispersal and transport',
  10: 'radiological data',
  11: 'code tables',
  12: 'satellite observations of the surface',
  13: 'forecasts',
  14: 'warnings',
  20: 'status information',
  21: 'satellite radiances',
  31: 'ocean observations',
  32: 'ground-based lidar data',
};

/**
 * Reads the header sections.
 * @throws DuskveerError `ingest/bufr-damaged`
 */
export function readHeader(bytes: Uint8Array, layout: Layout): MessageHeader {
  const edition = bytes[7]!;
  const { section1: s1, section3: s3 } = layout;
  const count = (layout.section4 - s3 - SHORTEST.section3) >> 1;
  if (count > MOST_DESCRIPTORS) throw damaged(`The message lists ${count} descriptors.`, s3);
  const descriptors = new Uint16Array(count);
  for (let k = 0; k < count; k++) descriptors[k] = uint16(bytes, s3 + SHORTEST.section3 + 2 * k);
  const flags = bytes[s3 + 6]!;
  const common = {
    edition,
    masterTable: bytes[s1 + 3]!,
    reports: uint16(bytes, s3 + 4),
    compressed: (flags & 0x40) !== 0,
    descriptors,
    dataStart: layout.section4 + SHORTEST.section4,
    dataEnd: layout.section5,
  };
  if (edition === 4) {
    return {
      ...common,
      centre: uint16(bytes, s1 + 4),
      revision: bytes[s1 + 8]!,
      category: bytes[s1 + 10]!,
      subCategory: bytes[s1 + 11]!,
      timeMs: utc(uint16(bytes, s1 + 15), bytes.subarray(s1 + 17, s1 + 22)),
    };
  }
  const ofCentury = bytes[s1 + 12]!;
  return {
    ...common,
    // Edition 3 keeps a sub-centre before the centre; edition 2 has the centre in both.
    centre: edition === 3 ? bytes[s1 + 5]! : uint16(bytes, s1 + 4),
    revision: bytes[s1 + 6]!,
    category: bytes[s1 + 8]!,
    subCategory: 255,
    // Year of the century, 100 for 2000; the code began in the 1980s.
    timeMs: utc(ofCentury > 70 && ofCentury < 100 ? 1900 + ofCentury : 2000 + (ofCentury % 100), [
      ...bytes.subarray(s1 + 13, s1 + 17),
      0,
    ]),
  };
}

function utc(year: number, rest: ArrayLike<number>): number {
  const [month, day, hour, minute, second] = [rest[0]!, rest[1]!, rest[2]!, rest[3]!, rest[4]!];
  if (year < 1900 || month < 1 || month > 12 || day < 1 || day > 31 || hour > 24 || minute > 59) return NaN;
  return Date.UTC(year, month - 1, day, hour, minute, second > 60 ? 0 : second);
}
