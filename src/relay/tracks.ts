// `tracks`: the story of each jet through the night: when it began, how it went on, what kind it is and why; a JSON line a
// track.

import { toJsonNumber } from '../air/index.ts';
import { Desk } from '../desk/index.ts';
import { CRITERIA_NAMES, JET_KINDS, type Evidence, type JetStory, type TrackPoint } from '../jet/index.ts';
import { readPaths } from './blocks.ts';
import { parseOptions, type Command } from './command.ts';
import { chosenCriteria } from './jets.ts';
import { DECIMALS, isoTime } from './json-edge.ts';
import { LineWriter } from './output.ts';
import { SITE_OPTION, siteOf } from './site-option.ts';
import { STATIONS_HELP, STATIONS_OPTION, stationsOf } from './stations-option.ts';

export const command: Command = {
  help: `duskveer tracks PATH... [--criteria NAME] [--site FILE]

Reads profiles from files, from all files in folders, or from stdin (-), screens them, and joins the jets of successive
profiles into tracks. Order and repetition of the files make no difference; all profiles are held until the last is read (for
years of files there is scan). Stations that the site file names as upstream tell the wind undisturbed by terrain.

Prints a JSON line a track, feed by feed (the profiles of one station and instrument), by time of beginning:
  station, began, ended    UTC; ended is null while the jet lasts as far as the data go
  phase                    building, steady, easing or ended
  peak_time, peak_speed_mps, peak_height_agl_m
  kinds                    probability of each: ${JET_KINDS.join(', ')}
  points                   columns: time, nose_height_agl_m, nose_speed_mps, nose_direction_deg (smoothed along the track),
                           confidence (0 to 1)
  evidence                 looked_at, value (null where it could not be known), unit, threshold, speaks_for, weight (logarithm
                           of the odds: positive for that kind, negative against it), source
  words                    the same in a sentence

  --criteria NAME    ${CRITERIA_NAMES.join(', ')};
                     without it the site's, else duskveer
  --site FILE        stations, terrain, turbines, the site's own criteria
${STATIONS_HELP}`,
  async run(args) {
    const { values, positionals } = parseOptions(args, {
      ...SITE_OPTION,
      ...STATIONS_OPTION,
      criteria: { type: 'string' },
    });
    const site = await siteOf(values.site);
    const stations = await stationsOf(values.stations);
    const criteria = chosenCriteria(site, values.criteria);
    const desk = new Desk({ ...site, criteria });
    const code = await readPaths(positionals, site, {
      stations,
      take: (block) => {
        desk.accept(block);
        return Promise.resolve();
      },
    });
    const out = new LineWriter(process.stdout);
    for (const { key } of desk.feeds())
      for (const story of desk.stories({ feed: key })) await out.write(trackLine(story));
    await out.flush();
    return code;
  },
};

/** A story as the contract of `tracks` has it. */
function trackLine({ track, kinds, evidence, words }: JetStory): Record<string, unknown> {
  const { peak, points } = track;
  return {
    station: track.stationId,
    began: isoTime(track.beganMs),
    ended: track.endedMs === null ? null : isoTime(track.endedMs),
    phase: track.phase,
    peak_time: isoTime(peak.timeMs),
    peak_speed_mps: toJsonNumber(peak.noseSpeed, DECIMALS.speed),
    peak_height_agl_m: toJsonNumber(peak.noseHeight, DECIMALS.height),
    kinds: Object.fromEntries(JET_KINDS.map((kind) => [kind, toJsonNumber(kinds[kind], DECIMALS.share)])),
    points: {
      time: points.map(({ timeMs }) => isoTime(timeMs)),
      nose_height_agl_m: column(points, ({ noseHeight }) => noseHeight, DECIMALS.height),
      nose_speed_mps: column(points, ({ noseSpeed }) => noseSpeed, DECIMALS.speed),
      nose_direction_deg: column(points, ({ noseDirection }) => noseDirection, DECIMALS.direction),
      confidence: column(points, ({ confidence }) => confidence, DECIMALS.share),
    },
    evidence: evidence.map(evidenceLine),
    words,
  };
}

function column(points: readonly TrackPoint[], of: (point: TrackPoint) => number, decimals: number): (number | null)[] {
  return points.map((point) => toJsonNumber(of(point), decimals));
}

function evidenceLine(row: Evidence): Record<string, unknown> {
  return {
    looked_at: row.lookedAt,
    value: toJsonNumber(row.value, 3),
    unit: row.unit,
    threshold: row.threshold,
    speaks_for: row.speaksFor,
    weight: toJsonNumber(row.weight, 2),
    source: row.source,
  };
}
