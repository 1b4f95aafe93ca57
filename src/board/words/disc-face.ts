// The face of a disc with its labels in the reader's units.

import type { DiscFaceWind } from '../../desk/index.ts';
import type { DiscFace } from '../../plot/index.ts';
import type { DisplayUnits, TurbineType } from '../../site/index.ts';
import { directionText, heightText, speedText } from './numbers.ts';

export function faceOf(turbine: TurbineType, wind: DiscFaceWind, nose: number, units: DisplayUnits): DiscFace {
  const { hubHeight, rotorDiameter } = turbine;
  return {
    hubHeight,
    rotorDiameter,
    slices: wind.slices.map((slice) => ({
      ...slice,
      label:
        `${heightText(slice.height, units)} ${units.height}  ${speedText(slice.speed, units)} ${units.speed}  ` +
        `${directionText(slice.direction)}  ${slice.continued ? 'continued' : slice.instrument}`,
    })),
    nose,
    noseLabel: `nose ${heightText(nose, units)} ${units.height}`,
    measuredFrom: wind.measuredFrom,
    measuredTo: wind.measuredTo,
  };
}
