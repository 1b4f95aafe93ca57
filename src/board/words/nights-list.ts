// The list of nights: what is shown of each, how it is sorted and sifted.

import type { ArchiveNight } from '../../desk/index.ts';

/** Nights that the list shows. */
export type NightsShown = 'all' | 'jet' | 'no-jet' | 'unassessable';

export const SHOWN_WORDS: Readonly<Record<NightsShown, string>> = {
  all: 'all nights',
  jet: 'nights with a jet',
  'no-jet': 'nights without',
  unassessable: 'nights not assessable',
};

export type NightsOrder = 'night' | 'assessable' | 'share' | 'onset' | 'end' | 'category' | 'speed' | 'height';

export interface NightsSort {
  readonly by: NightsOrder;
  readonly falling: boolean;
}

const HOUR_MS = 3_600_000;

/** What a column sorts by; NaN goes last either way. */
const VALUES: Readonly<Record<NightsOrder, (night: ArchiveNight) => number>> = {
  night: ({ night }) => Date.parse(night),
  assessable: ({ assessable, profiles }) => (profiles === 0 ? NaN : assessable / profiles),
  share: ({ jets, assessable }) => (assessable === 0 ? NaN : jets / assessable),
  onset: ({ onsetMs, sunsetMs }) => (onsetMs - sunsetMs) / HOUR_MS,
  end: ({ endMs, sunriseMs }) => (endMs - sunriseMs) / HOUR_MS,
  category: ({ category }) => (category < 0 ? NaN : category),
  speed: ({ peakSpeed }) => peakSpeed,
  height: ({ peakHeight }) => peakHeight,
};

export const valueOf = (night: ArchiveNight, order: NightsOrder): number => VALUES[order](night);

/** @param month 1 to 12; 0 for all @param least jets of a lower category are none */
export function siftNights(
  nights: readonly ArchiveNight[],
  { shown, month, least }: { readonly shown: NightsShown; readonly month: number; readonly least: number },
  { by, falling }: NightsSort,
): ArchiveNight[] {
  const hasJet = ({ jets, category }: ArchiveNight): boolean => jets > 0 && (least === 0 || category >= least);
  const keeps: Readonly<Record<NightsShown, (night: ArchiveNight) => boolean>> = {
    all: () => true,
    jet: hasJet,
    'no-jet': (night) => night.darkAssessable > 0 && !hasJet(night),
    unassessable: ({ darkAssessable }) => darkAssessable === 0,
  };
  const value = VALUES[by];
  return nights
    .filter((night) => keeps[shown](night) && (month === 0 || Number(night.night.slice(5, 7)) === month))
    .sort((a, b) => {
      const [x, y] = [value(a), value(b)];
      if (Number.isNaN(x) || Number.isNaN(y)) return Number(Number.isNaN(x)) - Number(Number.isNaN(y));
      return falling ? y - x : x - y;
    });
}
