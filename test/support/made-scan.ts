// A lidar's conical scan in netCDF classic: turns of 24 beams at 60 degrees, a wind from the west that grows with height.

import { buildClassic } from '../ingest/netcdf/build-classic.ts';

const BEAMS = 24;
const GATES = 12;

/** @param turns of the beam, a second a beam from 1 June 2024 on */
export function madeScan(turns: number): Uint8Array {
  const rays = turns * BEAMS;
  const along = (value: (ray: number) => number): number[] => Array.from({ length: rays }, (_, ray) => value(ray));
  const variable = (dimensions: string[], data: number[], units: string) => ({
    type: 'f4' as const,
    dimensions,
    data,
    attributes: { units },
  });
  // Half of the horizontal wind lies along a beam at 60 degrees: 5 m/s at the lowest gate, 1 m/s more at each above.
  const velocity = Array.from({ length: rays * GATES }, (_, k) => {
    const azimuth = (Math.floor(k / GATES) * 360) / BEAMS;
    return 0.5 * (5 + (k % GATES)) * Math.sin((azimuth * Math.PI) / 180);
  });
  const signal = velocity.map(() => 5);
  return buildClassic({
    dimensions: { time: rays, range: GATES },
    attributes: { title: 'Doppler lidar' },
    variables: {
      time: variable(['time'], along(Number), 'seconds since 2024-06-01'),
      range: variable(
        ['range'],
        Array.from({ length: GATES }, (_, k) => 150 + 100 * k),
        'm',
      ),
      azimuth: variable(
        ['time'],
        along((ray) => ((ray * 360) / BEAMS) % 360),
        'degrees',
      ),
      elevation: variable(
        ['time'],
        along(() => 60),
        'degrees',
      ),
      radial_velocity: variable(['time', 'range'], velocity, 'm/s'),
      snr: variable(['time', 'range'], signal, 'dB'),
    },
  });
}
