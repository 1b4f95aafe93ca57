export {
  PLAIN_SITE,
  siteStation,
  type ColumnMapping,
  type DisplayUnits,
  type OwnCriteria,
  type PowerCurve,
  type Site,
  type SiteStation,
  type TerrainAxis,
  type TurbineType,
} from './site.ts';
