import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { specificHumidityOfDewPoint } from '../../../src/air/index.ts';
import { readProfiles, type ReadOptions } from '../../../src/ingest/index.ts';
import { profileAt, profilesOf, type Profile } from '../../../src/profile/index.ts';
import { PLAIN_SITE, type Site } from '../../../src/site/index.ts';
import { bytesOf, pieces, readToEnd } from '../../support/sources.ts';

const read = async (
  text: string | Uint8Array,
  options: Partial<ReadOptions> = {},
  name = 'mast-7.csv',
  pieceLength = 1 << 20,
): ReturnType<typeof readToEnd> =>
  readToEnd(readProfiles(pieces(name, typeof text === 'string' ? bytesOf(text) : text, pieceLength), options));
const codes = ({ problems }: { problems: readonly { code: string }[] }): string[] => problems.map(({ code }) => code);
const first = async (text: string, options: Partial<ReadOptions> = {}): Promise<Profile> => {
  const { block, problems } = await read(text, options);
  expect(problems).toEqual([]);
  return profileAt(block, 0);
};
const site = (changes: Partial<Site>): Partial<ReadOptions> => ({ site: { ...PLAIN_SITE, ...changes } });

const LONG = `time,height,speed,direction
2024-06-01T00:00:00Z,40,7.25,200
2024-06-01T00:00:00Z,80,9.5,205
2024-06-01T00:10:00Z,40,7,201
`;

describe('a long table', () => {
  it('makes a profile of each time', async () => {
    const { block, problems, formats } = await read(LONG);
    expect(problems).toEqual([]);
    expect(formats).toEqual(['csv']);
    expect([...block.timeMs]).toEqual([Date.UTC(2024, 5, 1), Date.UTC(2024, 5, 1, 0, 10)]);
    expect([...block.heightAgl]).toEqual([40, 80, 40]);
    expect([...block.speed]).toEqual([7.25, 9.5, 7]);
    expect(block.stations[0]).toMatchObject({ id: 'mast-7', latitude: NaN });
  });

  it.each([
    ['semicolons and decimal commas', 'time;height;speed;direction\n2024-06-01 00:00;40,5;7,25;200\n'],
    ['tabs', 'time\theight\tspeed\tdirection\n2024-06-01 00:00\t40.5\t7.25\t200\n'],
    ['bars and blanks', 'time | height | speed | direction\n2024-06-01 00:00 | 40.5 | 7.25 | 200\n'],
    ['quotation marks', '"time","height","speed","direction"\n"2024-06-01 00:00","40.5","7.25","200"\n'],
    ['a byte order mark and CRLF', '\ufefftime,height,speed,direction\r\n2024-06-01 00:00,40.5,7.25,200\r\n'],
    ['old line ends', 'time,height,speed,direction\r2024-06-01 00:00,40.5,7.25,200\r'],
    ['comments', '# made up\n# time is UTC\ntime,height,speed,direction\n# here\n2024-06-01 00:00,40.5,7.25,200\n'],
    ['a heading that is a comment', '# time,height,speed,direction\n2024-06-01 00:00,40.5,7.25,200\n'],
    ['a line of units', 'time,height,speed,direction\nUTC,m,m/s,deg\n2024-06-01 00:00,40.5,7.25,200\n'],
    ['no last line end', 'time,height,speed,direction\n2024-06-01 00:00,40.5,7.25,200'],
    [
      'words before the table',
      'Night of the mast\nno rain\n\ntime,height,speed,direction\n2024-06-01 00:00,40.5,7.25,200',
    ],
    ['date and time apart', 'date,time,height,speed,direction\n2024-06-01,00:00,40.5,7.25,200'],
    ['date and hour', 'date,hour,minute,height,speed,direction\n01.06.2024,0,0,40.5,7.25,200'],
    ['all parts apart', 'year,month,day,hour,minute,height,speed,direction\n2024,6,1,0,0,40.5,7.25,200'],
    ['seconds since 1970', 'epoch,height,speed,direction\n1717200000,40.5,7.25,200'],
    ['components', 'time,z,u,v\n2024-06-01 00:00,40.5,2.479646,6.812772'],
    ['knots and feet', 'time,height_ft,speed (kt),direction\n2024-06-01 00:00,132.8740,14.0929,200'],
    ['kilometres told by their values', kilometres()],
  ])('reads %s', async (_, text) => {
    const { block, problems } = await read(text);
    expect(problems).toEqual([]);
    const profile = profileAt(block, 0);
    expect(profile.timeMs).toBe(Date.UTC(2024, 5, 1));
    expect(profile.heightAgl[0]).toBeCloseTo(40.5, 3);
    expect(profile.speed[0]).toBeCloseTo(7.25, 4);
    expect(profile.direction[0]).toBeCloseTo(200, 3);
  });

  it('reads two-byte texts and the old western encoding', async () => {
    const text = 'time,height,speed,direction,temperature (°C)\n2024-06-01 00:00,40,7,200,11.5\n';
    const wide = new Uint8Array(2 + 2 * text.length);
    wide.set([0xff, 0xfe]);
    const western = Uint8Array.from(text, (letter) => letter.charCodeAt(0));
    western.forEach((code, k) => (wide[2 + 2 * k] = code));
    for (const bytes of [wide, western]) {
      const { block, problems } = await read(bytes);
      expect(problems).toEqual([]);
      expect(block.temperature![0]).toBeCloseTo(284.65, 3);
    }
  });

  it('gives the same whatever the pieces it comes in', async () => {
    const text = `${LONG.replace(/\n/gu, '\r\n')}"2024-06-01T00:20:00Z","40","7,5",\r\n# end\r\n`.replace('7,5', '7.5');
    const whole = await read(text);
    for (const length of [1, 3, 7, 64]) expect(await read(text, {}, 'mast-7.csv', length)).toEqual(whole);
  });

  it('takes units from the values where none is stated, and says so', async () => {
    const kelvin = 'time,height,speed,temperature,pressure,rh\n2024-06-01 00:00,40,7,285,95000,0.5\n';
    const celsius = 'time,height,speed,temperature,pressure,rh\n2024-06-01 00:00,40,7,11.85,950,50\n';
    const [a, b] = [await first(kelvin), await first(celsius)];
    for (const { temperature, pressure, specificHumidity } of [a, b]) {
      expect(temperature![0]).toBeCloseTo(285, 3);
      expect(pressure![0]).toBeCloseTo(95_000, 1);
      expect(specificHumidity![0]).toBeCloseTo(a.specificHumidity![0]!, 7);
    }
    expect(a.notes.join()).toContain('temperature K, pressure Pa, relative humidity as a fraction');
    expect(b.notes.join()).toContain('temperature °C, pressure hPa, relative humidity %');
  });

  it('gets specific humidity of dew point, relative humidity and grams a kilogram', async () => {
    // Bolton's eq. 10 at 10 degrees Celsius is 12.27 hPa; with 950 hPa that is 8.07 g/kg.
    const dewPoint = await first('time,height,speed,pressure_hpa,td_c\n2024-06-01 00:00,40,7,950,10\n');
    expect(dewPoint.specificHumidity![0]).toBeCloseTo(0.00807, 4);
    expect(dewPoint.specificHumidity![0]).toBeCloseTo(specificHumidityOfDewPoint(283.15, 95_000), 7);
    const grams = await first('time,height,speed,q (g/kg)\n2024-06-01 00:00,40,7,8.5\n');
    expect(grams.specificHumidity![0]).toBeCloseTo(0.0085, 7);
    const ratio = await first('time,height,speed,mixing_ratio (g/kg)\n2024-06-01 00:00,40,7,10\n');
    expect(ratio.specificHumidity![0]).toBeCloseTo(0.01 / 1.01, 7);
  });

  it('tells stations apart in one file, and takes their places', async () => {
    const text = `station,lat,lon,elevation,time,height,speed,direction
a,50,8,120,2024-06-01 00:00,40,1,10
b,51,9,300,2024-06-01 00:00,40,2,20
a,50,8,120,2024-06-01 00:00,80,3,30
b,51,9,300,2024-06-01 00:00,80,4,40
`;
    const { block, problems } = await read(text);
    expect(problems).toEqual([]);
    expect(block.stations).toEqual([
      { id: 'a', name: 'a', latitude: 50, longitude: 8, elevation: 120 },
      { id: 'b', name: 'b', latitude: 51, longitude: 9, elevation: 300 },
    ]);
    expect([...profilesOf(block)].map(({ station, speed }) => [station.id, ...speed])).toEqual([
      ['a', 1, 3],
      ['b', 2, 4],
    ]);
  });

  it('takes height above sea level with the elevation of file or site, else says what it did', async () => {
    const text = 'time,altitude,speed\n2024-06-01 00:00,340,7\n';
    const station = {
      id: 'Mast-7',
      name: 'Mast 7',
      latitude: 50,
      longitude: 8,
      elevation: 300,
      instrument: 'mast' as const,
      aliases: [],
      speedUncertainty: NaN,
    };
    const placed = await first(text, site({ stations: [station] }));
    expect(placed).toMatchObject({ station: { id: 'Mast-7', elevation: 300 }, instrument: 'mast' });
    expect(placed.heightAgl[0]).toBe(40);
    expect((await first(`# elevation: 310 m\n${text}`)).heightAgl[0]).toBe(30);
    const lost = await first(text);
    expect(lost.heightAgl[0]).toBe(340);
    expect(lost.notes.join()).toContain('the elevation of the station is not known');
    const sounding = await first('time,altitude,pressure,speed\n2024-06-01,340,970,7\n2024-06-01,440,960,8\n');
    expect([...sounding.heightAgl]).toEqual([0, 100]);
    expect(sounding.station.elevation).toBe(340);
  });

  it('works heights out of pressures where there are no heights', async () => {
    // Dry air of 15 degrees between 1000 and 900 hPa: (287.05 / 9.80665) 288.15 ln(10/9) = 888.65 m.
    const rows = 'time,pressure_hpa,temperature_c,speed\n2024-06-01,1000,15,5\n2024-06-01,900,15,6\n';
    const profile = await first(rows);
    expect(profile.heightAgl[0]).toBe(0);
    expect(profile.heightAgl[1]).toBeCloseTo(888.65, 1);
    expect(profile.notes.join()).toContain('weight of the air');
  });

  it('follows the site file in headings and zone', async () => {
    const text = 'Zeitpunkt;Gatter (m);Betrag [kt];Herkunft\n01.06.2024 02:00;40;10;200\n01.06.2024 02:00;80;12;210\n';
    const columns = { time: 'Zeitpunkt', height: 'Gatter (m)', speed: 'Betrag [kt]', direction: 'Herkunft' };
    const { block, problems } = await read(text, site({ columns, fileTimeZone: 'Europe/Berlin' }));
    expect(problems).toEqual([]);
    expect(block.timeMs[0]).toBe(Date.UTC(2024, 5, 1));
    expect(block.speed[0]).toBeCloseTo(5.1444, 4);
    const without = await read(text);
    expect(codes(without)).toEqual(['ingest/csv-no-time']);
    expect(without.problems[0]).toMatchObject({ where: { source: 'mast-7.csv', line: 1 } });
    expect(without.problems[0]!.what).toContain('Zeitpunkt, Gatter (m), Betrag [kt], Herkunft');
  });

  it('takes rows in any order of time and height together, and marks equal heights', async () => {
    const text = `time,height,speed
2024-06-01 00:00,40,1
2024-06-01 00:10,40,2
2024-06-01 00:00,80,3
2024-06-01 00:10,80,4
2024-06-01 00:10,80,5
`;
    const { block } = await read(text);
    expect([...profilesOf(block)].map(({ speed }) => [...speed])).toEqual([
      [1, 3],
      [2, 4, 5],
    ]);
    expect(block.mark[4]).not.toBe(0);
  });
});

/** A table of more than ten heights below 30 and in broken numbers: kilometres. */
function kilometres(): string {
  const rows = Array.from({ length: 12 }, (_, k) => `2024-06-01 00:00,${(0.0405 + 0.1 * k).toFixed(4)},7.25,200`);
  return `time,height,speed,direction\n${rows.join('\n')}\n`;
}

describe('a wide table', () => {
  it('makes a profile of each row, heights from the headings', async () => {
    const { block, problems } = await read(`time,ws_80m,ws_40m (m/s),wd_40,wd_80 (deg),temp_40m_c,ws_80m_std,battery
2024-06-01 00:00,9,7,200,205,11.5,0.5,12
2024-06-01 00:10,,7.5,210,215,11,0.5,12
`);
    expect(problems).toEqual([]);
    expect(block.profileCount).toBe(2);
    const { heightAgl, speed, direction, temperature, notes } = profileAt(block, 0);
    expect([...heightAgl]).toEqual([40, 80]);
    expect([...speed]).toEqual([7, 9]);
    expect([...direction]).toEqual([200, 205]);
    expect(temperature![0]).toBeCloseTo(284.65, 3);
    expect(temperature![1]).toBeNaN();
    expect(notes).toContain('Columns not used: battery.');
    expect([...profileAt(block, 1).speed]).toEqual([7.5, NaN]);
  });

  it('warns of headings that number the gates', async () => {
    expect(codes(await read('time,ws1,ws2,ws3\n2024-06-01 00:00,1,2,3\n'))).toEqual(['ingest/csv-gate-numbers']);
  });

  it('tells of a time that comes twice', async () => {
    const { block, problems } = await read('time,ws_40m\n2024-06-01 00:00,1\n2024-06-01 00:00,2\n');
    expect(problems.map(({ code, where }) => [code, where.line])).toEqual([['ingest/csv-time-again', 3]]);
    expect(block.profileCount).toBe(1);
  });
});

describe('bad tables', () => {
  it.each([
    ['a heading without rows', 'time,height,speed\n', 'ingest/csv-no-rows', 1],
    ['no height', 'time,speed,direction\n2024-06-01,1,2\n', 'ingest/csv-no-height', 1],
    ['no wind', 'time,height,temperature\n2024-06-01,1,2\n', 'ingest/csv-no-wind', 1],
    ['an unknown unit', 'time,height,speed,temperature [Rankine]\n2024-06-01,40,5,1\n', 'ingest/csv-unknown-unit', 1],
    ['a bad time', `${LONG}yesterday,40,5,1\n`, 'ingest/csv-time', 5],
    ['a bad number', `${LONG}2024-06-01T00:20Z,40,fast,1\n`, 'ingest/csv-cell', 5],
    ['a missing cell', `${LONG}2024-06-01T00:20Z,40\n2024-06-01T00:20Z,80,5,1\n`, 'ingest/csv-width', 5],
    ['an end within a row', `${LONG}2024-06-01T00:20Z,40`, 'ingest/csv-cut-short', 5],
    [
      'an open quotation mark',
      `${LONG}2024-06-01T00:20Z,"40,1,1\n2024-06-01T00:30Z,40,1,1\n`,
      'ingest/csv-quote-open',
      5,
    ],
    ['zero bytes', `${LONG}\0\0\0\x01\x02\n2024-06-01T00:30Z,40,1,1\n`, 'ingest/csv-width', 5],
  ])('%s', async (_, text, code, line) => {
    const { block, problems } = await read(text);
    const problem = problems.find((candidate) => candidate.code === code);
    expect(problem, problems.map(({ what }) => what).join()).toBeDefined();
    expect(problem!.where).toMatchObject({ source: 'mast-7.csv', line });
    if (text.startsWith(LONG)) expect([...block.speed].slice(0, 3)).toEqual([7.25, 9.5, 7]);
  });

  it('takes words, infinities and undeclared fills for missing, and says so of fills', async () => {
    const cells = ['', 'NaN', 'n/a', '-', 'inf', '-Infinity', '1e30', '9.96921e+36', '-9999', '999.9', '-99'];
    const rows = cells.map((cell, k) => `2024-06-01 00:00,${40 + k},${cell},200`);
    const { block, problems } = await read(
      `time,height,speed,direction\n${rows.join('\n')}\n2024-06-01 00:10,40,3,9\n`,
    );
    expect(problems).toEqual([]);
    expect([...profileAt(block, 0).speed].every(Number.isNaN)).toBe(true);
    expect(profileAt(block, 0).notes.join()).toContain('-9999');
    expect(profileAt(block, 1).notes.join()).not.toContain('-9999');
  });

  it('keeps implausible values that are no fills: screening is not reading', async () => {
    const profile = await first('time,height,speed,direction\n2024-06-01 00:00,40,250,200\n');
    expect(profile.speed[0]).toBe(250);
  });

  it('does not take prose, JSON or markup for a table', async () => {
    for (const text of ['Dear all, please,\nread, this,\n', '{"time":1,"height":2}\n', '<a>time,height,speed</a>\n']) {
      expect(codes(await read(text))).toEqual(['ingest/unknown-format']);
    }
  });

  it('stops at a row without end', async () => {
    const text = `${LONG}${'x'.repeat(3 << 20)}`;
    const { block, problems } = await read(text);
    expect(codes({ problems })).toContain('ingest/csv-row-too-long');
    expect(block.profileCount).toBe(2);
  });

  it('lets no exception out and keeps places, whatever happens to the bytes (property)', async () => {
    const wide = bytesOf('time;ws_40m;ws_80m;wd_40m\n2024-06-01 00:00;1,5;2;200\n2024-06-01 00:10;2,5;"3";210\n');
    const flips = fc.array(fc.tuple(fc.nat(), fc.nat({ max: 255 })), { maxLength: 8 });
    await fc.assert(
      fc.asyncProperty(fc.constantFrom(bytesOf(LONG), wide), flips, fc.nat(), async (bytes, changes, cut) => {
        const mutated = bytes.slice(0, cut % 2 === 0 ? cut % bytes.length : bytes.length);
        for (const [at, value] of changes) if (mutated.length > 0) mutated[at % mutated.length] = value;
        for (const { where, what, mend } of (await read(mutated)).problems) {
          expect(where.source === 'mast-7.csv' && what !== '' && mend !== '').toBe(true);
        }
      }),
      { numRuns: 300 },
    );
  });

  it('reads back what is written, whatever the numbers (property)', async () => {
    const level = fc.tuple(fc.double({ min: 0, max: 60, noNaN: true }), fc.integer({ min: 0, max: 359 }));
    const profiles = fc.array(fc.array(level, { minLength: 1, maxLength: 5 }), { minLength: 1, maxLength: 5 });
    await fc.assert(
      fc.asyncProperty(profiles, fc.constantFrom(',', ';', '\t'), async (nights, delimiter) => {
        const comma = delimiter === ';';
        const rows = nights.flatMap((levels, time) =>
          levels.map(([speed, direction], k) =>
            [
              `2024-06-01T00:0${time}:00Z`,
              40 + 20 * k,
              comma ? String(speed).replace('.', ',') : speed,
              direction,
            ].join(delimiter),
          ),
        );
        const { block } = await read(
          ['time', 'height', 'speed', 'direction'].join(delimiter) + `\n${rows.join('\n')}\n`,
        );
        expect([...block.speed]).toEqual(nights.flat().map(([speed]) => Math.fround(speed)));
        expect([...block.direction]).toEqual(nights.flat().map(([, direction]) => direction));
      }),
      { numRuns: 50 },
    );
  });
});
