import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readOutputSeries } from '../../src/ingest/index.ts';

const read = (text: string, zone?: string): [string, number][] => {
  const { timeMs, powerKw } = readOutputSeries('output.csv', text, zone);
  return Array.from(timeMs, (ms, k) => [new Date(ms).toISOString().slice(0, 16), powerKw[k]!]);
};

describe('readOutputSeries', () => {
  it.each([
    ['time,output_mw\n2031-07-15T02:00Z,12.5\n2031-07-15T02:10Z,13\n', 12_500],
    ['Time (UTC);Power [kW]\n15.07.2031 02:00;12500,0\n15.07.2031 02:10;13000\n', 12_500],
    ['time\tgeneration\n2031-07-15 02:00\t12500\n2031-07-15 02:10\t13000\n', 12_500],
    ['date,note,W\n20310715T020000Z,x,12500000\n2031-07-15T02:10Z,,13000000\n', 12_500],
  ])('reads units and delimiters: %j', (text, kilowatts) => {
    const rows = read(text);
    expect(rows).toEqual([
      ['2031-07-15T02:00', kilowatts],
      ['2031-07-15T02:10', 13_000],
    ]);
  });

  it('sorts by time, keeps the last of equal times, keeps what is missing as missing', () => {
    const text = 'time,kw\n2031-07-15T02:10Z,5\n2031-07-15T02:00Z,\n2031-07-15T02:10Z,6\n2031-07-15T02:20Z,-\n';
    expect(read(text)).toEqual([
      ['2031-07-15T02:00', NaN],
      ['2031-07-15T02:10', 6],
      ['2031-07-15T02:20', NaN],
    ]);
  });

  it("takes times without a zone in the site's, and says what it took", () => {
    const text = 'time,power\n2031-07-15 02:00,5\n';
    expect(read(text, 'America/Chicago')).toEqual([['2031-07-15T07:00', 5]]);
    expect(readOutputSeries('output.csv', text, 'America/Chicago').notes).toEqual([
      'power states no unit: taken as kW',
      'times state no zone: taken as America/Chicago',
    ]);
  });

  it('names the rows it cannot read and goes on', () => {
    const rows = ['nonsense,1', '2031-07-15T02:00Z,abc', '2031-07-15T02:10Z,7', ...Array<string>(8).fill('x,y')];
    const { powerKw, problems } = readOutputSeries('output.csv', ['time,kw', ...rows].join('\n'));
    expect([...powerKw]).toEqual([7]);
    expect(problems.map((problem) => problem.where.line)).toEqual([2, 3, 5, 6, 7, 8]);
    expect(problems.at(-1)!.what).toBe('5 more rows hold no time and number.');
  });

  it.each(['', 'a,b\n1,2\n', 'time,time\n'])('says what headings it needs: %j', (text) => {
    const { timeMs, problems } = readOutputSeries('output.csv', text);
    expect(timeMs).toHaveLength(0);
    expect(problems[0]!.code).toBe('ingest/output-headings');
  });

  it('never throws (property)', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 300 }), (text) => {
        const { timeMs, powerKw } = readOutputSeries('output.csv', `time,kw\n${text}`);
        expect(timeMs.length).toBe(powerKw.length);
      }),
    );
  });
});
