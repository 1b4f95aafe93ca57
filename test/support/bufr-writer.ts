// Writes BUFR messages for tests, element by element with widths stated by the test: nothing of the reader is used.

/** Bits in order, most significant first. */
export class BitWriter {
  readonly #bits: number[] = [];

  get length(): number {
    return this.#bits.length;
  }

  /** An unsigned number of so many bits; null: every bit set. */
  coded(width: number, value: number | null): this {
    let rest = value ?? 2 ** width - 1;
    const bits: number[] = [];
    for (let k = 0; k < width; k++) {
      bits.push(rest % 2);
      rest = Math.floor(rest / 2);
    }
    this.#bits.push(...bits.reverse());
    return this;
  }

  /** A value as Table B has it: (value x 10^scale - reference) in so many bits; null: missing. */
  value(value: number | null, scale: number, reference: number, width: number): this {
    return this.coded(width, value === null ? null : Math.round(value * 10 ** scale) - reference);
  }

  text(text: string, characters: number): this {
    for (let k = 0; k < characters; k++) this.coded(8, k < text.length ? text.charCodeAt(k) : 32);
    return this;
  }

  bytes(): Uint8Array {
    const bytes = new Uint8Array(Math.ceil(this.#bits.length / 8));
    this.#bits.forEach((bit, k) => (bytes[k >> 3]! |= bit << (7 - (k & 7))));
    return bytes;
  }
}

export interface MessageParts {
  readonly descriptors: readonly string[];
  readonly data: BitWriter | Uint8Array;
  readonly edition?: 2 | 3 | 4;
  readonly category?: number;
  readonly centre?: number;
  readonly reports?: number;
  readonly compressed?: boolean;
  readonly revision?: number;
  readonly section2?: Uint8Array;
  readonly masterTable?: number;
}

const pair = (value: number): number[] => [value >> 8, value & 255];
const triple = (value: number): number[] => [(value >> 16) & 255, (value >> 8) & 255, value & 255];

/** One message, header time 4 October 2031, 20:10 UTC. */
export function message(parts: MessageParts): Uint8Array {
  const { descriptors, data, edition = 4, category = 2, centre = 250, reports = 1, revision = 0 } = parts;
  const flag2 = parts.section2 === undefined ? 0 : 0x80;
  const master = parts.masterTable ?? 0;
  const section1 =
    edition === 4
      ? [
          ...triple(22),
          master,
          ...pair(centre),
          0,
          0,
          revision,
          flag2,
          category,
          255,
          0,
          40,
          0,
          ...pair(2031),
          10,
          4,
          20,
          10,
          0,
        ]
      : [
          ...triple(18),
          master,
          ...(edition === 3 ? [0, centre] : pair(centre)),
          revision,
          flag2,
          category,
          0,
          13,
          0,
          31,
          10,
          4,
          20,
          10,
          0,
        ];
  const section2 = parts.section2 === undefined ? [] : [...triple(4 + parts.section2.length), 0, ...parts.section2];
  const list = descriptors.flatMap((d) =>
    pair((Number(d[0]) << 14) | (Number(d.slice(1, 3)) << 8) | Number(d.slice(3))),
  );
  const flags = 0x80 | (parts.compressed === true ? 0x40 : 0);
  const section3 = [...triple(7 + list.length), 0, ...pair(reports), flags, ...list];
  const bits = data instanceof BitWriter ? data.bytes() : data;
  const before = [...section1, ...section2, ...section3];
  const length = 8 + before.length + 4 + bits.length + 4;
  const bytes = new Uint8Array(length);
  bytes.set([0x42, 0x55, 0x46, 0x52, ...triple(length), edition, ...before, ...triple(4 + bits.length), 0]);
  bytes.set(bits, 8 + before.length + 4);
  bytes.set([0x37, 0x37, 0x37, 0x37], length - 4);
  return bytes;
}

export function joined(...pieces: readonly (Uint8Array | string)[]): Uint8Array {
  const all = pieces.map((piece) => (typeof piece === 'string' ? new TextEncoder().encode(piece) : piece));
  const bytes = new Uint8Array(all.reduce((sum, piece) => sum + piece.length, 0));
  let at = 0;
  for (const piece of all) {
    bytes.set(piece, at);
    at += piece.length;
  }
  return bytes;
}
