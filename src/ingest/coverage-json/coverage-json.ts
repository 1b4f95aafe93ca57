// OGC CoverageJSON (OGC 21-069r2) at the front door: one coverage or a collection of them, each a profile.

import { DuskveerError, throwIfCancelled, type Problem } from '../../air/index.ts';
import { concatBlocks, type ProfileBlock } from '../../profile/index.ts';
import type { FileFormat, ReadOptions } from '../format.ts';
import { profilesFrom } from '../netcdf/to-profiles.ts';
import { readAll } from '../source.ts';
import { listIn, objectIn, type JsonObject } from './json.ts';
import { datasetOfCoverage } from './to-dataset.ts';

/** Coverages gathered in one block. */
const BLOCK_COVERAGES = 500;

export const coverageJson: FileFormat = {
  name: 'coverage-json',
  title: 'OGC CoverageJSON',
  recognise(head) {
    const text = new TextDecoder().decode(head);
    return /^\s*\{/u.test(text) && /"type"\s*:\s*"Coverage(?:Collection)?"/u.test(text);
  },
  async *read(source, options) {
    const bytes = await readAll(source, options.limits.fileBytes, options.signal);
    const document = parse(bytes, source.name);
    const coverages = document.type === 'CoverageCollection' ? listIn(document.coverages).map(objectIn) : [document];
    let blocks: ProfileBlock[] = [];
    let problems: Problem[] = [];
    for (const [index, coverage] of coverages.entries()) {
      throwIfCancelled(options.signal);
      readCoverage(coverage, document, index + 1, source.name, options, blocks, problems);
      if (blocks.length < BLOCK_COVERAGES) continue;
      yield { block: concatBlocks(blocks), problems };
      blocks = [];
      problems = [];
    }
    yield { block: concatBlocks(blocks), problems };
  },
};

/** One coverage that cannot be read does not spoil the others. */
function readCoverage(
  coverage: JsonObject,
  document: JsonObject,
  record: number,
  source: string,
  options: ReadOptions,
  blocks: ProfileBlock[],
  problems: Problem[],
): void {
  try {
    const mostValues = options.limits.levels;
    const dataset = datasetOfCoverage(coverage, { source, record, collection: document, mostValues });
    for (const part of profilesFrom(dataset, options)) {
      if (part.block.profileCount > 0) blocks.push(part.block);
      problems.push(...part.problems);
    }
  } catch (error) {
    if (!(error instanceof DuskveerError)) throw error;
    problems.push({ ...error.problem, where: { ...error.problem.where, record } });
  }
}

function parse(bytes: Uint8Array, source: string): JsonObject {
  try {
    return objectIn(JSON.parse(new TextDecoder().decode(bytes)));
  } catch (cause) {
    throw new DuskveerError(
      {
        code: 'ingest/coverage-damaged',
        what: `The file is no sound JSON (${cause instanceof Error ? cause.message : String(cause)}).`,
        mend: 'Fetch the file again; if it stays so, ask its provider for an intact copy.',
        where: { source },
      },
      { cause },
    );
  }
}
