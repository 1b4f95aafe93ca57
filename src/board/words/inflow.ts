// What storms would get of the air, in words and the reader's units: the sentence, the answers, what stands at the cursor.

import { directionOf, relativeHumidityOf, specificHumidityOfDewPoint, speedOf, ZERO_CELSIUS } from '../../air/index.ts';
import type { InflowState } from '../../desk/index.ts';
import type { DisplayUnits } from '../../site/index.ts';
import type { Parcel, ParcelName, StormNumbers, VectorFigure } from '../../storm/index.ts';
import type { Answer } from './answers.ts';
import { compassWords, directionText, heightText, plain, signed, speedText } from './numbers.ts';
import type { Piece } from './story.ts';
import { durationWords } from './time.ts';

export const PARCEL_WORDS: Readonly<Record<ParcelName, string>> = {
  'surface-based': 'surface air',
  'mixed-layer': 'air of the lowest 100 hPa, mixed',
  'most-unstable': 'the most unstable air',
  'jet-fed': 'the jet-fed air',
};

/** Air with less energy than this, J/kg, is none to speak of. */
const NOTHING = 1;

export function parcelOf(storm: StormNumbers, name: ParcelName): Parcel {
  return storm.parcels.find((parcel) => parcel.name === name)!;
}

/** The parcel to speak of first: what feeds elevated storms, else the mixed lowest layer, else whatever has energy. */
export function leadingParcel(storm: StormNumbers): ParcelName {
  const order: ParcelName[] =
    storm.inflow.kind === 'surface-based'
      ? ['mixed-layer', 'surface-based', 'most-unstable', 'jet-fed']
      : ['jet-fed', 'most-unstable', 'mixed-layer', 'surface-based'];
  return (
    order.find((name) => parcelOf(storm, name).cape > NOTHING) ??
    order.find((name) => parcelOf(storm, name).start !== null) ??
    order[0]!
  );
}

/** Where to a vector points: `the south-east`. */
function towardWords({ u, v }: VectorFigure): string {
  return compassWords((directionOf(u, v) + 180) % 360);
}

function heightWords(height: number, units: DisplayUnits): string {
  return `${heightText(height, units)} ${units.height}`;
}

function motionWords(vector: VectorFigure, units: DisplayUnits): string {
  return `${speedText(speedOf(vector.u, vector.v), units)} ${units.speed}`;
}

const ageWords = (seconds: number): string => durationWords(1000 * seconds);

export function inflowStory(state: InflowState, units: DisplayUnits): Piece[] {
  return [
    ...kindPieces(state.storm, units),
    ...energyPieces(state.storm, units),
    ...clusterPieces(state.storm, units),
    ...agePieces(state, units),
  ];
}

function kindPieces({ inflow }: StormNumbers, units: DisplayUnits): Piece[] {
  const layer = `air from ${heightText(inflow.bottom, units)} to ${heightWords(inflow.top, units)}`;
  switch (inflow.kind) {
    case 'surface-based':
      return [{ text: 'Surface-based', weight: 'strong' }, { text: ` storms could feed on ${layer}. ` }];
    case 'elevated': {
      const stable = inflow.stableLayer;
      const over =
        stable === null || !(stable.strength > 0) ? '' : `, over a stable layer of ${plain(stable.strength, 1)} K`;
      return [{ text: 'Elevated', weight: 'strong' }, { text: ` storms could feed on ${layer}${over}. ` }];
    }
    case 'none':
      return [{ text: 'No air here could feed a storm. ', weight: 'strong' }, { text: `${inflow.why} ` }];
    case 'not-assessable':
      if (!Number.isNaN(inflow.bottom)) {
        return [
          { text: 'Storms could feed on ' },
          { text: layer, weight: 'strong' },
          { text: '; whether on surface air too is not known. ' },
        ];
      }
      return [{ text: `Whether storms find air to feed on cannot be said. ${inflow.why} ` }];
  }
}

function energyPieces(storm: StormNumbers, units: DisplayUnits): Piece[] {
  const name = leadingParcel(storm);
  const parcel = parcelOf(storm, name);
  if (!(parcel.cape > NOTHING) || storm.inflow.kind === 'none') return [];
  const words = PARCEL_WORDS[name];
  const energy = `${parcel.positiveAtTop ? 'at least ' : ''}${plain(parcel.cape, 0)} J/kg`;
  return [
    { text: `${words.charAt(0).toUpperCase()}${words.slice(1)}, from ${heightWords(parcel.startHeight, units)}, has ` },
    { text: energy, weight: 'strong' },
    ...(parcel.liftToLfc > NOTHING
      ? [
          { text: ' and needs ' },
          { text: `${heightWords(parcel.liftToLfc, units)} of lift`, weight: 'strong' as const },
          { text: ` (CIN ${plain(parcel.cin, 0)} J/kg). ` },
        ]
      : [{ text: ' and rises freely as it is. ' }]),
  ];
}

function clusterPieces({ clusters }: StormNumbers, units: DisplayUnits): Piece[] {
  const { upwind, downwind } = clusters;
  if (upwind.why !== '') return [{ text: `Where clusters move cannot be said. ${upwind.why} ` }];
  return [
    { text: 'A cluster building upwind moves ' },
    { text: `${towardWords(upwind)} at ${motionWords(upwind, units)}`, weight: 'strong' },
    { text: ', building downwind ' },
    { text: `${towardWords(downwind)} at ${motionWords(downwind, units)}`, weight: 'strong' },
    { text: '. ' },
  ];
}

function agePieces({ windAgeS, air, airWhy, storm, atMs }: InflowState, units: DisplayUnits): Piece[] {
  const { windAloft } = storm;
  const aloft =
    windAloft === null
      ? ''
      : `, above ${heightWords(windAloft.above, units)} ${ageWords((atMs - windAloft.timeMs) / 1000)}`;
  const wind = `Wind ${ageWords(windAgeS)} old${aloft}`;
  // Why there is no air has been told already where it keeps storms from being assessed.
  const why = storm.inflow.why === airWhy ? '' : ` ${airWhy}`;
  return [{ text: air === null ? `${wind}.${why}` : `${wind}; temperature and humidity ${ageWords(air.ageS)}.` }];
}

/** `surface air from 0 m` and the like for choices. */
export function parcelChoice({ name, cape }: Parcel): string {
  return `${PARCEL_WORDS[name]}${Number.isNaN(cape) ? '' : `, ${plain(cape, 0)} J/kg`}`;
}

/** The four answers under the pictures. */
export function inflowAnswers(
  state: InflowState,
  storm: StormNumbers,
  name: ParcelName,
  units: DisplayUnits,
): Answer[] {
  return [
    parcelAnswer(state, storm, name, units),
    liftAnswer(state, storm, name, units),
    relativeAnswer(state, storm, units),
    clusterAnswer(state, storm, units),
  ];
}

const nothing = (title: string, age: string, none: string): Answer => ({
  title,
  age,
  figures: [],
  none,
  lines: [],
  stale: false,
});

function airAge({ air }: InflowState): string {
  return air === null ? 'no air' : `air ${ageWords(air.ageS)} old`;
}

/** Of the oldest that the numbers of the whole wind rest on. */
function windAge({ windAgeS, storm, atMs }: InflowState): string {
  const aloft = storm.windAloft;
  return aloft === null
    ? `wind ${ageWords(windAgeS)} old`
    : `wind ${ageWords(windAgeS)} old, aloft ${ageWords((atMs - aloft.timeMs) / 1000)}`;
}

function parcelAnswer(state: InflowState, storm: StormNumbers, name: ParcelName, units: DisplayUnits): Answer {
  const parcel = parcelOf(storm, name);
  const title = `Energy of ${PARCEL_WORDS[name]}`;
  if (Number.isNaN(parcel.cape))
    return { ...nothing(title, airAge(state), 'Not assessable'), lines: [{ text: parcel.why }] };
  const bound = parcel.positiveAtTop ? 'at least ' : '';
  return {
    title,
    age: airAge(state),
    figures: [{ value: plain(parcel.cape, 0), unit: 'J/kg CAPE' }],
    none: '',
    lines: [
      {
        text: `${bound}from ${heightWords(parcel.startHeight, units)}; cloud from ${heightWords(parcel.lclHeight, units)} (LCL)`,
      },
      {
        text: Number.isNaN(parcel.elHeight)
          ? parcel.why
          : `buoyant from ${heightWords(parcel.lfcHeight, units)} (LFC) to ${heightWords(parcel.elHeight, units)} (EL); with virtual temperature, Doswell & Rasmussen 1994`,
      },
    ],
    stale: false,
  };
}

function liftAnswer(state: InflowState, storm: StormNumbers, name: ParcelName, units: DisplayUnits): Answer {
  const parcel = parcelOf(storm, name);
  const title = 'Lift it needs';
  const { inflow } = storm;
  if (Number.isNaN(parcel.liftToLfc))
    return { ...nothing(title, airAge(state), 'None suffices, or not known'), lines: [{ text: parcel.why }] };
  const stable = inflow.stableLayer;
  return {
    title,
    age: airAge(state),
    figures: [
      { value: heightText(parcel.liftToLfc, units), unit: units.height },
      { value: plain(parcel.cin, 0), unit: 'J/kg CIN' },
    ],
    none: '',
    lines: [
      {
        text: `from ${heightWords(parcel.startHeight, units)} to free convection at ${heightWords(parcel.lfcHeight, units)}`,
      },
      {
        text:
          inflow.kind === 'elevated' && stable !== null
            ? `below the inflow: stable by ${plain(stable.strength, 1)} K from ${heightText(stable.bottom, units)} to ${heightWords(stable.top, units)}; inflow layer after Thompson et al. 2007`
            : `with the parcel’s virtual temperature; inflow layer after Thompson et al. 2007`,
      },
    ],
    stale: false,
  };
}

export const MOVER_WORDS: Readonly<Record<StormNumbers['mover'], string>> = {
  right: 'right mover, Bunkers et al. 2000',
  left: 'left mover, Bunkers et al. 2000',
  given: 'motion set by hand',
  unknown: 'no motion known',
};

function relativeAnswer(state: InflowState, storm: StormNumbers, units: DisplayUnits): Answer {
  const { helicity, jetInflow, mover, shear } = storm;
  const title = 'Helicity 0–3 km';
  const shearLine = Number.isNaN(shear.to6km.value)
    ? shear.to6km.why
    : `shear 0–6 km ${speedText(shear.to6km.value, units)} ${units.speed}`;
  const inflowLine =
    jetInflow.why === ''
      ? `inflow in the jet’s layer ${motionWords(jetInflow, units)} from the ${compassWords(directionOf(jetInflow.u, jetInflow.v))}`
      : jetInflow.why;
  if (Number.isNaN(helicity.to3km.value)) {
    return {
      ...nothing(title, windAge(state), 'Not assessable'),
      lines: [{ text: helicity.to3km.why }, { text: inflowLine }],
    };
  }
  return {
    title,
    age: windAge(state),
    figures: [{ value: plain(helicity.to3km.value, 0), unit: 'm²/s²' }],
    none: '',
    lines: [
      { text: `for the ${MOVER_WORDS[mover]}; ${inflowLine}` },
      { text: `${shearLine}; Davies-Jones et al. 1990` },
    ],
    stale: false,
  };
}

function clusterAnswer(state: InflowState, storm: StormNumbers, units: DisplayUnits): Answer {
  const { upwind, downwind, jetFrom } = storm.clusters;
  const title = 'Clusters move';
  if (upwind.why !== '') return { ...nothing(title, windAge(state), 'Not assessable'), lines: [{ text: upwind.why }] };
  return {
    title,
    age: windAge(state),
    figures: [
      { value: speedText(speedOf(upwind.u, upwind.v), units), unit: `${units.speed} ${towardWords(upwind)}` },
      { value: speedText(speedOf(downwind.u, downwind.v), units), unit: `${units.speed} ${towardWords(downwind)}` },
    ],
    none: '',
    lines: [
      { text: 'first if new cells build upwind, second if they build downwind' },
      { text: `Corfidi 2003, with ${jetFrom}` },
    ],
    stale: false,
  };
}

/** Values at a height; NaN where not known. */
export interface AirAtHeight {
  readonly height: number;
  /** Pa */
  readonly pressure: number;
  /** K */
  readonly temperature: number;
  readonly dewPoint: number;
  readonly parcel: number;
  readonly parcelVirtual: number;
  /** m/s, degrees from */
  readonly speed: number;
  readonly direction: number;
}

/** What stands at the cursor, with units. */
export function heightWordsAt(at: AirAtHeight, units: DisplayUnits): string {
  const celsius = (kelvin: number): string => `${plain(kelvin - ZERO_CELSIUS, 1)} °C`;
  const parts = [heightWords(at.height, units)];
  if (!Number.isNaN(at.pressure)) parts.push(`${plain(at.pressure / 100, 0)} hPa`);
  if (!Number.isNaN(at.temperature)) parts.push(`temperature ${celsius(at.temperature)}`);
  if (!Number.isNaN(at.dewPoint)) {
    const humidity = relativeHumidityOf(
      specificHumidityOfDewPoint(at.dewPoint, at.pressure),
      at.temperature,
      at.pressure,
    );
    parts.push(`dew point ${celsius(at.dewPoint)} (${plain(100 * humidity, 0)} %)`);
  }
  if (!Number.isNaN(at.parcel)) parts.push(`parcel ${celsius(at.parcel)}, ${signed(at.parcel - at.temperature, 1)} K`);
  parts.push(
    Number.isNaN(at.speed)
      ? 'no wind'
      : `wind ${speedText(at.speed, units)} ${units.speed} from ${directionText(at.direction)}`,
  );
  return parts.join(', ');
}
