// The disc's numbers in large figures, each with its age, its uncertainty and what it rests on.

import { toSpeedUnit } from '../../air/index.ts';
import type { NightState } from '../../desk/index.ts';
import type { DiscWind, WindAt } from '../../rotor/index.ts';
import type { DisplayUnits } from '../../site/index.ts';
import { equivalent, STALE_INTERVALS, type Answer } from './answers.ts';
import { directionText, plain, signed, speedText } from './numbers.ts';
import { durationWords } from './time.ts';

const MW = 1000;

/** @param type index of the turbine type among the site's */
export function rotorAnswers(night: NightState, type: number, stepMs: number, units: DisplayUnits): Answer[] {
  const last = night.timeMs.length - 1;
  const wind = night.discs[type]?.winds[last];
  const ageMs = night.atMs - (night.timeMs[last] ?? NaN);
  const common = {
    age: Number.isFinite(ageMs) ? `${durationWords(ageMs)} old` : 'no data',
    stale: !(ageMs <= STALE_INTERVALS * stepMs),
    none: '',
  };
  if (wind === undefined) return [];
  if (wind.status !== 'ok') {
    const why = [{ text: wind.why }, { text: coverWords(wind) }];
    return [{ ...common, title: 'Wind on the disc', figures: [], none: 'Not assessable', lines: why }];
  }
  return [hub, whole, power, shape].map((answer) => ({ ...common, ...answer(wind, night, type, units) }));
}

type Part = Pick<Answer, 'title' | 'figures' | 'lines'>;

function hub(wind: DiscWind, _: NightState, __: number, units: DisplayUnits): Part {
  const air = Number.isFinite(wind.airDensity)
    ? `air ${plain(wind.airDensity, 3)} kg/m³, from ${wind.densityFrom}`
    : `air density not known: ${wind.densityFrom}`;
  return {
    title: 'Wind at the hub',
    figures: [
      { value: speedText(wind.hubSpeed, units), unit: units.speed },
      { value: directionText(wind.hubDirection), unit: '' },
    ],
    lines: [
      { text: `± ${fine(wind.uncertainty.hubSpeed, units)} (${wind.uncertaintyFrom})${unsteady(wind, units)}` },
      { text: air },
    ],
  };
}

function whole(wind: DiscWind, _: NightState, __: number, units: DisplayUnits): Part {
  const speed = equivalent(wind);
  const forms = [`without veer ${fine(wind.equivalentSpeed, units)}`];
  if (wind.formsDiffer)
    forms.push(`exact integral ${fine(wind.integralSpeed, units)}: levels are coarse for this wind`);
  return {
    title: 'Wind over the disc',
    figures: [
      { value: speedText(speed, units), unit: units.speed },
      { value: signed(toSpeedUnit(speed - wind.hubSpeed, units.speed), 1), unit: 'over hub' },
    ],
    lines: [
      { text: `± ${fine(wind.uncertainty.equivalentSpeed, units)}; rotor-equivalent with veer, IEC 61400-12-1:2017` },
      { text: `${forms.join('; ')}; ${coverWords(wind)}` },
    ],
  };
}

function power(_: DiscWind, { farm, timeMs }: NightState, type: number): Part {
  const last = timeMs.length - 1;
  const { output } = farm;
  const title = 'Power, farm';
  if (output.why !== '') return { title, figures: [], lines: [{ text: `No power: ${output.why}.` }] };
  const one = output.types[type]!;
  return {
    title,
    figures: [
      { value: plain(output.equivalentKw[last]! / MW, 1), unit: 'MW' },
      { value: signed(output.differenceKw[last]! / MW, 1), unit: 'MW on hub height' },
    ],
    lines: [
      {
        text: `hub-height reckoning ${plain(output.hubKw[last]! / MW, 1)} MW of ${plain((output.ratedKw * output.factor) / MW, 0)}`,
      },
      {
        text:
          one.state[last] === 'stopped-high-wind'
            ? `one ${one.turbine.name}: stopped by high wind`
            : `one ${one.turbine.name}: ${plain(one.equivalentKw[last]! / MW, 2)} MW, by hub height ${plain(one.hubKw[last]! / MW, 2)}`,
      },
    ],
  };
}

function shape(wind: DiscWind, _: NightState, __: number, units: DisplayUnits): Part {
  const tip = ({ speed, direction }: WindAt): string =>
    Number.isFinite(speed)
      ? `${speedText(speed, units)} ${units.speed} from ${directionText(direction)}`
      : 'not measured';
  const veer = Number.isFinite(wind.veer)
    ? { value: `${signed(wind.veer, 0)}°`, unit: 'veer over the disc' }
    : { value: `${signed(wind.veerPer100M, 0)}°`, unit: 'veer per 100 m' };
  const { shearExponent: spreadOfShear } = wind.uncertainty;
  return {
    title: 'Shear and veer',
    figures: [{ value: plain(wind.shearExponent, 2), unit: 'exponent' }, veer],
    lines: [
      {
        text: `± ${plain(spreadOfShear, 2)}; lower half ${plain(wind.shearLower, 2)}, upper ${plain(wind.shearUpper, 2)}; veer ${signed(wind.veerPer100M, 1)}° per 100 m`,
      },
      { text: `lower tip ${tip(wind.bottom)}; upper tip ${tip(wind.top)}` },
    ],
  };
}

/** Empty where no instrument near the hub tells. */
function unsteady({ turbulence, gust }: DiscWind, units: DisplayUnits): string {
  const parts = [];
  if (Number.isFinite(turbulence)) parts.push(`turbulence ${plain(100 * turbulence, 0)} %`);
  if (Number.isFinite(gust)) parts.push(`gusts to ${speedText(gust, units)} ${units.speed}`);
  return parts.length === 0 ? '' : `; ${parts.join(', ')}`;
}

function coverWords({ coverage, continuedShare }: DiscWind): string {
  const measured = `${plain(100 * coverage, 0)} % of the disc lies within measured heights`;
  return continuedShare > 0 ? `${measured}, ${plain(100 * continuedShare, 0)} % continued by the power law` : measured;
}

function fine(speed: number, units: DisplayUnits): string {
  return `${plain(toSpeedUnit(speed, units.speed), 2)} ${units.speed}`;
}
