export { withFarmFactor } from './farm-factor.ts';
export { readSite } from './read-site.ts';
export {
  PLAIN_SITE,
  siteStation,
  type ColumnMapping,
  type DisplayUnits,
  type MigrationHeading,
  type OwnCriteria,
  type PowerCurve,
  type RampDefinition,
  type Site,
  type SiteStation,
  type TerrainAxis,
  type TurbineType,
  type Upstream,
  type WorkLimit,
} from './site.ts';
