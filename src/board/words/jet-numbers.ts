// The numbers of one jet: how its nose changes, how thick and sheared its layer is, where it stands against the rotors.

import { toHeightUnit, toSpeedUnit } from '../../air/index.ts';
import type { JetFlank, JetLayer, JetStory, Rate, Turning } from '../../jet/index.ts';
import type { DisplayUnits, TurbineType } from '../../site/index.ts';
import { directionText, heightText, NONE, plain, signed, speedText } from './numbers.ts';

export interface NamedNumber {
  readonly name: string;
  readonly value: string;
  /** What it means or why it is missing; may be empty. */
  readonly words: string;
}

/** Below a quarter shear mixes the air; above one it dies down (Stull 1988). */
const MIXES = 0.25;
const DIES_DOWN = 1;

export function jetNumbers(
  { track, layer, thermal }: JetStory,
  discs: readonly TurbineType[],
  units: DisplayUnits,
): NamedNumber[] {
  const { height, speed } = units;
  const last = track.points.at(-1)!;
  const { rates } = track;
  return [
    {
      name: 'nose height',
      value: `${heightText(last.noseHeight, units)} ± ${heightText(last.heightSpread, units)} ${height}`,
      words: rateWords(rates.height, (value) => toHeightUnit(value, height), height, 0),
    },
    {
      name: 'nose speed',
      value: `${speedText(last.noseSpeed, units)} ± ${plain(toSpeedUnit(last.speedSpread, speed), 1)} ${speed}`,
      words: rateWords(rates.speed, (value) => toSpeedUnit(value, speed), speed, 1),
    },
    {
      name: 'nose direction',
      value: directionText(last.noseDirection),
      words: rateWords(rates.direction, (value) => value, 'degrees', 1),
    },
    ...(layer === null
      ? [{ name: 'layer', value: NONE, words: 'no nose in the very last profile of the jet' }]
      : layerNumbers(layer, discs, units)),
    ...(thermal === null
      ? []
      : [{ name: 'temperature advection', value: advection(thermal), words: thermal.words || thermal.why }]),
  ];
}

function rateWords(rate: Rate, shown: (value: number) => number, unit: string, decimals: number): string {
  if (!Number.isFinite(rate.perHour)) return 'change not known: too few profiles in the last hour and a half';
  return `${signed(shown(rate.perHour), decimals)} ± ${plain(shown(rate.uncertainty), decimals)} ${unit} an hour, over the last hour and a half`;
}

function layerNumbers(layer: JetLayer, discs: readonly TurbineType[], units: DisplayUnits): NamedNumber[] {
  const { below, above } = layer;
  const thickness = `${layer.thicknessIsBound ? 'at least ' : ''}${heightText(layer.thickness, units)} ${units.height}`;
  return [
    {
      name: 'core',
      value: Number.isNaN(layer.thickness) ? NONE : thickness,
      words: Number.isNaN(layer.thickness)
        ? 'the speed does not fall off above the nose'
        : `from ${heightText(below.bottom, units)} to ${heightText(above.top, units)} ${units.height}, where speed has fallen halfway to the minimum above`,
    },
    { name: 'below the nose', ...flankNumber(below) },
    { name: 'above the nose', ...flankNumber(above) },
    ...discs.map((disc, k) => ({
      name: `nose against ${disc.name}`,
      value: layer.noseAgainstDiscs[k] === 'in' ? 'in the disc' : `${layer.noseAgainstDiscs[k] ?? ''} the disc`,
      words: `hub ${heightText(disc.hubHeight, units)}, rotor ${heightText(disc.rotorDiameter, units)} ${units.height}`,
    })),
  ];
}

function flankNumber({ shear, richardson }: JetFlank): Pick<NamedNumber, 'value' | 'words'> {
  const value = Number.isNaN(shear) ? NONE : `${plain(1000 * shear, 0)} m/s per km`;
  if (Number.isNaN(richardson)) return { value, words: 'Richardson number not known: no temperature there' };
  const meaning =
    richardson < MIXES
      ? 'the shear mixes the air'
      : richardson < DIES_DOWN
        ? 'what mixing there is may go on'
        : 'too stable for mixing to start';
  return { value, words: `gradient Richardson number ${plain(richardson, 2)}: ${meaning} (Stull 1988)` };
}

function advection({ status, kelvinPerHour }: { status: string; kelvinPerHour: number }): string {
  return status === 'told' ? `${signed(kelvinPerHour, 1)} K/h` : NONE;
}

/** `faster than the speed given as geostrophic`: how a turning's last speed stands to it; empty where none is given. */
export function geostrophicWords({ supergeostrophic }: Turning): string {
  return Number.isFinite(supergeostrophic) ? `${plain(100 * supergeostrophic, 0)} %` : NONE;
}
