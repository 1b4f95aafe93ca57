// Bulletins written by hand from the code tables (WMO-No. 306, Volume I.1: FM 32, FM 35); all stations are invented.

import { describe, expect, it } from 'vitest';
import { KNOT, specificHumidityOfDewPoint, standardHeight } from '../../../src/air/index.ts';
import { readProfiles, type ReadOptions } from '../../../src/ingest/index.ts';
import { profileAt, profilesOf, type Profile, type Station } from '../../../src/profile/index.ts';
import { bytesOf, pieces, readToEnd } from '../../support/sources.ts';

const JUNE = Date.UTC(2024, 5, 20);
const PLACE: Station = { id: '10999', name: 'Fenmoor', latitude: 52.5, longitude: 8.5, elevation: 130 };

const read = (text: string, options: Partial<ReadOptions> = {}, pieceLength = 4096): ReturnType<typeof readToEnd> =>
  readToEnd(
    readProfiles(pieces('feed.txt', bytesOf(text), pieceLength), {
      referenceTimeMs: JUNE,
      stationList: [PLACE],
      ...options,
    }),
  );
const one = async (text: string, options: Partial<ReadOptions> = {}): Promise<Profile> => {
  const { block, problems, formats } = await read(text, options);
  expect(problems).toEqual([]);
  expect(formats).toEqual(['temp-pilot']);
  expect(block.profileCount).toBe(1);
  return profileAt(block, 0);
};
/** Values of the level with a pressure, hPa. */
const at = (profile: Profile, hectopascals: number): Record<string, number> => {
  const k = [...profile.pressure!].findIndex((pressure) => Math.abs(pressure - hectopascals * 100) < 1);
  expect(k, `${hectopascals} hPa`).toBeGreaterThanOrEqual(0);
  const { heightAgl, temperature, specificHumidity, speed, direction } = profile;
  return {
    height: heightAgl[k]!,
    celsius: temperature![k]! - 273.15,
    humidity: specificHumidity![k]!,
    speed: speed[k]!,
    direction: direction[k]!,
  };
};

const HEADING = '\x01\r\r\n123 \r\r\nUSXX01 XQFM 151200\r\r\n';
// 995 hPa at 130 m: 14.6 degrees, dew point 6 below, 180 degrees 5 m/s. 1000 hPa lies below the ground.
const PART_A = `TTAA 15121 10999 99995 14656 18005 00088 ///// ///// 92745 10620
19511 85455 06850 20514 70025 01163 21018 50562 17175 22524 40725
29167 23031 30922 445// 23540 25042 537// 24045 20188 561// 24542
15374 555// 25030 10632 575// 25522 88212 569// 24046 77235 24048
43025 31313 46205 81118 51515 10164=`;
const PART_B = `TTBB 15128 10999 00995 14656 11948 15458 22700 01163 33500 17175
21212 00995 18005 11970 18512 22948 19019 33880 20014 31313 46205 81118 41414 25501=`;
const PART_C = 'TTCC 15125 10999 70862 577// 26010 50074 563// 27012 88999 77999=';
const PART_D = 'TTDD 1512/ 10999 11850 571// 22640 553// 21212 11930 25518 22500 27012=';

describe('a TEMP from land', () => {
  it('gives the surface, the standard surfaces and what lies between, heights in full', async () => {
    const profile = await one(`${HEADING}${PART_A}\r\r\n\x03`);
    expect(profile.station).toEqual(PLACE);
    expect(profile.instrument).toBe('radiosonde');
    expect(new Date(profile.timeMs).toISOString()).toBe('2024-06-15T11:18:00.000Z');
    const surface = at(profile, 995);
    expect(surface.height).toBe(0);
    expect(surface.celsius).toBeCloseTo(14.6, 3);
    expect(surface.humidity).toBeCloseTo(specificHumidityOfDewPoint(273.15 + 8.6, 99_500), 6);
    expect(surface).toMatchObject({ speed: 5, direction: 180 });
    // Code figures 745, 455, 025, 562, … are 745, 1455, 3025, 5620, … m above the sea, the station at 130 m.
    const heights = { 925: 745, 850: 1455, 700: 3025, 500: 5620, 400: 7250, 300: 9220, 250: 10_420, 200: 11_880 };
    for (const [pressure, height] of Object.entries(heights)) {
      expect(at(profile, Number(pressure)).height, pressure).toBeCloseTo(height - 130, 1);
    }
    expect(at(profile, 150).height).toBeCloseTo(13_740 - 130, 1);
    expect(at(profile, 100).height).toBeCloseTo(16_320 - 130, 1);
    expect(at(profile, 925)).toMatchObject({ speed: 11, direction: 195 });
    expect(at(profile, 700).celsius).toBeCloseTo(-1.1, 3);
    // Depression figure 63: 13 degrees; 75 at 500 hPa: 25 degrees.
    expect(at(profile, 700).humidity).toBeCloseTo(specificHumidityOfDewPoint(273.15 - 14.1, 70_000), 7);
    expect(at(profile, 500).humidity).toBeCloseTo(specificHumidityOfDewPoint(273.15 - 42.1, 50_000), 7);
    // No depression: no humidity.
    expect(at(profile, 300).humidity).toBeNaN();
    // Tropopause at 212 hPa and strongest wind at 235 hPa, between the surfaces by the weight of the air.
    expect(at(profile, 212)).toMatchObject({ speed: 46, direction: 240 });
    expect(at(profile, 235)).toMatchObject({ speed: 48, direction: 240 });
    expect(at(profile, 212).height).toBeGreaterThan(10_420 - 130);
    expect(at(profile, 212).height).toBeLessThan(11_880 - 130);
    // 1000 hPa is below the ground: no level of it.
    expect(Math.max(...profile.pressure!)).toBeCloseTo(99_500, 0);
    expect(profile.mark.every((mark) => mark === 0)).toBe(true);
  });

  it('joins the four parts to one ascent, in whatever order and pieces they come', async () => {
    const parts = [PART_A, PART_B, PART_C, PART_D];
    const whole = await one(parts.join('\n'));
    expect(whole.notes).toContain('Parts received: A, B, C, D.');
    expect(at(whole, 948)).toMatchObject({ speed: 19, direction: 190 });
    expect(at(whole, 948).celsius).toBeCloseTo(15.4, 3);
    expect(at(whole, 970)).toMatchObject({ speed: 12, direction: 185 });
    expect(at(whole, 970).celsius).toBeNaN();
    // Part C: tens of metres, ten-thousands left out; 70 hPa: 862 is 18 620 m. Part D in tenths of hectopascals.
    expect(at(whole, 70).height).toBeCloseTo(18_620 - 130, 0);
    expect(at(whole, 50).height).toBeCloseTo(20_740 - 130, 0);
    expect(at(whole, 85).celsius).toBeCloseTo(-57.1, 3);
    expect(at(whole, 93)).toMatchObject({ speed: 18, direction: 255 });
    const other = await read(HEADING + [...parts].reverse().join('\r\r\n'), {}, 7);
    expect([...profileAt(other.block, 0).heightAgl]).toEqual([...whole.heightAgl]);
    expect([...profileAt(other.block, 0).speed]).toEqual([...whole.speed]);
  });

  it('reads knots when 50 is added to the day, and calm as calm', async () => {
    const profile = await one(
      'TTAA 65128 10999 99995 14656 00000 00088 ///// ///// 92745 10620 19511 85455 06850 20514=',
    );
    expect(new Date(profile.timeMs).toISOString()).toBe('2024-06-15T12:00:00.000Z');
    expect(at(profile, 925).speed).toBeCloseTo(11 * KNOT, 5);
    expect(at(profile, 995)).toMatchObject({ speed: 0, direction: NaN });
  });

  it('takes winds only up to the surface that the indicator names, and trusts the groups where it errs', async () => {
    const upTo500 =
      'TTAA 15125 10999 99995 14656 18005 00088 ///// ///// 92745 10620 19511 85455 06850 20514 70025 01163 21018';
    const profile = await one(
      `${upTo500} 50562 17175 22524 40725 29167 30922 445// 25042 537// 20188 561// 88999 77999=`,
    );
    expect(at(profile, 500).speed).toBe(24);
    expect(at(profile, 400).speed).toBeNaN();
    expect(at(profile, 200).celsius).toBeCloseTo(-56.1, 3);
    const none = await one('TTAA 1512/ 10999 99995 14656 ///// 92745 10620 85455 06850 70025 01163 88999 77999=');
    expect(at(none, 925).speed).toBeNaN();
    expect(at(none, 850).celsius).toBeCloseTo(6.8, 3);
    // 2 stands for 250 as well as for 200 hPa.
    const until250 = await one(
      `${upTo500.replace('15125', '15122')} 50562 17175 22524 40725 29167 23031 30922 445// 23540 25042 537// 24045 20188 561// 15374 555// 10632 575// 88999=`,
    );
    expect(at(until250, 250).speed).toBe(45);
    expect(at(until250, 200)).toMatchObject({ speed: NaN, direction: NaN });
    expect(at(until250, 150).celsius).toBeCloseTo(-55.5, 3);
  });

  it('tells heights below the sea, in deep cold and over high ground', async () => {
    // 1000 hPa: figure 537 is 37 m below the sea.
    const low = await one('TTAA 15120 10999 99010 14656 18005 00537 14056 18006 92620 10620 85310 06850=', {
      stationList: [{ ...PLACE, elevation: -110 }],
    });
    expect(at(low, 1000).height).toBeCloseTo(73, 1);
    // Air of -50 degrees: 700 hPa at 2380 m, 850 at 1110 m; the figures are 380 and 110.
    const cold = await one(
      'TTAA 15127 10999 99025 50156 18005 00180 50156 18505 92690 49556 19006 85240 48956 19010 70480 50356 20012=',
      {
        stationList: [{ ...PLACE, elevation: 15 }],
      },
    );
    expect(at(cold, 850).height).toBeCloseTo(1240 - 15, 1);
    expect(at(cold, 700).height).toBeCloseTo(2480 - 15, 1);
    const high = await one(
      'TTAA 15125 10999 99652 12656 18005 00120 ///// ///// 92790 ///// ///// 85500 ///// ///// 70160 ///// ///// 50586 09975 22512=',
      {
        stationList: [{ ...PLACE, elevation: 3650 }],
      },
    );
    expect([...high.pressure!]).toEqual([65_200, 50_000]);
    expect([...high.heightAgl]).toEqual([0, 2210]);
  });

  it('opens without a known station and says what is missing', async () => {
    const { block, problems } = await read(PART_A, { stationList: [] });
    expect(problems).toEqual([]);
    const profile = profileAt(block, 0);
    expect(profile.station).toMatchObject({ id: '10999', latitude: NaN, elevation: NaN });
    expect(profile.notes.join(' ')).toContain('The position of station 10999 is not known');
    expect(profile.notes.join(' ')).toContain('the ground was put where the surface pressure lies');
    // The surface level at 995 hPa lies 42 m above the 1000 hPa surface at 88 m.
    expect(at(profile, 850).height).toBeGreaterThan(1455 - 135);
    expect(at(profile, 850).height).toBeLessThan(1455 - 125);
  });

  it('takes the later correction, and says so', async () => {
    const wrong = PART_A.replace('92745 10620', '92745 30620');
    for (const text of [
      `${HEADING}${wrong}\nUSXX01 XQFM 151200 CCA\n${PART_A}`,
      `USXX01 XQFM 151200 CCA\n${PART_A}\n${HEADING}${wrong}`,
    ]) {
      const profile = await one(text);
      expect(at(profile, 925).celsius).toBeCloseTo(10.6, 3);
      expect(profile.notes).toContain('A corrected report replaced an earlier one.');
    }
  });
});

describe('other TEMPs', () => {
  it('places a ship by its position, a mobile station with its height, a dropsonde over the sea', async () => {
    const ship = await one('UUAA QXYZ 15121 99301 70455 07025 99015 18656 18005 00125 18056 18506 92790 14620 19511=');
    expect(ship.station).toEqual({ id: 'QXYZ', name: 'QXYZ', latitude: 30.1, longitude: -45.5, elevation: 0 });
    expect(at(ship, 925).height).toBe(790);
    const mobile = await one(
      'IIAA QXM 15121 99455 10101 21854 02501 99985 18656 18005 00125 ///// ///// 92790 14620 19511=',
    );
    expect(mobile.station).toMatchObject({ id: 'QXM', latitude: 45.5, longitude: 10.1, elevation: 250 });
    expect(at(mobile, 925).height).toBe(540);
    const drop = await one('XXAA 15121 99201 50605 00000 99012 26656 18025 00105 25656 18026 92770 20620 19031=');
    expect(drop).toMatchObject({ instrument: 'dropsonde', station: { latitude: -20.1, longitude: -60.5 } });
    expect(at(drop, 1012).height).toBe(0);
  });

  it('reads several stations of a bulletin, NIL and junk between them', async () => {
    const text = `${HEADING}TTAA 15121 10888 NIL=\nTTAA 15121 10999 99995 14656 18005 92745 10620 19511=\n--- line noise ---
TTAA 15121 10777 99985 12656 18005 92725 08620 19511=\n\x03\nNNNN\nZCZC 44\nSOMETHING ELSE ALTOGETHER\n`;
    const { block, problems } = await read(text);
    expect([...profilesOf(block)].map(({ station }) => station.id)).toEqual(['10999', '10777']);
    expect(problems.map(({ code }) => code)).toEqual(['ingest/bulletin-nil']);
    expect(problems[0]!.what).toContain('10888');
  });

  it('keeps what is readable of a garbled report and names the place', async () => {
    const { block, problems } = await read(
      'junk\nTTAA 15121 10999 99995 14656 18005 92745 1O620 19511 85455 06850 20514=',
    );
    expect(at(profileAt(block, 0), 850)).toMatchObject({ speed: 14, direction: 205 });
    expect(problems[0]).toMatchObject({ code: 'ingest/bulletin-garbled', where: { source: 'feed.txt', line: 2 } });
    expect(problems[0]!.what).toContain('“1O620” in part A of 10999');
    const lost = await read(
      'TTAA 95121 10999 99995 14656 18005=\nTTAA 15121 10999 99995 14656 18005 92745 10620 19511=',
    );
    expect(lost.problems[0]).toMatchObject({ code: 'ingest/bulletin-head', where: { line: 1 } });
    expect(lost.block.profileCount).toBe(1);
  });

  it('needs a month and year from somewhere, and says where it took them', async () => {
    const bare = { referenceTimeMs: undefined };
    const { problems } = await read(PART_A, bare);
    expect(problems.map(({ code }) => code)).toEqual(['ingest/bulletin-without-date']);
    const named = await readToEnd(
      readProfiles(pieces('temp_20211231.txt', bytesOf(PART_A.replace('15121', '31121')), 99), bare),
    );
    expect(new Date(named.block.timeMs[0]!).toISOString()).toBe('2021-12-31T11:18:00.000Z');
    // The 31st seen from the 2nd of March is the one of January.
    const late = await one(PART_A.replace('15121', '31121'), { referenceTimeMs: Date.UTC(2024, 2, 2) });
    expect(new Date(late.timeMs).toISOString()).toBe('2024-01-31T11:18:00.000Z');
    expect(late.notes.join(' ')).toContain('day and hour only');
  });
});

describe('PILOT', () => {
  it('places winds at standard surfaces by the standard atmosphere, and those at heights as they are', async () => {
    const profile = await one(`PPAA 65123 10999 55385 18015 20020 22535 55340 23045 24055 24560 77212 25080 40510=
PPBB 65123 10999 90/12 16008 17012 17515 9456/ 19018 19520 80246 20522 21024 21526=`);
    expect(profile).toMatchObject({ instrument: 'pilot-balloon', station: PLACE });
    const { heightAgl, speed, direction, pressure } = profile;
    const level = (height: number): [number, number] => {
      const k = [...heightAgl].findIndex((value) => Math.abs(value - height) < 1);
      expect(k, `${height} m in ${[...heightAgl].join(' ')}`).toBeGreaterThanOrEqual(0);
      return [Math.round(speed[k]! / KNOT), direction[k]!];
    };
    expect(level(0)).toEqual([8, 160]);
    expect(level(300 - 130)).toEqual([12, 170]);
    expect(level(600 - 130)).toEqual([15, 175]);
    expect(level(45 * 300 - 130)).toEqual([18, 190]);
    expect(level(46 * 300 - 130)).toEqual([20, 195]);
    expect(level(1000 - 130)).toEqual([22, 205]);
    expect(level(2000 - 130)).toEqual([24, 210]);
    expect(level(3000 - 130)).toEqual([26, 215]);
    expect(level(standardHeight(85_000) - 130)).toEqual([15, 180]);
    expect(level(standardHeight(50_000) - 130)).toEqual([35, 225]);
    expect(level(standardHeight(21_200) - 130)).toEqual([80, 250]);
    expect([...pressure!].filter((value) => !Number.isNaN(value))).toHaveLength(7);
    expect(profile.notes.join(' ')).toContain('placed by the standard atmosphere');
  });

  it('reads strongest winds by height, upper parts, winds by pressure, and ships', async () => {
    const upper = await one(
      'PPCC 65123 10999 55270 27040 28045 71960 27550=\nPPDD 65123 10999 96358 26030 26532 27035 10012 28040 28542 29044=',
    );
    const heights = [...upper.heightAgl].map((height) => Math.round(height + 130));
    expect(heights).toEqual(
      expect.arrayContaining([19_600, 63 * 300, 65 * 300, 68 * 300, 100 * 300, 101 * 300, 102 * 300]),
    );
    const byPressure = await one('QQBB QXYZ 15127 99301 70455 07025 21212 00012 18005 11960 18512 22850 19015=');
    expect(byPressure).toMatchObject({ instrument: 'wind-profiler', station: { latitude: 30.1, longitude: -45.5 } });
    expect([...byPressure.pressure!]).toEqual([101_200, 96_000, 85_000]);
    expect(byPressure.heightAgl[2]).toBeCloseTo(standardHeight(85_000), 0);
  });

  it('takes thousands of feet where the region codes them, the step next to the ground for the surface', async () => {
    const plains: Station = { id: '72999', name: 'Nowhere', latitude: 38, longitude: -99, elevation: 880 };
    const profile = await one('PPBB 65120 72999 90346 17010 18025 19035 9089/ 20040 21040=', { stationList: [plains] });
    expect([...profile.heightAgl].map((height) => Math.round(height))).toEqual([0, 339, 949, 1558, 1863]);
    expect(profile.speed[1]).toBeCloseTo(25 * KNOT, 5);
  });

  it('joins the winds of a PILOT to the TEMP of the same ascent', async () => {
    const profile = await one(`${PART_A}\nPPBB 15128 10999 90/12 16008 17012 17515=`);
    expect(profile.instrument).toBe('radiosonde');
    const k = [...profile.heightAgl].findIndex((height) => Math.abs(height - 470) < 0.5);
    expect(profile.speed[k]).toBe(15);
    expect(profile.speed[0]).toBe(5);
  });
});
