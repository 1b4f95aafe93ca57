// Profiles in an open format, for other software: to stdout or into a file.

import { once } from 'node:events';
import { createWriteStream, type WriteStream } from 'node:fs';
import { rename, rm } from 'node:fs/promises';
import { writeCoverageJson, writeCsv, writeNetcdf } from '../ingest/index.ts';
import type { ProfileBlock } from '../profile/index.ts';
import { UsageError } from './command.ts';
import { LineWriter } from './output.ts';

/** Formats that hold every profile until the last is read. */
const WHOLE: Readonly<Record<string, (blocks: readonly ProfileBlock[]) => string | Uint8Array>> = {
  netcdf: writeNetcdf,
  coveragejson: writeCoverageJson,
};

/** Takes blocks as they are read and ends in a file. */
export interface FormatWriter {
  readonly take: (block: ProfileBlock) => Promise<void>;
  /** Writes what is held; a file stands under its name only when it is whole. */
  readonly finish: () => Promise<void>;
  /** Leaves nothing half written behind. */
  readonly giveUp: () => Promise<void>;
}

/**
 * A writer of a format by its name.
 * @param path file to write; stdout where none is named
 * @throws UsageError for a format that is not known, or bytes meant for a terminal
 */
export function formatWriter(format: string, path: string | undefined): FormatWriter {
  if (format !== 'csv' && !Object.hasOwn(WHOLE, format)) {
    throw new UsageError(`There is no format ${format} to write. Known: csv, ${Object.keys(WHOLE).join(', ')}.`);
  }
  if (path === undefined && format === 'netcdf' && process.stdout.isTTY) {
    throw new UsageError('netCDF is no text for a terminal: name a file with --out.');
  }
  const target = path === undefined ? null : { path, part: `${path}.part`, stream: createWriteStream(`${path}.part`) };
  const out = new LineWriter(target?.stream ?? process.stdout);
  const content = format === 'csv' ? csvContent(out) : wholeContent(out, WHOLE[format]!);
  return {
    take: content.take,
    async finish() {
      await content.finish();
      if (target === null) return;
      await ended(target.stream);
      await rename(target.part, target.path);
    },
    async giveUp() {
      target?.stream.destroy();
      if (target !== null) await rm(target.part, { force: true });
    },
  };
}

async function ended(stream: WriteStream): Promise<void> {
  stream.end();
  if (!stream.closed) await once(stream, 'close');
}

type Content = Pick<FormatWriter, 'take' | 'finish'>;

function csvContent(out: LineWriter): Content {
  let headed = false;
  return {
    async take(block) {
      const [heading, ...lines] = writeCsv([block]);
      await out.put(headed ? lines.join('') : heading! + lines.join(''));
      headed = true;
    },
    finish: () => Promise.resolve(),
  };
}

function wholeContent(out: LineWriter, write: (blocks: readonly ProfileBlock[]) => string | Uint8Array): Content {
  const held: ProfileBlock[] = [];
  return {
    take(block) {
      held.push(block);
      return Promise.resolve();
    },
    async finish() {
      if (held.length > 0) await out.put(write(held));
    },
  };
}
