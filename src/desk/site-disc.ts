// The wind on a turbine type's disc with all that the site file says of it.

import type { Profile } from '../profile/index.ts';
import { windOnDisc, type DiscWind } from '../rotor/index.ts';
import { siteStation, type Site, type TurbineType } from '../site/index.ts';

/**
 * The wind on the disc of a type: over its own ground, continued beyond the data only where the site file asks for it.
 * @param nose height of the jet's nose, m above ground; NaN where there is no jet
 */
export function siteDiscWind(profile: Profile, turbine: TurbineType, nose: number, site: Site): DiscWind {
  const groundOffset = turbine.groundElevation - profile.station.elevation;
  return windOnDisc(profile, turbine, {
    nose,
    groundOffset: Number.isNaN(groundOffset) ? 0 : groundOffset,
    continuation: site.continuation,
    speedUncertainty: siteStation(site, profile.station.id)?.speedUncertainty ?? NaN,
  });
}
