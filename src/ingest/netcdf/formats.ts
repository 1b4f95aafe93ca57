// netCDF at the front door: classic files by the house's own reader, netCDF-4 by the HDF5 library.

import type { FileFormat } from '../format.ts';
import { readAll } from '../source.ts';
import { isClassic } from './classic-header.ts';
import { openClassic } from './classic.ts';
import { isHdf5 } from './is-hdf5.ts';
import { profilesFrom } from './to-profiles.ts';

export const netcdfClassic: FileFormat = {
  name: 'netcdf-classic',
  title: 'netCDF classic (CDF-1, CDF-2, CDF-5)',
  recognise: isClassic,
  async *read(source, options) {
    const bytes = await readAll(source, options.limits.fileBytes, options.signal);
    yield* profilesFrom(openClassic(bytes, source.name), options);
  },
};

export const netcdf4: FileFormat = {
  name: 'netcdf-4',
  title: 'netCDF-4 (HDF5)',
  recognise: isHdf5,
  async *read(source, options) {
    const bytes = await readAll(source, options.limits.fileBytes, options.signal);
    // The HDF5 library is large: it is fetched with the first file that needs it.
    const { openHdf5 } = await import('./hdf5.ts');
    const { dataset, close } = await openHdf5(bytes, source.name);
    try {
      yield* profilesFrom(dataset, options);
    } finally {
      close();
    }
  },
};
