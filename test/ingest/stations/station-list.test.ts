// Lists of stations as users have them; all stations are invented.

import { describe, expect, it } from 'vitest';
import { isStationList, readProfiles, readStationList, type StationList } from '../../../src/ingest/index.ts';
import { listedStation } from '../../../src/ingest/stations/find-station.ts';
import { degreesIn } from '../../../src/ingest/stations/degrees.ts';
import { bytesOf, pieces, readToEnd } from '../../support/sources.ts';

const read = (text: string): Promise<StationList> => readStationList(pieces('stations.csv', bytesOf(text), 7));
const PLAIN =
  'identifier,name,latitude,longitude,elevation\n10999,Fenmoor,52.5,8.25,130\n02365,Skarrholm,62.1,-17.5,\n';

/** A line in the archive's columns: identifier, latitude, longitude, elevation, state, name, years, count. */
const archiveLine = (id: string, latitude: number, longitude: number, elevation: number, name: string): string =>
  [
    id,
    latitude.toFixed(4).padStart(8),
    longitude.toFixed(4).padStart(9),
    elevation.toFixed(1).padStart(6),
    '  ',
    name.padEnd(30),
    '1990 2024  12345',
  ].join(' ');

describe('a table of stations', () => {
  it('gives a station a row, empty elevations missing', async () => {
    const { stations, problems } = await read(PLAIN);
    expect(problems).toEqual([]);
    expect(stations).toEqual([
      { id: '10999', name: 'Fenmoor', latitude: 52.5, longitude: 8.25, elevation: 130 },
      { id: '02365', name: 'Skarrholm', latitude: 62.1, longitude: -17.5, elevation: NaN },
    ]);
  });

  it.each([
    ['id;station;lat;lon;altitude [ft]\n10999;Fenmoor;52,5;8,25;426,51\n', 'semicolons, decimal commas, feet'],
    [
      'WMO\tName\tLatitude [deg]\tLongitude [deg]\tHeight (m)\n10999\tFenmoor\t52 30N\t8-15E\t130\n',
      'degrees and minutes',
    ],
    [
      '# ours\nname,latitude,longitude,elevation,wmo_id\n"Fenmoor",52.5,8.25,130 m,10999\n',
      'another order, units in cells',
    ],
    [
      'station_id,station_name,lat,lon,elevation\n-,-,deg,deg,m\n10999,Fenmoor,52.5,8.25,130\n',
      'units in a line below',
    ],
  ])('reads %j: %s', async (text) => {
    const { stations, problems } = await read(text);
    expect(problems).toEqual([]);
    expect(stations).toHaveLength(1);
    expect(stations[0]).toMatchObject({ id: '10999', name: 'Fenmoor', latitude: 52.5, longitude: 8.25 });
    expect(stations[0]!.elevation).toBeCloseTo(130, 2);
  });

  it('names the row that cannot be used and how to mend it, and uses the rest', async () => {
    const { stations, problems } = await read(
      'id,name,lat,lon,elevation\n10999,Fenmoor,152.5,8.25,130\n,Nameless,1,2,3\n\n10998,Highfen,52.6,8.3,tall\n10998,Highfen,50,8.3,90\n',
    );
    expect(stations).toEqual([{ id: '10998', name: 'Highfen', latitude: 52.6, longitude: 8.3, elevation: NaN }]);
    expect(problems.map(({ where }) => where.line)).toEqual([2, 3, 5, 6]);
    expect(problems.every(({ mend }) => mend !== '')).toBe(true);
    expect(problems[0]!.what).toContain('152.5');
  });

  it('says which headings it lacks', async () => {
    await expect(read('id,speed,direction\n10999,5,180\n')).rejects.toThrow(/no list of stations.*speed/u);
    await expect(read('')).rejects.toThrow(/no list of stations/u);
  });
});

describe('the list of the archive', () => {
  const list = [
    archiveLine('ABM00010999', 52.5, 8.25, 130, 'FENMOOR'),
    archiveLine('ABI0000FENM', -4.0333, -170.5, 7, 'FENMOOR PORT'),
    archiveLine('ZZV0000XQFM', -98.8888, -998.8888, -998.8, 'SHIP'),
  ].join('\n');

  it('is read by its columns; ships have no place', async () => {
    const { stations, problems } = await read(list);
    expect(problems).toEqual([]);
    expect(stations).toEqual([
      { id: 'ABM00010999', name: 'FENMOOR', latitude: 52.5, longitude: 8.25, elevation: 130 },
      { id: 'ABI0000FENM', name: 'FENMOOR PORT', latitude: -4.0333, longitude: -170.5, elevation: 7 },
      { id: 'ZZV0000XQFM', name: 'SHIP', latitude: NaN, longitude: NaN, elevation: NaN },
    ]);
  });

  it('is recognised, as are tables of stations, and tables of winds are not', () => {
    expect(isStationList(bytesOf(list))).toBe(true);
    expect(isStationList(bytesOf(PLAIN))).toBe(true);
    expect(isStationList(bytesOf('station,lat,lon,time,height,speed\nA,1,2,2024-06-01T00:00Z,10,5\n'))).toBe(false);
    const foreign = 'station;lat;lon;Messzeit;Wert\n' + 'A;1;2;2024;5\n'.repeat(20);
    expect(isStationList(bytesOf(foreign))).toBe(false);
    expect(isStationList(bytesOf('TTAA 15121 10999 99995 14656 18005='))).toBe(false);
  });
});

describe('a station list in use', () => {
  const PART_A = 'TTAA 15121 10999 99995 14656 18005 00088 ///// ///// 92745 10620 19511 85455 06850 20514=';
  const options = { referenceTimeMs: Date.UTC(2024, 5, 20) };

  it('places a bulletin, whatever form its identifier has there', async () => {
    const { stations } = await read(PLAIN);
    for (const id of ['10999', '0-20000-0-10999', '0-20001-0-10999', 'ABM00010999']) {
      const stationList = stations.map((station, k) => (k === 0 ? { ...station, id } : station));
      const { block } = await readToEnd(
        readProfiles(pieces('feed.txt', bytesOf(PART_A), 4096), { ...options, stationList }),
      );
      expect(block.stations).toEqual([{ ...stations[0], id: '10999' }]);
      expect(Object.values(block.notes).flat().join(' ')).not.toContain('not known');
    }
  });

  it('fills what a table of winds leaves open, and never what it says', async () => {
    const { stations } = await read(PLAIN);
    const table = 'time,station,elevation,height,speed,direction\n2024-06-01T00:00Z,fenmoor,99,100,5,180\n';
    const { block } = await readToEnd(
      readProfiles(pieces('winds.csv', bytesOf(table), 4096), { stationList: stations }),
    );
    expect(block.stations[0]).toMatchObject({ id: 'fenmoor', latitude: 52.5, longitude: 8.25, elevation: 99 });
  });

  it('is named, and not read, where profiles are looked for', async () => {
    const { block, problems } = await readToEnd(readProfiles(pieces('stations.csv', bytesOf(PLAIN), 4096)));
    expect(block.profileCount).toBe(0);
    expect(problems).toMatchObject([{ code: 'ingest/station-list', mild: true }]);
  });

  it('finds numbers that a spreadsheet has robbed of their noughts, and names that only one station bears', () => {
    const station = (id: string, name: string) => ({ id, name, latitude: 1, longitude: 2, elevation: 3 });
    const list = [station('2365', 'Skarrholm'), station('10999', 'Fen'), station('10998', 'Fen')];
    expect(listedStation(list, ['02365'])).toBe(list[0]);
    expect(listedStation(list, ['', 'skarrholm '])).toBe(list[0]);
    expect(listedStation(list, ['Fen'])).toBeUndefined();
    expect(listedStation([], ['Fen'])).toBeUndefined();
  });
});

it.each([
  ['52.5', 52.5],
  ['-8.25', -8.25],
  ['52.5S', -52.5],
  ['52°30\'36"N', 52.51],
  ['008-15W', -8.25],
])('degrees %j are %d', (text, degrees) => {
  expect(degreesIn(text, false)).toBeCloseTo(degrees, 9);
});

it.each(['52 61N', 'north', '', '1e3'])('%j are no degrees', (text) => {
  expect(degreesIn(text, false)).toBeNaN();
});
