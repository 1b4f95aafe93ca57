// What the parts of a report say of single levels, before they are joined to an ascent. Missing is NaN.

export interface CodedLevel {
  /** Pa */
  readonly pressure: number;
  /** m above sea level, where the code gives it in full. */
  readonly height: number;
  /** Height of a standard surface, m, without the thousands or ten-thousands that the code leaves out. */
  readonly shortHeight: number;
  /** What was left out is a multiple of this, m. */
  readonly cycle: number;
  /** K */
  readonly temperature: number;
  /** K */
  readonly dewPoint: number;
  /** m/s */
  readonly speed: number;
  /** degrees */
  readonly direction: number;
  readonly surface: boolean;
}

const NOTHING: CodedLevel = {
  pressure: NaN,
  height: NaN,
  shortHeight: NaN,
  cycle: NaN,
  temperature: NaN,
  dewPoint: NaN,
  speed: NaN,
  direction: NaN,
  surface: false,
};

/** What a part of a report holds. */
export class PartContent {
  readonly levels: CodedLevel[] = [];
  /** Groups that make no sense where they stand. */
  garbled = 0;
  firstGarbled = '';
  /** Hours and minutes of release, `HHMM`, where section 7 gives them. */
  release: { hour: number; minute: number } | null = null;
  /** Some levels are placed by the standard atmosphere. */
  byStandard = false;

  add(level: Partial<CodedLevel>): void {
    this.levels.push({ ...NOTHING, ...level });
  }

  puzzle(group: string): void {
    if (this.garbled === 0) this.firstGarbled = group;
    this.garbled++;
  }
}
