// What a height is counted from: ground or sea level.

import { GRAVITY } from '../../air/index.ts';
import { textOf } from './dataset.ts';
import type { Finding } from './roles.ts';

export interface HeightMeaning {
  readonly above: 'ground' | 'sea';
  /** Stored unit to m. */
  readonly unit: { readonly scale: number; readonly offset: number };
  /** To be told with each profile; empty when the file leaves no doubt. */
  readonly note: string;
}

const SEA_NAMES =
  /^(?:altitude|height_above_mean_sea_level|geopotential_height|height_above_geopotential_datum|height_above_reference_ellipsoid|geopotential)$/u;
const SEA_WORDS =
  /\b(?:above|over)\s+(?:the\s+)?(?:mean\s+)?sea|\bsea[\s_-]?level|\b(?:amsl|asl|msl)\b|\baltitude\b|geopotential/iu;
const GROUND_WORDS =
  /\b(?:above|over)\s+(?:the\s+)?(?:local\s+)?(?:ground|surface|terrain|instrument|lidar|radar|sodar|station|antenna)\b|\bagl\b/iu;
const SEA_SHORT = /^(?:alt|altitude|height_amsl|height_asl|gph|geopotential(?:_height)?)$/u;

/** Reads the meaning of a height from its standard name, its words, its name; in this order of trust. */
export function meaningOfHeight({ variable, unit }: Finding): HeightMeaning {
  const toMetres =
    unit === null
      ? { scale: 1, offset: 0 }
      : unit.quantity === 'geopotential'
        ? { scale: unit.scale / GRAVITY, offset: 0 }
        : unit;
  const noUnit = unit === null ? [`${variable.name} has no unit: taken as metres`] : [];
  const meaning = (above: 'ground' | 'sea', ...notes: string[]): HeightMeaning => ({
    above,
    unit: toMetres,
    note: [...noUnit, ...notes].join('; '),
  });
  const standardName = textOf(variable.attributes, 'standard_name').toLowerCase();
  const words = ['long_name', 'units', 'description', 'comment']
    .map((name) => textOf(variable.attributes, name))
    .join(' ; ');
  if (SEA_NAMES.test(standardName)) return meaning('sea');
  if (GROUND_WORDS.test(words) && !SEA_WORDS.test(words)) return meaning('ground');
  if (SEA_WORDS.test(words) && !GROUND_WORDS.test(words)) return meaning('sea');
  if (standardName === 'height' || standardName === 'height_above_ground_level') return meaning('ground');
  const name = variable.name.toLowerCase();
  if (SEA_SHORT.test(name)) return meaning('sea');
  if (/agl|above_ground/u.test(name)) return meaning('ground');
  return meaning('ground', `${variable.name} does not say what it is counted from: taken as above ground`);
}
