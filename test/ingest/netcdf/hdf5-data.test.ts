import { describe, expect, it } from 'vitest';
import { damagedHdf5 } from '../../../src/ingest/netcdf/hdf5-data.ts';

describe('a damaged netCDF-4 file', () => {
  it('is to be fetched again, until one has upset the library: then to start anew', () => {
    const mend = (cause: unknown): string => damagedHdf5('night.nc', 'wspd', cause).problem.mend;
    expect(mend(new Error('bad checksum'))).toMatch(/^Fetch the file again/);
    // What WebAssembly throws when code runs out of its memory's bounds.
    const trap = Object.assign(new Error('memory access out of bounds'), { name: 'RuntimeError' });
    expect(mend(trap)).toMatch(/reload the page or start the command anew/);
    expect(mend(new Error('bad checksum'))).toMatch(/reload the page or start the command anew/);
  });
});
