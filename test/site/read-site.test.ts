import { readdirSync, readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { INSTRUMENTS } from '../../src/profile/index.ts';
import { CRITERIA } from '../../src/jet/index.ts';
import { PLAIN_SITE, readSite } from '../../src/site/index.ts';
import schema from '../../static/schema/site.schema.json' with { type: 'json' };

const FULL = `{
  // Comments are allowed.
  "name": "Brackwater Ridge",
  "about": "Invented.",
  "time_zone": "America/Chicago",
  "file_time_zone": "Etc/GMT+6",
  "stations": [
    {
      "id": "lidar-1",
      "latitude_deg": 34.1,
      "longitude_deg": 258.5,
      "elevation_m": 870,
      "instrument": "lidar",
      "aliases": ["L1"],
      "speed_uncertainty_mps": 0.3
    },
    { "id": "north" }, { "id": "south" }
  ],
  "turbines": [
    {
      "name": "Heron 150",
      "count": 40,
      "hub_height_m": 110,
      "rotor_diameter_m": 150,
      "power_curve": { "speed_mps": [3, 8, 12, 25], "power_kw": [0, 2000, 4500, 4500] },
      "cut_in_mps": 3, "rated_mps": 12, "cut_out_mps": 25, "restart_mps": 22,
      "ground_elevation_m": 880
    }
  ],
  "terrain_axes": [
    { "name": "Scarp", "kind": "barrier", "bearing_deg": 360, "crest_height_m": 900, "stations": ["l1"] }
  ],
  "criteria": {
    "name": "ours", "ceiling_m": 1500,
    "categories": [{ "speed_mps": 8, "falloff_mps": 3 }, { "speed_mps": 12, "falloff_mps": 6 }]
  },
  "units": { "speed": "kt" },
  "columns": { "speed_kt": "Wind" },
  "neighbours": [["lidar-1", "north", "south"]],
  "upstream": [{ "station": "lidar-1", "from": ["south"] }],
  "migration": [{ "toward_deg": 350, "months": [3, 4, 5] }],
  "limits": [{ "name": "Crane", "kind": "lifting", "height_m": 80, "speed_mps": 9 }],
  "ramps": [{ "name": "steep", "share": 0.3, "within_minutes": 60 }],
  "design_shear_exponent": 0.14,
  "farm_factor": 0.92,
  "continuation": "power-law",
  "geostrophic_wind": { "speed_mps": 14, "direction_deg": 230 },
}`;

describe('readSite', () => {
  it('brings every key to the inside form', () => {
    const { site, problems } = readSite(FULL, 'site.json');
    expect(problems).toEqual([]);
    expect(site).toEqual({
      name: 'Brackwater Ridge',
      about: 'Invented.',
      timeZone: 'America/Chicago',
      fileTimeZone: 'Etc/GMT+6',
      stations: [
        {
          id: 'lidar-1',
          name: 'lidar-1',
          latitude: 34.1,
          longitude: -101.5,
          elevation: 870,
          instrument: 'lidar',
          aliases: ['L1'],
          speedUncertainty: 0.3,
        },
        ...['north', 'south'].map((id) => ({
          id,
          name: id,
          latitude: NaN,
          longitude: NaN,
          elevation: NaN,
          instrument: 'unknown',
          aliases: [],
          speedUncertainty: NaN,
        })),
      ],
      turbines: [
        {
          name: 'Heron 150',
          count: 40,
          hubHeight: 110,
          rotorDiameter: 150,
          powerCurve: { speed: [3, 8, 12, 25], powerKw: [0, 2000, 4500, 4500], airDensity: 1.225 },
          cutIn: 3,
          rated: 12,
          cutOut: 25,
          restart: 22,
          groundElevation: 880,
        },
      ],
      terrainAxes: [{ name: 'Scarp', kind: 'barrier', bearing: 0, crestHeight: 900, stations: ['l1'] }],
      criteria: {
        name: 'ours',
        ceiling: 1500,
        noseCeiling: 1500,
        candidates: 'every-maximum',
        falloffTo: 'risen-minimum',
        endingRise: 'uncertainty',
        categories: [
          { speed: 8, falloff: 3 },
          { speed: 12, falloff: 6 },
        ],
        ratioAbove: 1,
        riseBelow: 0,
      },
      units: { speed: 'kt', height: 'm' },
      columns: { speed_kt: 'Wind' },
      neighbours: [['lidar-1', 'north', 'south']],
      upstream: [{ station: 'lidar-1', from: ['south'] }],
      migration: [{ toward: 350, spread: 45, months: [3, 4, 5] }],
      limits: [{ name: 'Crane', kind: 'lifting', height: 80, speed: 9 }],
      ramps: [{ name: 'steep', share: 0.3, withinS: 3600 }],
      designShear: 0.14,
      farmFactor: 0.92,
      continuation: 'power-law',
      geostrophicWind: { speed: 14, direction: 230 },
    });
  });

  it('needs nothing but a name', () => {
    expect(readSite('{"name": "Bare"}', 'x').site).toEqual({ ...PLAIN_SITE, name: 'Bare' });
  });

  it('reads every site file of the demo', () => {
    const root = new URL('../../demo-profiles/', import.meta.url);
    const files = readdirSync(root, { recursive: true })
      .map(String)
      .filter((path) => path.endsWith('site.json'));
    expect(files.length).toBeGreaterThan(0);
    for (const path of files) expect(readSite(readFileSync(new URL(path, root), 'utf8'), path).problems).toEqual([]);
  });

  it('offers in its schema exactly the instruments and criteria that the house has', () => {
    expect(schema.properties.stations.items.properties.instrument.enum).toEqual(INSTRUMENTS);
    expect(new Set(schema.properties.criteria.then.enum)).toEqual(new Set(Object.keys(CRITERIA)));
  });

  /** The full file with one passage changed: every problem as `line key: what mend`. */
  const spoiled = (from: string, to: string): string[] => {
    expect(FULL).toContain(from);
    const { site, problems } = readSite(FULL.replace(from, to), 'site.json');
    expect(site).toBeNull();
    return problems.map(({ where, what, mend }) => `${where.line} ${where.key ?? ''}: ${what} ${mend}`);
  };

  const lineIn = (passage: string): number => FULL.slice(0, FULL.indexOf(passage)).split('\n').length;

  it.each([
    ['"name": "Brackwater Ridge",', '', ': The key “name” is missing. Add it (Name of the site', 1],
    [
      '"hub_height_m": 110',
      '"hub_heigth_m": 110',
      'turbines[0].hub_heigth_m: The key “hub_heigth_m” is not known here. Did you mean “hub_height_m”?',
    ],
    ['34.1', '94.1', 'stations[0].latitude_deg: 94.1 is too large. Give at most 90.'],
    ['34.1', '"34 N"', 'stations[0].latitude_deg: "34 N" stands where a number belongs. Write a number.'],
    [
      '"lidar",',
      '"leidar",',
      'stations[0].instrument: "leidar" is none of the choices. Choose one of: unknown, radiosonde',
    ],
    ['"count": 40', '"count": 2.5', 'turbines[0].count: 2.5 stands where a whole number belongs.'],
    ['America/Chicago', 'Central', 'time_zone: “Central” is no time zone.'],
    ['"id": "north"', '"id": "L1"', 'stations[1].id: Another station is called “L1” too.'],
    [
      '[3, 8, 12, 25]',
      '[3, 12, 8, 25]',
      'turbines[0].power_curve.speed_mps[2]: Row 3 of the curve: the speed 8 does not rise',
    ],
    ['[3, 8, 12, 25]', '[3, 8, 25]', 'turbines[0].power_curve.power_kw: The curve has 3 speeds and 4 powers.'],
    [
      '[0, 2000, 4500, 4500]',
      '[0, 2, 4.5, 4.5]',
      'turbines[0].power_curve.power_kw: The greatest power of the curve is 4.5 kW.',
    ],
    [
      '[0, 2000, 4500, 4500]',
      '[0, 2e6, 4.5e6, 4.5e6]',
      'turbines[0].power_curve.power_kw[1]: Row 2 of the curve: 2000000 kW is more',
    ],
    [
      '[0, 2000, 4500, 4500]',
      '[0, -5, 4500, 4500]',
      'turbines[0].power_curve.power_kw[1]: -5 is too small. Give at least 0.',
    ],
    [
      '"cut_out_mps": 25',
      '"cut_out_mps": 11',
      'turbines[0].cut_out_mps: cut_out_mps (11) is not above rated_mps (12).',
    ],
    ['"restart_mps": 22', '"restart_mps": 26', 'turbines[0].restart_mps: restart_mps (26) is above cut_out_mps.'],
    [
      '"rotor_diameter_m": 150',
      '"rotor_diameter_m": 240',
      'turbines[0].rotor_diameter_m: A rotor of 240 m on a hub at 110 m would touch',
    ],
    [
      '"stations": ["l1"]',
      '"stations": ["l2"]',
      'terrain_axes[0].stations[0]: No station of this file is called “l2”.',
    ],
    [
      '"ceiling_m": 1500,',
      '"ceiling_m": 1500, "ending_rise_mps": "some",',
      'criteria.ending_rise_mps: "some" is not possible here. Write "uncertainty".',
    ],
    ['"falloff_mps": 6', '"falloff_mps": 2', 'criteria.categories[1]: This category is weaker than the one before it.'],
    ['[3, 4, 5]', '[3, 13]', 'migration[0].months[1]: 13 is too large.'],
    ['"share": 0.3', '"share": 30', 'ramps[0].share: 30 is too large. Give at most 1.'],
    [
      '["lidar-1", "north", "south"]',
      '["lidar-1", "north"]',
      'neighbours[0]: The list is too short. Give at least 3 entries.',
    ],
    ['"about": "Invented.",', '"about": "Invented.", "about": "Twice.",', 'about: The key “about” stands twice.'],
    ['"time_zone": "America/Chicago",', '"time_zone": "America/Chicago"', ': This is no JSON: comma expected.', 6],
  ])('names line, key and mend of %s', (from, to, message, line = lineIn(from)) => {
    const messages = spoiled(from, to);
    expect(
      messages.some((said) => said.startsWith(`${line} ${message}`)),
      messages.join('\n'),
    ).toBe(true);
  });

  it('names a criteria set that there is not, and all problems at once', () => {
    const { problems } = readSite('{"name": "", "criteria": "bonner", "units": 3}', 'x');
    expect(problems.map(({ where }) => where.key)).toEqual(expect.arrayContaining(['name', 'criteria', 'units']));
  });

  it('throws at nothing (property)', () => {
    const flips = fc.array(fc.tuple(fc.nat({ max: FULL.length - 1 }), fc.string({ maxLength: 2 })), { maxLength: 5 });
    fc.assert(
      fc.property(flips, (changes) => {
        const text = changes.reduce((spoilt, [at, put]) => spoilt.slice(0, at) + put + spoilt.slice(at + 1), FULL);
        const { site, problems } = readSite(text, 'x');
        expect(site === null).toBe(problems.length > 0);
      }),
    );
    fc.assert(
      fc.property(fc.json(), (text) => {
        const { site, problems } = readSite(text, 'x');
        expect(site === null).toBe(problems.length > 0);
      }),
    );
    expect(readSite('['.repeat(100_000), 'x').site).toBeNull();
    expect(readSite('', 'x').problems[0]!.what).toBe('The file is empty.');
  });
});
