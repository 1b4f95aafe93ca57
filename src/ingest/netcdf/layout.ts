// How profiles lie in a file's arrays: a grid of times and heights (with stations and the like before them), or profiles
// of differing length one after the other or interleaved (CF-1.11, chapter 9 and appendix H).

import { DuskveerError } from '../../air/index.ts';
import { numbersOf, sizeOf, textOf, type Dataset, type Variable } from './dataset.ts';

export interface Layout {
  /** Dimensions that count profiles, outermost first; empty for a file of one profile. */
  readonly profileDimensions: readonly string[];
  readonly profileShape: readonly number[];
  /** The dimension that counts levels, of all profiles together when they are ragged; null for values at one height. */
  readonly levelDimension: string | null;
  /** Levels of a profile in a grid. */
  readonly levelCount: number;
  /** Profiles of differing length; null in a grid. */
  readonly ragged: Ragged | null;
}

interface Ragged {
  /** Profile i owns the levels offsets[i] up to offsets[i + 1], of those in `order`. */
  readonly offsets: Uint32Array;
  /** Where each level, profile after profile, stands in the file; null when it is already so. */
  readonly order: Uint32Array | null;
}

/** Profiles without a single level that a ragged file may announce beyond its levels. */
const EMPTY_PROFILES = 10_000;

/**
 * @param pivot the variable whose dimensions decide, usually the wind
 * @param height the height that goes with it, null for a single height
 * @param along dimensions that time runs along
 * @param mostLevels more are refused before anything is allocated
 * @throws DuskveerError `ingest/too-many-levels`, `ingest/netcdf-damaged`
 */
export function layoutOf(
  dataset: Dataset,
  pivot: Variable,
  height: Variable | null,
  along: readonly string[],
  mostLevels: number,
): Layout {
  if (sizeOf(pivot.shape) > mostLevels) {
    throw new DuskveerError({
      code: 'ingest/too-many-levels',
      what: `${pivot.name} announces ${sizeOf(pivot.shape)} values, more than the ${mostLevels} that are read of a file.`,
      mend: 'Split the file by month or year; if it is small, it is damaged.',
      where: { source: dataset.source, key: pivot.name },
    });
  }
  const own = height === null ? [] : height.dimensions.filter((name) => pivot.dimensions.includes(name));
  const levelDimension = own.filter((name) => !along.includes(name)).at(-1) ?? own.at(-1) ?? null;
  const ragged = levelDimension === null ? null : raggedOf(dataset, levelDimension);
  if (ragged !== null && pivot.dimensions.length === 1) {
    return {
      profileDimensions: [ragged.profileDimension],
      profileShape: [ragged.offsets.length - 1],
      levelDimension,
      levelCount: 0,
      ragged,
    };
  }
  const profileDimensions = pivot.dimensions.filter((name) => name !== levelDimension);
  return {
    profileDimensions,
    profileShape: profileDimensions.map((name) => pivot.shape[pivot.dimensions.indexOf(name)]!),
    levelDimension,
    levelCount: levelDimension === null ? 1 : pivot.shape[pivot.dimensions.indexOf(levelDimension)]!,
    ragged: null,
  };
}

function raggedOf(dataset: Dataset, levelDimension: string): (Ragged & { profileDimension: string }) | null {
  const levels = dataset.dimensions.get(levelDimension) ?? 0;
  for (const variable of dataset.variables.values()) {
    if (variable.type === 'text' || variable.dimensions.length !== 1) continue;
    const own = variable.dimensions[0]!;
    if (textOf(variable.attributes, 'sample_dimension') === levelDimension) {
      checkProfiles(dataset, variable, variable.shape[0]!, levels);
      return { ...contiguous(variable, levels), profileDimension: own };
    }
    const instance = textOf(variable.attributes, 'instance_dimension');
    if (instance !== '' && own === levelDimension) {
      const profiles = dataset.dimensions.get(instance) ?? 0;
      checkProfiles(dataset, variable, profiles, levels);
      return { ...indexed(variable, profiles), profileDimension: instance };
    }
  }
  return null;
}

function checkProfiles(dataset: Dataset, variable: Variable, profiles: number, levels: number): void {
  if (profiles <= levels + EMPTY_PROFILES) return;
  throw new DuskveerError({
    code: 'ingest/netcdf-damaged',
    what: `${variable.name} speaks of ${profiles} profiles, but there are only ${levels} levels.`,
    mend: 'Fetch the file again; if it stays so, ask its provider for an intact copy.',
    where: { source: dataset.source, key: variable.name },
  });
}

/** Counts of levels per profile, cut where they add up to more than there are. */
function contiguous(counts: Variable, levels: number): Ragged {
  const numbers = counts.numbers();
  const missing = numbersOf(counts.attributes, '_FillValue')[0];
  const offsets = new Uint32Array(numbers.length + 1);
  for (let profile = 0; profile < numbers.length; profile++) {
    const count = numbers[profile]!;
    const sound = count > 0 && count !== missing ? count : 0;
    offsets[profile + 1] = Math.min(levels, offsets[profile]! + sound);
  }
  return { offsets, order: null };
}

/** An index of its profile at each level; levels of no profile are left out. */
function indexed(index: Variable, profiles: number): Ragged {
  const numbers = index.numbers();
  const offsets = new Uint32Array(profiles + 1);
  const belongs = (profile: number): boolean => profile >= 0 && profile < profiles && Number.isInteger(profile);
  for (const profile of numbers) if (belongs(profile)) offsets[profile + 1]!++;
  for (let profile = 0; profile < profiles; profile++) offsets[profile + 1]! += offsets[profile]!;
  const next = offsets.slice();
  const order = new Uint32Array(offsets[profiles]!);
  numbers.forEach((profile, level) => {
    if (belongs(profile)) order[next[profile]!++] = level;
  });
  return { offsets, order };
}
