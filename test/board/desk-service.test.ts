import { describe, expect, it } from 'vitest';
import { DeskService } from '../../src/board/worker/desk-service.ts';
import type { ReadingProgress } from '../../src/board/worker/protocol.ts';
import { FIELDS } from '../../src/plot/index.ts';

const NO_SITE = { file: null, disc: { hubHeight: 100, rotorDiameter: 120 } };
const START = Date.UTC(2024, 4, 21, 22);
const STEP = 600_000;

/** A lidar's evening as a table: a nose of 15 m/s at 300 m, ten minutes apart. */
function csv(profiles: number, station = 'plain'): Blob {
  const lines = ['station,latitude,longitude,time,height_agl_m,speed_mps,direction_deg'];
  for (let k = 0; k < profiles; k++) {
    const time = new Date(START + k * STEP).toISOString();
    for (let z = 40; z <= 1000; z += 40) {
      const speed = 6 + 9 * Math.exp(-(((z - 320) / 180) ** 2));
      lines.push(`${station},38,-99,${time},${z},${speed.toFixed(2)},190`);
    }
  }
  return new Blob([lines.join('\n')]);
}

async function opened(profiles = 12): Promise<{ service: DeskService; feed: string; atMs: number }> {
  const service = new DeskService();
  service.open(NO_SITE);
  await service.read(1, [{ name: 'evening.csv', blob: csv(profiles) }], () => undefined);
  const [feed] = service.feeds();
  return { service, feed: feed!.key, atMs: START + (profiles - 1) * STEP };
}

describe('DeskService', () => {
  it('reads files, reports each, and finds the jet and the wind on the reader’s own disc', async () => {
    const service = new DeskService();
    service.open(NO_SITE);
    const told: ReadingProgress[] = [];
    const report = await service.read(
      1,
      [
        { name: 'evening.csv', blob: csv(12) },
        { name: 'broken.bin', blob: new Blob([new Uint8Array([1, 2, 3, 250])]) },
      ],
      (progress) => told.push(progress),
    );
    expect(report.files.map(({ name, profiles }) => [name, profiles])).toEqual([
      ['evening.csv', 12],
      ['broken.bin', 0],
    ]);
    expect(report.files[1]!.problems[0]!.mend).not.toBe('');
    expect(report.accepted).toEqual({ added: 12, repeated: 0, replaced: 0 });
    expect(told.map(({ current }) => current)).toEqual(expect.arrayContaining(['evening.csv', 'broken.bin']));

    const night = service.night(START + 11 * STEP, service.feeds()[0]!.key, '')!;
    expect(night.findings.at(-1)!.jets[0]!.noseHeight).toBe(320);
    expect(night.discs[0]!.turbine).toMatchObject({ hubHeight: 100, rotorDiameter: 120 });
    expect(night.discs[0]!.winds.at(-1)!.status).toBe('ok');
  });

  it('paints only up to the moment looked at', async () => {
    const { service, feed, atMs } = await opened();
    const view = { startMs: START - STEP, endMs: START + 23 * STEP, bottom: 0, top: 1000, width: 240, height: 50 };
    const question = { feed, field: 'speed', ceiling: 1000 } as const;
    expect(service.section(question)).toMatchObject({ filled: true, endMs: atMs });
    const look = { theme: 'dark', range: FIELDS.speed.range } as const;
    const half = service.paint({ ...question, ...look, view, untilMs: START + 5 * STEP })!;
    // Six of twenty-four intervals lie behind that moment: a quarter of the width.
    expect([half.view.width, half.pixels.length]).toEqual([60, 4 * 60 * 50]);
    expect(service.paint({ ...question, ...look, view, untilMs: view.startMs })).toBeNull();
  });

  it('lists in its table what was measured', async () => {
    const { service, feed, atMs } = await opened(3);
    const view = { startMs: START - STEP, endMs: atMs, bottom: 0, top: 1000, width: 100, height: 50 };
    const table = service.table({ feed, field: 'speed', ceiling: 1000, view, untilMs: atMs })!;
    expect([...table.timeMs]).toEqual([START, START + STEP, START + 2 * STEP]);
    const row = table.bottom.findIndex((bottom, r) => bottom <= 320 && table.top[r]! > 320);
    // exp(0) = 1 at the nose: 6 + 9 m/s.
    expect(table.values[row]).toBe(15);
    const csvText = service.csv(
      { feed, field: 'speed', ceiling: 1000, view, untilMs: atMs },
      { speed: 'kt', height: 'm' },
    );
    // 15 m/s are 29.158 kt.
    expect(csvText).toContain('29.16');
    expect(csvText.trim().split('\n')).toHaveLength(1 + 3 * 25);
  });

  it('places bulletins by a list of stations, whichever of the two comes first among the files', async () => {
    const bulletin = 'TTAA 15121 10999 99995 14656 18005 00088 ///// ///// 92745 10620 19511 85455 06850 20514=';
    const files = [
      { name: 'feed.txt', blob: new Blob([bulletin]), writtenMs: Date.UTC(2024, 5, 16) },
      { name: 'ours.csv', blob: new Blob(['id,name,lat,lon,elevation\n10999,Fenmoor,52.5,8.25,130\n,,1,2,3\n']) },
    ];
    const service = new DeskService();
    service.open(NO_SITE);
    expect(await service.stationLists(files)).toEqual([false, true]);
    const report = await service.read(1, files, () => undefined);
    expect(report.files.map(({ profiles, stations }) => [profiles, stations])).toEqual([
      [1, 0],
      [0, 1],
    ]);
    expect(report.files[1]!.problems[0]!.where).toMatchObject({ source: 'ours.csv', line: 3 });
    const place = { id: '10999', name: 'Fenmoor', latitude: 52.5, longitude: 8.25, elevation: 130 };
    expect(service.feeds()[0]).toMatchObject({ station: place, lastMs: Date.UTC(2024, 5, 15, 12) });
    service.open(NO_SITE);
    await service.read(2, files.slice(0, 1), () => undefined);
    expect(service.feeds()[0]!.station.latitude).toBeNaN();
  });

  it('stops reading when told, and keeps what it had', async () => {
    const service = new DeskService();
    service.open(NO_SITE);
    const files = [1, 2, 3].map((k) => ({ name: `${k}.csv`, blob: csv(6, `station-${k}`) }));
    const report = await service.read(7, files, ({ done }) => {
      if (done === 1) service.cancel(7);
    });
    expect(report.cancelled).toBe(true);
    expect(report.files.map(({ name }) => name)).toEqual(['1.csv']);
    expect(service.feeds().map(({ profiles }) => profiles)).toEqual([6]);
  });

  it('keeps its site when a site file cannot be used, and says what to mend', () => {
    const { site, problems } = new DeskService().open({ ...NO_SITE, file: { text: '{ "name": 7', name: 'site.json' } });
    expect(site.turbines).toHaveLength(1);
    expect(problems.length).toBeGreaterThan(0);
    expect(problems.every(({ mend }) => mend !== '')).toBe(true);
  });
});
