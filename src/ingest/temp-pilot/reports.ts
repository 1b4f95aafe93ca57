// Cuts a stream of text into single reports: bulletins with headings, several reports in each, junk between them.

/** Heading of a bulletin: when it was compiled, and whether it corrects an earlier one (BBB group, WMO-No. 386). */
export interface BulletinHeading {
  readonly day: number;
  readonly correction: boolean;
}

export type Platform = 'land' | 'ship' | 'drop' | 'mobile';
export type Part = 'A' | 'B' | 'C' | 'D';

export interface Report {
  readonly code: 'temp' | 'pilot';
  readonly platform: Platform;
  readonly part: Part;
  /** The groups after the letters that name code and part. */
  readonly groups: readonly string[];
  readonly heading: BulletinHeading | null;
  readonly correction: boolean;
  /** Line at which it begins, from one. */
  readonly line: number;
  /** More groups followed than a report can have; they were passed over. */
  readonly overlong: boolean;
}

const LETTERS: Readonly<Record<string, readonly [Report['code'], Platform]>> = {
  TT: ['temp', 'land'],
  UU: ['temp', 'ship'],
  XX: ['temp', 'drop'],
  II: ['temp', 'mobile'],
  PP: ['pilot', 'land'],
  QQ: ['pilot', 'ship'],
  EE: ['pilot', 'mobile'],
};
const BEGINNING = /^(TT|UU|XX|II|PP|QQ|EE)(AA|BB|CC|DD)$/u;
const CORRECTION = /^(?:CC[A-X]|COR)$/u;
/** A report with every level that the code knows has fewer. */
const MOST_GROUPS = 1500;
/** No group and no word of a heading is longer. */
const LONGEST_WORD = 32;

/** Text in the beginning of a file that only such bulletins have. */
export function holdsBulletins(text: string): boolean {
  return /(?:^|\s)(?:TT|UU|XX|II|PP|QQ|EE)(?:AA|BB|CC|DD)\s+(?:[0-8]\d[0-2]\d[\d/]\s|[A-Z0-9]{3,9}\s+[0-8]\d[0-2]\d[\d/]\s|\d{5}\s+NIL|NIL)/u.test(
    text,
  );
}

/** Fed with pieces of text, hands out each report when it is complete. Holds no more than one report. */
export class ReportCutter {
  #rest = '';
  #line = 1;
  #words: string[] = ['', '', ''];
  #heading: BulletinHeading | null = null;
  #open: { -readonly [key in keyof Report]: Report[key] } | null = null;
  #groups: string[] = [];

  /** @param last no more text will come */
  *feed(text: string, last = false): Generator<Report> {
    const all = this.#rest + text;
    let start = 0;
    for (let at = 0; at < all.length; at++) {
      const code = all.charCodeAt(at);
      if (code > 32 && code !== 61) continue;
      if (at > start) yield* this.#word(all.slice(start, Math.min(at, start + LONGEST_WORD + 1)));
      // An equals sign ends a report, the end-of-text character a bulletin.
      if (code === 61 || code === 3) yield* this.#close();
      if (code === 3) this.#heading = null;
      if (code === 10 || (code === 13 && all.charCodeAt(at + 1) !== 10)) this.#line++;
      start = at + 1;
    }
    this.#rest = all.slice(start, start + LONGEST_WORD + 1);
    if (!last) return;
    if (this.#rest !== '') yield* this.#word(this.#rest);
    this.#rest = '';
    yield* this.#close();
  }

  *#word(word: string): Generator<Report> {
    const beginning = BEGINNING.exec(word);
    if (beginning !== null) {
      yield* this.#close();
      const [code, platform] = LETTERS[beginning[1]!]!;
      this.#open = {
        code,
        platform,
        part: beginning[2]![0] as Part,
        groups: [],
        heading: this.#heading,
        correction: this.#heading?.correction ?? false,
        line: this.#line,
        overlong: false,
      };
    } else if (word === 'NNNN' || word === 'ZCZC') {
      yield* this.#close();
      this.#heading = null;
    } else if (this.#isHeadingTime(word)) {
      yield* this.#close();
      this.#heading = { day: Number(word.slice(0, 2)), correction: false };
    } else if (CORRECTION.test(word)) {
      if (this.#open !== null) this.#open.correction = true;
      else if (this.#heading !== null) this.#heading = { ...this.#heading, correction: true };
    } else if (this.#open !== null) {
      if (this.#groups.length < MOST_GROUPS) this.#groups.push(word);
      else this.#open.overlong = true;
    }
    this.#words = [this.#words[1]!, this.#words[2]!, word];
  }

  /** The third word of `TTAAii CCCC YYGGgg`. */
  #isHeadingTime(word: string): boolean {
    return (
      /^[0-3]\d[0-2]\d[0-5]\d$/u.test(word) &&
      /^[A-Z]{4}\d{0,2}$/u.test(this.#words[1]!) &&
      /^[A-Z]{4}$/u.test(this.#words[2]!)
    );
  }

  *#close(): Generator<Report> {
    if (this.#open === null) return;
    yield { ...this.#open, groups: this.#groups };
    this.#open = null;
    this.#groups = [];
  }
}
