// The inflow's numbers as rows, for tables on the page and files to take away.

import { directionOf, speedOf } from '../../air/index.ts';
import type { InflowState } from '../../desk/index.ts';
import type { DisplayUnits } from '../../site/index.ts';
import type { Figure, Ingredient, StormNumbers, VectorFigure } from '../../storm/index.ts';
import { MOVER_WORDS } from './inflow.ts';
import { directionText, heightText, plain, signed, speedText } from './numbers.ts';

/** A number with its unit, or in its place why there is none; and how it was had. */
export interface TableRow {
  readonly what: string;
  readonly value: string;
  readonly known: boolean;
  readonly method: string;
}

const HOUR = 3600;

export function windRows(storm: StormNumbers, units: DisplayUnits): TableRow[] {
  const { shear, helicity, motion, clusters, jetInflow, advection, mover } = storm;
  const speed = (figure: Figure): string => `${speedText(figure.value, units)} ${units.speed}`;
  const turn = (figure: Figure): string => `${plain(figure.value, 0)} m²/s²`;
  const row = (what: string, figure: Figure, shown: (figure: Figure) => string, method: string): TableRow => ({
    what,
    value: figure.why === '' ? shown(figure) : figure.why,
    known: figure.why === '',
    method,
  });
  const vector = (what: string, { u, v, why }: VectorFigure, method: string): TableRow => ({
    what,
    value:
      why === '' ? `${speedText(speedOf(u, v), units)} ${units.speed} from ${directionText(directionOf(u, v))}` : why,
    known: why === '',
    method,
  });
  const bulk = 'wind difference to the lowest level';
  const relative = `for the ${MOVER_WORDS[mover]}; Davies-Jones et al. 1990`;
  const bunkers = 'Bunkers et al. 2000';
  const corfidi = `Corfidi 2003, with ${clusters.jetFrom}`;
  return [
    row('Shear 0–1 km', shear.to1km, speed, bulk),
    row('Shear 0–3 km', shear.to3km, speed, bulk),
    row('Shear 0–6 km', shear.to6km, speed, bulk),
    row('Shear, effective', shear.effective, speed, 'inflow’s bottom to half the storm’s depth; Thompson et al. 2007'),
    row('Helicity 0–1 km', helicity.to1km, turn, relative),
    row('Helicity 0–3 km', helicity.to3km, turn, relative),
    row('Helicity, effective', helicity.effective, turn, `through the inflow layer, ${relative}`),
    vector('Inflow in the jet’s layer', jetInflow, `mean wind of the layer less the motion: ${MOVER_WORDS[mover]}`),
    vector('Right mover', motion.right, bunkers),
    vector('Left mover', motion.left, bunkers),
    vector('Mean wind 0–6 km', motion.mean, bunkers),
    vector('Cluster that builds upwind', clusters.upwind, corfidi),
    vector('Cluster that builds downwind', clusters.downwind, corfidi),
    vector('Cloud-layer wind', clusters.cloudLayer, 'mean of 850, 700, 500, 300 hPa; Corfidi 2003'),
    ...advection.map((layer) =>
      row(
        `Temperature advection ${heightText(layer.bottom, units)}–${heightText(layer.top, units)} ${units.height}`,
        layer,
        ({ value }) => `${signed(value * HOUR, 2)} K/h`,
        'from the turning of the wind, thermal wind relation; Holton & Hakim 2013',
      ),
    ),
  ];
}

/** A value in the reader's units. */
export function ingredientText({ unit }: Ingredient, value: number, units: DisplayUnits): string {
  switch (unit) {
    case 'kg/kg':
      return `${plain(value * 1000, 1)} g/kg`;
    case 'm/s':
      return `${speedText(value, units)} ${units.speed}`;
    case 'm':
      return `${heightText(value, units)} ${units.height}`;
    case 'm2/s2':
      return `${plain(value, 0)} m²/s²`;
    case 'kg/(m s)':
      return `${plain(value, 0)} kg/(m s)`;
    case 'J/kg':
      return `${plain(value, 0)} J/kg`;
  }
}

export function meetsWords({ meets }: Ingredient): string {
  return meets === null ? 'not known' : meets ? 'met' : 'not met';
}

/** Comma-separated, quotes doubled; NaN is an empty cell. */
function line(cells: readonly (string | number)[]): string {
  return cells
    .map((cell) => {
      if (typeof cell === 'number') return Number.isFinite(cell) ? String(Number(cell.toPrecision(7))) : '';
      return /[",\n]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;
    })
    .join(',');
}

const iso = (timeMs: number): string => new Date(timeMs).toISOString();

/** Air and parcel by level, SI in the keys; what it rests on stands in every line, so that a part of the file still tells. */
export function levelCsv({ columns, traces, feed, air }: InflowState, name: string): string {
  const trace = traces.find((each) => each.name === name);
  const parcel = (values: Float64Array | undefined, height: number): number => {
    if (trace === undefined || values === undefined) return NaN;
    const above = trace.heightAgl.findIndex((each) => each >= height - 1e-6);
    if (above < 0) return NaN;
    if (above === 0) return Math.abs(trace.heightAgl[0]! - height) < 1e-3 ? values[0]! : NaN;
    const share = (height - trace.heightAgl[above - 1]!) / (trace.heightAgl[above]! - trace.heightAgl[above - 1]!);
    return values[above - 1]! + share * (values[above]! - values[above - 1]!);
  };
  const head =
    'wind_station,air_station,air_time_utc,height_agl_m,pressure_pa,temperature_k,dewpoint_k,parcel,parcel_temperature_k,parcel_virtual_temperature_k';
  const lines = Array.from(columns.heightAgl, (height, k) =>
    line([
      feed.station.id,
      air?.station ?? '',
      air === null ? '' : iso(air.timeMs),
      height,
      columns.pressure[k]!,
      columns.temperature[k]!,
      columns.dewPoint[k]!,
      name,
      parcel(trace?.temperature, height),
      parcel(trace?.virtualTemperature, height),
    ]),
  );
  return [head, ...lines, ''].join('\n');
}

/** Wind by level with where it came from. */
export function windCsv({ hodograph, windTop, windMs, feed, storm }: InflowState): string {
  const head = 'station,time_utc,height_agl_m,u_mps,v_mps,speed_mps,direction_deg';
  const lines = Array.from({ length: hodograph.count }, (_, k) => {
    const [u, v] = [hodograph.u[k]!, hodograph.v[k]!];
    const aloft = hodograph.heightAgl[k]! > windTop ? storm.windAloft : null;
    return line([
      aloft?.station ?? feed.station.id,
      iso(aloft?.timeMs ?? windMs),
      hodograph.heightAgl[k]!,
      u,
      v,
      speedOf(u, v),
      directionOf(u, v),
    ]);
  });
  return [head, ...lines, ''].join('\n');
}

/** All numbers with their reasons and sources. */
export function numbersCsv(state: InflowState, storm: StormNumbers, ingredients: readonly Ingredient[]): string {
  const SI: DisplayUnits = { speed: 'm/s', height: 'm' };
  const head = 'group,what,value,reference,met,method_or_source';
  const parcels = storm.parcels.flatMap((parcel) =>
    (
      [
        ['start_height_agl_m', parcel.startHeight],
        ['lcl_height_agl_m', parcel.lclHeight],
        ['lfc_height_agl_m', parcel.lfcHeight],
        ['el_height_agl_m', parcel.elHeight],
        ['lcl_pressure_pa', parcel.lclPressure],
        ['lfc_pressure_pa', parcel.lfcPressure],
        ['el_pressure_pa', parcel.elPressure],
        ['cape_j_per_kg', parcel.cape],
        ['cin_j_per_kg', parcel.cin],
        ['lift_to_lfc_m', parcel.liftToLfc],
      ] as const
    ).map(([key, value]) => line([`parcel ${parcel.name}`, key, value, '', '', parcel.why])),
  );
  return [
    head,
    line(['times', 'looked_at_utc', iso(state.atMs), '', '', '']),
    line(['times', 'wind_utc', iso(state.windMs), '', '', state.feed.station.name]),
    line([
      'times',
      'air_utc',
      state.air === null ? '' : iso(state.air.timeMs),
      '',
      '',
      state.air?.name ?? state.airWhy,
    ]),
    ...parcels,
    ...windRows(storm, SI).map((row) => line(['wind', row.what, row.value, '', '', row.method])),
    ...ingredients.map((row) =>
      line([
        `ingredient ${row.ingredient}`,
        `${row.what}, ${row.unit}`,
        row.value,
        row.reference,
        meetsWords(row),
        row.why === '' ? row.source : `${row.why} (${row.source})`,
      ]),
    ),
    '',
  ].join('\n');
}
