// The inflow's answer as the pictures want it.

import type { InflowState } from '../../desk/index.ts';
import {
  colourScale,
  FIELDS,
  type InflowScene,
  type NamedVector,
  type SceneLayer,
  type StormHodograph,
} from '../../plot/index.ts';
import type { ParcelName, StormNumbers, VectorFigure } from '../../storm/index.ts';
import { eastward, northward } from '../../air/index.ts';
import type { ThemeName } from '../../plot/index.ts';
import type { Preferences } from './preferences.svelte.ts';

const PARCEL_NAMES: Readonly<Record<ParcelName, string>> = {
  'surface-based': 'surface',
  'mixed-layer': 'mixed-layer',
  'most-unstable': 'most unstable',
  'jet-fed': 'jet-fed',
};
/** m above ground: what lies higher moves no storm. */
const HODOGRAPH_CEILING = 10_000;

export function sceneOf(state: InflowState, name: ParcelName, top: number, preferences: Preferences): InflowScene {
  const { columns, hodograph, storm, jet, traces, windTop } = state;
  const trace = traces.find((each) => each.name === name);
  const parcel = storm.parcels.find((each) => each.name === name)!;
  // Heights of the parcel are above the ground of its air's station, those drawn above that of the wind's.
  const raise = trace === undefined ? 0 : trace.heightAgl[0]! - parcel.startHeight;
  return {
    air: columns,
    wind: hodograph,
    windTop,
    parcel:
      trace === undefined
        ? null
        : {
            ...trace,
            name: PARCEL_NAMES[name],
            lcl: parcel.lclHeight + raise,
            lfc: parcel.lfcHeight + raise,
            el: parcel.elHeight + raise,
            cape: parcel.cape,
            cin: parcel.cin,
          },
    layers: layersOf(storm, jet),
    nose: jet === null ? null : { height: jet.noseHeight, speed: jet.noseSpeed },
    top,
    hemisphere: state.feed.station.latitude < 0 ? 'south' : 'north',
    speedUnit: preferences.speed,
    heightUnit: preferences.height,
  };
}

function layersOf({ inflow }: StormNumbers, jet: InflowState['jet']): SceneLayer[] {
  const layers: SceneLayer[] = [];
  if (jet !== null) layers.push({ name: 'jet’s layer', bottom: jet.core.bottom, top: jet.core.top });
  if (inflow.kind === 'elevated' && inflow.stableLayer !== null) layers.push({ name: 'stable', ...inflow.stableLayer });
  return layers;
}

export function hodographOf(
  state: InflowState,
  motion: VectorFigure,
  byHand: boolean,
  preferences: Preferences,
  theme: ThemeName,
): StormHodograph {
  const { hodograph, windTop, storm, jet } = state;
  const named = (name: string, { u, v }: VectorFigure, mark: NamedVector['mark']): NamedVector => ({
    name,
    u,
    v,
    mark,
  });
  const { inflow } = storm;
  const reach = hodograph.heightAgl[hodograph.count - 1] ?? 0;
  return {
    wind: hodograph,
    windTop,
    ceiling: HODOGRAPH_CEILING,
    nose:
      jet === null || Number.isNaN(jet.noseDirection)
        ? null
        : {
            height: jet.noseHeight,
            u: eastward(jet.noseSpeed, jet.noseDirection),
            v: northward(jet.noseSpeed, jet.noseDirection),
          },
    vectors: [
      named('storm motion', Number.isNaN(motion.u) ? { ...motion, u: 0, v: 0 } : motion, 'motion'),
      named('builds upwind', storm.clusters.upwind, 'arrow'),
      named('builds downwind', storm.clusters.downwind, 'arrow'),
      named('cloud layer', storm.clusters.cloudLayer, 'dot'),
      named('mean 0–6 km', storm.motion.mean, 'dot'),
      // The mover that the motion stands on would be written over itself.
      ...(['right', 'left'] as const)
        .filter((mover) => byHand || mover !== storm.prevailing)
        .map((mover) => named(`${mover} mover`, storm.motion[mover], 'dot')),
    ],
    shaded: Number.isNaN(inflow.bottom)
      ? { bottom: 0, top: Math.min(3000, reach) }
      : { bottom: inflow.bottom, top: inflow.top },
    speedUnit: preferences.speed,
    heightUnit: preferences.height,
    colours: { scale: colourScale('speed', theme), range: preferences.ranges.speed ?? FIELDS.speed.range },
  };
}
