// The front door: bytes in, profiles and problems out. Recognises packing and format by content, and lets no exception
// past but Cancelled.

import { Cancelled, DuskveerError, throwIfCancelled, type Problem } from '../air/index.ts';
import { concatBlocks } from '../profile/index.ts';
import { PLAIN_SITE } from '../site/index.ts';
import { describeBytes } from './describe-bytes.ts';
import type { FileFormat, Reading, ReadOptions } from './format.ts';
import { FORMATS } from './formats.ts';
import { gunzipped, isGzip } from './gzip.ts';
import { headOf } from './head.ts';
import { DEFAULT_LIMITS, type ByteSource } from './source.ts';
import { withoutWrongTimes } from './wrong-times.ts';
import { isZip, unzipped } from './zip.ts';

/** Archives within archives are followed so far. */
const DEEPEST_PACKING = 3;

/**
 * Reads the profiles of a file or feed: any format of the house, plain, in gzip or in zip.
 * Long files come in several Readings; what cannot be read comes as a problem in one of them, and the rest goes on.
 * @throws Cancelled when `options.signal` is raised; nothing else
 * @example for await (const { block, problems } of readProfiles(bytesSource('night.csv', bytes))) …
 */
export async function* readProfiles(source: ByteSource, options: Partial<ReadOptions> = {}): AsyncGenerator<Reading> {
  yield* readWith(FORMATS, source, {
    site: options.site ?? PLAIN_SITE,
    limits: options.limits ?? DEFAULT_LIMITS,
    signal: options.signal,
    onProgress: options.onProgress,
    referenceTimeMs: options.referenceTimeMs,
    stationList: options.stationList ?? [],
  });
}

/** The front door with formats of one's own choice. */
export async function* readWith(
  formats: readonly FileFormat[],
  source: ByteSource,
  options: ReadOptions,
): AsyncGenerator<Reading> {
  yield* readUnpacked(formats, watched(source, options), options, 0);
}

async function* readUnpacked(
  formats: readonly FileFormat[],
  source: ByteSource,
  options: ReadOptions,
  depth: number,
): AsyncGenerator<Reading> {
  throwIfCancelled(options.signal);
  const problems: Problem[] = [];
  const head = await headOf(forgiving(source, problems));
  if (head.length === 0) {
    if (problems.length === 0) problems.push(emptyFile(source));
    yield onlyProblems(source, problems);
    return;
  }
  if (isGzip(head) || isZip(head)) {
    if (depth >= DEEPEST_PACKING) yield onlyProblems(source, [packedTooDeep(source)]);
    else if (isGzip(head)) yield* readUnpacked(formats, gunzipped(source, options.limits), options, depth + 1);
    else yield* readArchive(formats, source, options, depth);
    return;
  }
  const format = formats.find((candidate) => recognises(candidate, head));
  if (format === undefined) yield onlyProblems(source, [unknownFormat(source, head, formats)]);
  else yield* readFormat(format, source, options);
}

async function* readArchive(
  formats: readonly FileFormat[],
  archive: ByteSource,
  options: ReadOptions,
  depth: number,
): AsyncGenerator<Reading> {
  try {
    for await (const entry of unzipped(archive, options.limits, options.signal)) {
      if ('code' in entry) yield onlyProblems(archive, [entry]);
      else yield* readUnpacked(formats, entry, options, depth + 1);
    }
  } catch (error) {
    yield onlyProblems(archive, [asProblem(error, archive.name)]);
  }
}

async function* readFormat(format: FileFormat, source: ByteSource, options: ReadOptions): AsyncGenerator<Reading> {
  const streamProblems: Problem[] = [];
  let profiles = 0;
  let levels = 0;
  let said = 0;
  const reading = (part: Pick<Reading, 'block' | 'problems'>): Reading => ({
    source: source.name,
    format: format.name,
    ...part,
  });
  const failed = (problem: Problem): Reading => reading({ block: concatBlocks([]), problems: [problem] });

  try {
    for await (const part of format.read(forgiving(source, streamProblems), options)) {
      throwIfCancelled(options.signal);
      const problems = part.problems.map((problem) => placedAt(problem, source.name));
      const block = withoutWrongTimes(part.block, source.name, options, problems, profiles);
      profiles += part.block.profileCount;
      levels += part.block.mark.length;
      said += problems.length;
      if (block.profileCount > 0 || problems.length > 0) yield reading({ block, problems });
      if (levels > options.limits.levels) {
        yield failed(tooManyLevels(source, options.limits.levels));
        return;
      }
    }
  } catch (error) {
    said++;
    yield failed(asProblem(error, source.name));
  }
  if (streamProblems.length > 0) yield reading({ block: concatBlocks([]), problems: streamProblems });
  else if (profiles === 0 && said === 0) yield failed(noProfiles(source, format));
}

/** The same bytes; reports progress, and bytes that stop coming are a DuskveerError. */
function watched(source: ByteSource, options: ReadOptions): ByteSource {
  let furthest = 0;
  return {
    name: source.name,
    size: source.size,
    async *stream() {
      let bytesRead = 0;
      try {
        for await (const piece of source.stream()) {
          throwIfCancelled(options.signal);
          yield piece;
          bytesRead += piece.length;
          if (bytesRead <= furthest) continue;
          furthest = bytesRead;
          options.onProgress?.({ source: source.name, bytesRead, bytesTotal: source.size });
        }
      } catch (error) {
        if (error instanceof Cancelled || error instanceof DuskveerError) throw error;
        throw new DuskveerError(
          {
            code: 'ingest/bytes-stopped',
            what: `The bytes stopped coming (${error instanceof Error ? error.message : String(error)}).`,
            mend: 'Check that the file or feed can be reached and read, and try again.',
            where: { source: source.name, byte: bytesRead },
          },
          { cause: error },
        );
      }
    },
  };
}

/** The same bytes, but trouble in getting them ends the stream and is noted, so that a format keeps what it has. */
function forgiving(source: ByteSource, problems: Problem[]): ByteSource {
  return {
    name: source.name,
    size: source.size,
    async *stream() {
      try {
        yield* source.stream();
      } catch (error) {
        problems.push(asProblem(error, source.name));
      }
    },
  };
}

function recognises(format: FileFormat, head: Uint8Array): boolean {
  try {
    return format.recognise(head);
  } catch {
    // A format that stumbles over the first bytes does not know them.
    return false;
  }
}

/** @throws Cancelled when that is what the error is */
function asProblem(error: unknown, source: string): Problem {
  if (error instanceof Cancelled) throw error;
  if (error instanceof DuskveerError) return placedAt(error.problem, source);
  return {
    code: 'ingest/reader-failed',
    what: `The reader could not make sense of the file (${error instanceof Error ? error.message : String(error)}).`,
    mend: 'The file is probably damaged: fetch it again. What was read before this place is used.',
    where: { source },
  };
}

function placedAt(problem: Problem, source: string): Problem {
  return problem.where.source === undefined ? { ...problem, where: { ...problem.where, source } } : problem;
}

function onlyProblems(source: ByteSource, problems: readonly Problem[]): Reading {
  return { source: source.name, format: '', block: concatBlocks([]), problems };
}

function emptyFile(source: ByteSource): Problem {
  return {
    code: 'ingest/empty',
    what: 'The file is empty.',
    mend: 'Fetch or export it again.',
    where: { source: source.name, byte: 0 },
  };
}

function packedTooDeep(source: ByteSource): Problem {
  return {
    code: 'ingest/packed-too-deep',
    what: `The file is packed more than ${DEEPEST_PACKING} times over.`,
    mend: 'Unpack it first and read what is inside.',
    where: { source: source.name, byte: 0 },
  };
}

function unknownFormat(source: ByteSource, head: Uint8Array, formats: readonly FileFormat[]): Problem {
  return {
    code: 'ingest/unknown-format',
    what: `The format is not known: the file looks like ${describeBytes(head)}.`,
    mend: `Give it in one of the formats that are read: ${formats.map((format) => format.title).join('; ')}.`,
    where: { source: source.name, byte: 0 },
  };
}

function noProfiles(source: ByteSource, format: FileFormat): Problem {
  return {
    code: 'ingest/no-profiles',
    what: `The file was read as ${format.title}, but no profile is in it.`,
    mend: 'Check that it holds times, heights and winds, and that it is complete.',
    where: { source: source.name },
  };
}

function tooManyLevels(source: ByteSource, limit: number): Problem {
  return {
    code: 'ingest/too-many-levels',
    what: `The file holds more than ${limit} levels; reading stopped there.`,
    mend: 'Split the file by month or year.',
    where: { source: source.name },
  };
}
