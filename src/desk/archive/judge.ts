// From a block of profiles to the archive's rows: the jets by one criteria set and the wind on each rotor.

import { findJets, hasCategories, NO_JET, NOT_ASSESSABLE, scanNoses, type Criteria } from '../../jet/index.ts';
import { airColumn, transportByHeight } from '../../moisture/index.ts';
import { gatherWindAt, profileAt, REJECTING, windColumn, type ProfileBlock } from '../../profile/index.ts';
import { screen } from '../../quality/index.ts';
import { FleetScan, topTip } from '../../rotor/index.ts';
import { siteStation, type Site } from '../../site/index.ts';
import { compareStations, feedNameOf, type FeedName } from '../feed-name.ts';
import { mergeRows, pickRows } from './merge.ts';
import {
  discColumns,
  JET_ROW,
  jetColumns,
  profileColumns,
  type DiscColumns,
  type FeedRows,
  type JetColumns,
  type ProfileColumns,
} from './rows.ts';
import { discAtStation, type NamedDisc } from './table-parts.ts';

/** What is asked of every profile of an archive. */
export interface ArchiveQuestion {
  readonly site: Site;
  readonly criteria: Criteria;
  /** Discs for which the rotor's wind is worked out. */
  readonly discs: readonly NamedDisc[];
  /** Goes in as the rows' source instead of the block's own. */
  readonly source: string;
}

/**
 * The rows of a raw block, screened first; a record for each feed, by key.
 * Screens that look at neighbours see the block as it is: give whole files, or whole days at least.
 */
export function archiveRows(block: ProfileBlock, question: ArchiveQuestion): FeedRows[] {
  const { block: screened } = screen(block, { site: question.site });
  const judged = judge(screened, question);
  const feeds = feedsOf(screened, question.site);
  return feeds.map(({ feed, indices }) => {
    const rows = { ...judged, feed };
    const all = indices.length === block.profileCount;
    return mergeRows([all ? rows : pickRows([rows], { part: new Uint32Array(indices.length), row: indices })]);
  });
}

/** Rows of all profiles of a block, by profile index; `jets` in the same order. */
export type JudgedBlock = Omit<FeedRows, 'feed'>;

/** The kernel: rows of a screened block, whatever feeds its profiles belong to. */
export function judge(block: ProfileBlock, { site, criteria, discs, source }: ArchiveQuestion): JudgedBlock {
  const profiles = profileColumns(block.profileCount);
  profiles.timeMs.set(block.timeMs);
  profiles.revision.set(block.revision);
  const reasons = [''];
  countLevels(block, profiles);
  transports(block, profiles);
  const jets =
    criteria.decides === 'levels'
      ? jetsByLevels(block, criteria, profiles, reasons)
      : jetsByConfidence(block, criteria, site, profiles, reasons);
  return { sources: [source], reasons, profiles, jets, discs: discRows(block, discs) };
}

/** Counts without branches, for on noisy marks none could be foreseen. */
function countLevels(block: ProfileBlock, { windLevels, usableLevels, top }: ProfileColumns): void {
  const { offsets, speed, heightAgl, mark } = block;
  for (let index = 0; index < block.profileCount; index++) {
    const start = offsets[index]!;
    const end = offsets[index + 1]!;
    let wind = 0;
    let lost = 0;
    for (let k = start; k < end; k++) {
      const known = Number(speed[k]! >= 0);
      wind += known;
      // Levels without height carry a rejecting mark of their own.
      lost += known & Number((mark[k]! & REJECTING) !== 0);
    }
    windLevels[index] = wind;
    usableLevels[index] = wind - lost;
    let highest = end - 1;
    while (highest >= start && ((mark[highest]! & REJECTING) !== 0 || !(speed[highest]! >= 0))) highest--;
    top[index] = highest < start ? NaN : heightAgl[highest]!;
  }
}

/** Only where the block has humidity at all; what is borrowed at the page is not at hand in a scan. */
function transports(block: ProfileBlock, { below3Km }: ProfileColumns): void {
  const { specificHumidity, offsets } = block;
  if (specificHumidity === null) return;
  for (let index = 0; index < block.profileCount; index++) {
    let levels = 0;
    for (let k = offsets[index]!; k < offsets[index + 1]! && levels < 2; k++) if (specificHumidity[k]! >= 0) levels++;
    if (levels === 2) below3Km[index] = transportByHeight(airColumn(profileAt(block, index)), { top: 3000 }).size;
  }
}

function jetsByLevels(
  block: ProfileBlock,
  criteria: Criteria,
  profiles: ProfileColumns,
  reasons: string[],
): JetColumns {
  const found = scanNoses(block, criteria);
  const { category } = found;
  let count = 0;
  for (let index = 0; index < category.length; index++) if (category[index]! > NO_JET) count++;
  const jets = jetColumns(count);
  const graded = hasCategories(criteria);
  let at = 0;
  for (let index = 0; index < category.length; index++) {
    if (category[index] === NO_JET) profiles.status[index] = 1;
    else if (category[index] === NOT_ASSESSABLE) {
      profiles.why[index] = numberOf(findJets(profileAt(block, index), criteria).why, reasons);
    } else {
      profiles.status[index] = JET_ROW;
      profiles.jetCount[index] = 1;
      jets.category[at] = graded ? category[index]! : -1;
      jets.noseHeight[at] = found.noseHeight[index]!;
      jets.noseSpeed[at] = found.noseSpeed[index]!;
      jets.noseDirection[at] = found.noseDirection[index]!;
      jets.falloff[at] = found.falloff[index]!;
      jets.falloffIsBound[at++] = found.falloffIsBound[index]!;
    }
  }
  return jets;
}

function jetsByConfidence(
  block: ProfileBlock,
  criteria: Criteria,
  site: Site,
  profiles: ProfileColumns,
  reasons: string[],
): JetColumns {
  const stated = block.stations.map(({ id }) => siteStation(site, id)?.speedUncertainty ?? NaN);
  const all = [];
  for (let index = 0; index < block.profileCount; index++) {
    const finding = findJets(profileAt(block, index), criteria, {
      speedUncertainty: stated[block.stationIndex[index]!]!,
    });
    profiles.confidence[index] = finding.confidence;
    if (finding.status === 'not-assessable') profiles.why[index] = numberOf(finding.why, reasons);
    else profiles.status[index] = finding.status === 'jet' ? JET_ROW : 1;
    const jets = finding.jets.slice(0, 255);
    profiles.jetCount[index] = jets.length;
    all.push(...jets);
  }
  const jets = jetColumns(all.length);
  all.forEach((jet, at) => {
    jets.category[at] = jet.category ?? -1;
    jets.noseHeight[at] = jet.noseHeight;
    jets.noseSpeed[at] = jet.noseSpeed;
    jets.noseDirection[at] = jet.noseDirection;
    jets.falloff[at] = jet.falloff;
    jets.falloffIsBound[at] = Number(jet.falloffIsBound);
    jets.confidence[at] = jet.confidence;
  });
  return jets;
}

function numberOf(reason: string, reasons: string[]): number {
  const known = reasons.indexOf(reason);
  return known >= 0 ? known : reasons.push(reason) - 1;
}

const wind = windColumn();

/**
 * The wind on every disc. Levels above the highest tip change nothing but the first of them, so they are not gathered;
 * only where a level lacks a direction does it matter whether any other has one.
 */
function discRows(block: ProfileBlock, discs: readonly NamedDisc[]): DiscColumns[] {
  const rows = discs.map(() => discColumns(block.profileCount));
  if (discs.length === 0) return rows;
  // The same turbines stand at another height over each station's ground.
  const scans = block.stations.map(({ elevation }) => {
    const atStation = discs.map((disc) => discAtStation(disc, elevation));
    return { scan: new FleetScan(atStation), upTo: Math.max(...atStation.map(topTip)) };
  });
  for (let index = 0; index < block.profileCount; index++) {
    const { scan, upTo } = scans[block.stationIndex[index]!]!;
    gatherWindAt(block, index, wind, upTo);
    let directed = true;
    for (let k = 0; k < wind.count; k++) directed &&= wind.direction[k]! >= 0;
    const found = scan.scan(directed ? wind : gatherWindAt(block, index, wind));
    for (let i = 0; i < rows.length; i++) {
      const row = rows[i]!;
      row.coverage[index] = found.coverage[i]!;
      row.hubSpeed[index] = found.hubSpeed[i]!;
      row.hubDirection[index] = found.hubDirection[i]!;
      row.equivalentSpeed[index] = found.equivalentSpeed[i]!;
      row.equivalentSpeedVeer[index] = found.equivalentSpeedVeer[i]!;
      row.shearExponent[index] = found.shearExponent[i]!;
      row.veer[index] = found.veer[i]!;
    }
  }
  return rows;
}

interface Group {
  feed: FeedName;
  readonly indices: number[];
}

/** The profiles of each feed of a block, in the block's order; feeds by key. */
function feedsOf(block: ProfileBlock, site: Site): { feed: FeedName; indices: Uint32Array }[] {
  const groups = new Map<string, Group>();
  const known = new Map<number, Group>();
  for (let index = 0; index < block.profileCount; index++) {
    // Stations fit 16 bits, instruments 8: one number for both.
    const pair = block.stationIndex[index]! * 256 + block.instrumentIndex[index]!;
    let group = known.get(pair);
    if (group === undefined) {
      const feed = feedNameOf(block, index, site);
      group = groups.get(feed.key) ?? { feed, indices: [] };
      if (compareStations(feed.station, group.feed.station) > 0) group.feed = feed;
      groups.set(feed.key, group);
      known.set(pair, group);
    }
    group.indices.push(index);
  }
  return [...groups.values()]
    .sort((a, b) => (a.feed.key < b.feed.key ? -1 : 1))
    .map(({ feed, indices }) => ({ feed, indices: Uint32Array.from(indices) }));
}
