// The wind on a turbine type's disc with all that the site file says of it.

import type { Profile, Station } from '../profile/index.ts';
import { discSlices, windOnDisc, type DiscSlices, type DiscWind, type DiscWindOptions } from '../rotor/index.ts';
import { siteStation, type Site, type TurbineType } from '../site/index.ts';

/**
 * The wind on the disc of a type: over its own ground, continued beyond the data only where the site file asks for it.
 * @param nose height of the jet's nose, m above ground; NaN where there is no jet
 */
export function siteDiscWind(profile: Profile, turbine: TurbineType, nose: number, site: Site): DiscWind {
  return windOnDisc(profile, turbine, { nose, ...optionsOf(profile, turbine, site) });
}

/** The same wind slice by slice, for the picture of the disc. */
export function siteDiscSlices(profile: Profile, turbine: TurbineType, site: Site): DiscSlices {
  return discSlices(profile, turbine, optionsOf(profile, turbine, site));
}

/** m by which a type's ground stands above the station's; 0 where either is not known. */
export function groundOffset(turbine: TurbineType, station: Station): number {
  const offset = turbine.groundElevation - station.elevation;
  return Number.isNaN(offset) ? 0 : offset;
}

function optionsOf(profile: Profile, turbine: TurbineType, site: Site): DiscWindOptions {
  return {
    groundOffset: groundOffset(turbine, profile.station),
    continuation: site.continuation,
    speedUncertainty: siteStation(site, profile.station.id)?.speedUncertainty ?? NaN,
  };
}
