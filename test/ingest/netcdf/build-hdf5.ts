// Writes a small netCDF-4 file as the HDF5 library lays it out, for tests.

import * as h5 from 'h5wasm';

/** Six profiles of five gates, packed; a text flagged as ASCII that is UTF-8. */
export async function buildHdf5(): Promise<Uint8Array> {
  const { FS } = await h5.ready;
  const path = '/made-for-test.nc';
  const file = new h5.File(path, 'w');
  const add = (
    name: string,
    data: Float32Array | Float64Array | Int32Array,
    shape: number[],
    attributes: Record<string, string | number>,
    chunks: number[] | null = null,
  ): h5.Dataset => {
    const dataset = file.create_dataset({
      name,
      data,
      shape,
      ...(chunks === null ? {} : { chunks, compression: 'gzip' as const, compression_opts: 4 }),
    });
    for (const [key, value] of Object.entries(attributes)) dataset.create_attribute(key, value);
    return dataset;
  };
  const times = Float64Array.from({ length: 6 }, (_, k) => k);
  add('time', times, [6], { units: 'hours since 2024-01-01 00:00:00', standard_name: 'time' }).make_scale('time');
  add('height', Float32Array.of(10, 20, 30, 40, 50), [5], { units: 'm', standard_name: 'height' }).make_scale('height');
  const values = Float32Array.from({ length: 30 }, (_, k) => k);
  for (const [name, units] of [
    ['wind_speed', 'm s-1'],
    ['wind_from_direction', 'degree'],
  ] as const) {
    const dataset = add(name, values, [6, 5], { units, standard_name: name, _FillValue: 7 }, [3, 5]);
    dataset.attach_scale(0, '/time');
    dataset.attach_scale(1, '/height');
  }
  file.create_attribute('location', 'Jülich', null, 'A7');
  file.close();
  const bytes = FS.readFile(path).slice();
  FS.unlink(path);
  return bytes;
}

/** Two groups, each with its own times and winds, heights in the parent, and a group that holds neither. */
export async function buildGroups(): Promise<Uint8Array> {
  const { FS } = await h5.ready;
  const path = '/groups-for-test.nc';
  const file = new h5.File(path, 'w');
  const height = file.create_dataset({ name: 'height', data: Float32Array.of(10, 20) });
  height.create_attribute('units', 'm');
  height.create_attribute('standard_name', 'height');
  height.make_scale('height');
  file.create_group('about').create_attribute('title', 'nothing to see');
  for (const [name, hour] of [
    ['first', 1],
    ['second', 2],
  ] as const) {
    const group = file.create_group(name);
    const time = group.create_dataset({ name: 'time', data: Float64Array.of(hour) });
    time.create_attribute('units', 'hours since 2024-01-01');
    time.make_scale('time');
    const speed = group.create_dataset({ name: 'wind_speed', data: Float32Array.of(hour, hour + 1), shape: [1, 2] });
    speed.create_attribute('units', 'm s-1');
    speed.attach_scale(0, `/${name}/time`);
    speed.attach_scale(1, '/height');
  }
  file.close();
  const bytes = FS.readFile(path).slice();
  FS.unlink(path);
  return bytes;
}
