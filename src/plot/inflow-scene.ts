// What stands on the diagram and beside it, and where: the frames that share one height axis.

import type { HeightUnit, SpeedUnit } from '../air/index.ts';
import type { Frame, Look } from './pen.ts';
import { carriedDown } from './thermodynamic.ts';

/** Air by height. Columns ascend, m above ground; K and Pa. */
export interface SceneAir {
  readonly heightAgl: ArrayLike<number>;
  readonly pressure: ArrayLike<number>;
  readonly temperature: ArrayLike<number>;
  /** NaN where not known */
  readonly dewPoint: ArrayLike<number>;
}

/** Wind by height, m/s eastward and northward. */
export interface SceneWind {
  readonly count: number;
  readonly heightAgl: ArrayLike<number>;
  readonly u: ArrayLike<number>;
  readonly v: ArrayLike<number>;
}

/** A lifted parcel: its way up, and the heights, m above ground, that have names; NaN where it has none. */
export interface SceneParcel {
  readonly name: string;
  readonly heightAgl: ArrayLike<number>;
  readonly temperature: ArrayLike<number>;
  readonly virtualTemperature: ArrayLike<number>;
  readonly surroundings: ArrayLike<number>;
  readonly lcl: number;
  readonly lfc: number;
  readonly el: number;
  /** J/kg; NaN where not known */
  readonly cape: number;
  readonly cin: number;
}

/** A named span of heights, m above ground. */
export interface SceneLayer {
  readonly name: string;
  readonly bottom: number;
  readonly top: number;
}

export interface InflowScene {
  readonly air: SceneAir;
  readonly wind: SceneWind;
  /** m above ground: wind above this was measured earlier and is drawn dashed. */
  readonly windTop: number;
  readonly parcel: SceneParcel | null;
  readonly layers: readonly SceneLayer[];
  /** The jet's nose; null without a jet. */
  readonly nose: { readonly height: number; readonly speed: number } | null;
  /** m above ground: top of the picture. */
  readonly top: number;
  readonly hemisphere: 'north' | 'south';
  readonly speedUnit: SpeedUnit;
  readonly heightUnit: HeightUnit;
}

/** The diagram, the barbs and the speed, side by side on one height axis. Device pixels. */
export interface InflowFrames {
  readonly diagram: Frame;
  readonly barbs: Frame;
  readonly speed: Frame;
}

const AXIS = 62;
const FOOT = 42;
const HEAD = 26;
const BARBS = 52;
const GAP = 10;

/** Lays the frames out in a box of device pixels. */
export function inflowFrames(
  box: { readonly left: number; readonly top: number; readonly width: number; readonly height: number },
  scene: InflowScene,
  { ratio }: Look,
): InflowFrames {
  const top = box.top + HEAD * ratio;
  const height = Math.max(1, box.height - (HEAD + FOOT) * ratio);
  const left = box.left + AXIS * ratio;
  const room = Math.max(1, box.left + box.width - left - (BARBS + 2 * GAP) * ratio);
  // On a narrow screen the wind gives way first.
  const speedWidth = Math.min(0.3 * room, 190 * ratio);
  const diagramWidth = room - speedWidth;
  const shared = { top, height, yLow: 0, yHigh: scene.top };
  const [low, high] = temperatureSpan(scene);
  const barbsLeft = left + diagramWidth + GAP * ratio;
  return {
    diagram: { ...shared, left, width: diagramWidth, xLow: low, xHigh: high },
    barbs: { ...shared, left: barbsLeft, width: BARBS * ratio, xLow: 0, xHigh: 1 },
    speed: {
      ...shared,
      left: barbsLeft + (BARBS + GAP) * ratio,
      width: speedWidth,
      xLow: 0,
      xHigh: fastest(scene),
    },
  };
}

/** Dew points further than this left of the temperature do not widen the picture, K. */
const DRY_SHOWN = 32;
const LEAST_SPAN = 20;

/** From the dew points to the warmest line in view, K at the ground. */
function temperatureSpan({ air, parcel, top }: InflowScene): [low: number, high: number] {
  let low = Infinity;
  let high = -Infinity;
  for (let k = 0; k < air.heightAgl.length && air.heightAgl[k]! <= top; k++) {
    const across = carriedDown(air.temperature[k]!, air.heightAgl[k]!);
    const dew = carriedDown(air.dewPoint[k]!, air.heightAgl[k]!);
    high = Math.max(high, across);
    low = Math.min(low, across, Number.isNaN(dew) ? across : Math.max(dew, across - DRY_SHOWN));
  }
  for (let k = 0; parcel !== null && k < parcel.heightAgl.length && parcel.heightAgl[k]! <= top; k++) {
    const across = carriedDown(parcel.virtualTemperature[k]!, parcel.heightAgl[k]!);
    if (across > high) high = across;
  }
  if (!(high > low)) return [273, 313];
  const middle = (low + high) / 2;
  const span = Math.max(LEAST_SPAN, 1.08 * (high - low) + 2);
  return [middle - span / 2, middle + span / 2];
}

function fastest({ wind, top }: InflowScene): number {
  let most = 10;
  for (let k = 0; k < wind.count && wind.heightAgl[k]! <= top; k++)
    most = Math.max(most, Math.hypot(wind.u[k]!, wind.v[k]!));
  return 1.12 * most;
}
