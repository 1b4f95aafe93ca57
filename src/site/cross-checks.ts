// What no schema can say of a site file: that its parts fit each other.

import type { JSONPath } from 'jsonc-parser';
import type { Finding } from './schema-errors.ts';
import type { SiteFile } from './site-file.ts';

/** kW a square metre of rotor that no turbine gives: the kinetic energy of 15 m/s wind, about, all of it. */
const MOST_POWER_DENSITY = 2;

/** Everything in a file, valid by the schema, that does not fit together. */
export function crossChecks(file: SiteFile): Finding[] {
  return [
    ...zone(file.time_zone, ['time_zone']),
    ...zone(file.file_time_zone, ['file_time_zone']),
    ...names(file),
    ...references(file),
    ...(file.turbines ?? []).flatMap((turbine, k) => turbineFits(turbine, ['turbines', k])),
    ...criteriaFit(file),
  ];
}

function finding(path: JSONPath, what: string, mend: string): Finding {
  return { path, code: 'site/does-not-fit', what, mend };
}

function zone(name: string | undefined, path: JSONPath): Finding[] {
  if (name === undefined) return [];
  try {
    new Intl.DateTimeFormat('en', { timeZone: name });
    return [];
  } catch {
    return [
      finding(
        path,
        `“${name}” is no time zone.`,
        'Write a name of the IANA time-zone database, such as America/Chicago, or UTC.',
      ),
    ];
  }
}

/** Every name by which a station is called belongs to one station; so do names of turbine types. */
function names(file: SiteFile): Finding[] {
  const findings: Finding[] = [];
  const owner = new Map<string, number>();
  (file.stations ?? []).forEach((station, k) => {
    const called: [string, JSONPath][] = [
      [station.id, ['stations', k, 'id']],
      ...(station.aliases ?? []).map((alias, at): [string, JSONPath] => [alias, ['stations', k, 'aliases', at]]),
    ];
    for (const [name, path] of called) {
      const key = name.trim().toLowerCase();
      const first = owner.get(key);
      if (first !== undefined && first !== k) {
        findings.push(
          finding(
            path,
            `Another station is called “${name}” too.`,
            'Give every station identifiers and aliases of its own.',
          ),
        );
      }
      owner.set(key, first ?? k);
    }
  });
  const types = new Set<string>();
  (file.turbines ?? []).forEach(({ name }, k) => {
    if (types.has(name)) {
      const mend = 'Give each group of turbines a name of its own, such as “Ridge, north”.';
      findings.push(finding(['turbines', k, 'name'], `Another turbine type is called “${name}” too.`, mend));
    }
    types.add(name);
  });
  return findings;
}

/** Stations named elsewhere in the file must be among its stations. */
function references(file: SiteFile): Finding[] {
  const known = new Set(
    (file.stations ?? [])
      .flatMap(({ id, aliases }) => [id, ...(aliases ?? [])])
      .map((name) => name.trim().toLowerCase()),
  );
  const named: [string, JSONPath][] = [
    ...(file.terrain_axes ?? []).flatMap((axis, k) =>
      (axis.stations ?? []).map((id, at): [string, JSONPath] => [id, ['terrain_axes', k, 'stations', at]]),
    ),
    ...(file.neighbours ?? []).flatMap((set, k) =>
      set.map((id, at): [string, JSONPath] => [id, ['neighbours', k, at]]),
    ),
    ...(file.upstream ?? []).flatMap(({ station, from }, k): [string, JSONPath][] => [
      [station, ['upstream', k, 'station']],
      ...from.map((id, at): [string, JSONPath] => [id, ['upstream', k, 'from', at]]),
    ]),
  ];
  return named
    .filter(([id]) => !known.has(id.trim().toLowerCase()))
    .map(([id, path]) =>
      finding(
        path,
        `No station of this file is called “${id}”.`,
        'Correct the name, or add the station under "stations".',
      ),
    );
}

type Turbine = NonNullable<SiteFile['turbines']>[number];

function turbineFits(turbine: Turbine, path: JSONPath): Finding[] {
  const findings: Finding[] = [];
  if (turbine.rotor_diameter_m / 2 >= turbine.hub_height_m) {
    const what = `A rotor of ${turbine.rotor_diameter_m} m on a hub at ${turbine.hub_height_m} m would touch the ground.`;
    findings.push(finding([...path, 'rotor_diameter_m'], what, 'Check hub height and rotor diameter, both in metres.'));
  }
  const speeds = [
    ['cut_in_mps', turbine.cut_in_mps],
    ['rated_mps', turbine.rated_mps],
    ['restart_mps', turbine.restart_mps],
    ['cut_out_mps', turbine.cut_out_mps],
  ] as const;
  const order = speeds.filter(([key, speed]) => speed !== undefined && key !== 'restart_mps');
  order.forEach(([key, speed], k) => {
    const below = order[k - 1];
    if (below !== undefined && !(speed! > below[1]!)) {
      findings.push(
        finding(
          [...path, key],
          `${key} (${speed}) is not above ${below[0]} (${below[1]}).`,
          'Cut-in, rated and cut-out speed rise in this order.',
        ),
      );
    }
  });
  if (turbine.restart_mps !== undefined && !(turbine.restart_mps <= (turbine.cut_out_mps ?? Infinity))) {
    findings.push(
      finding(
        [...path, 'restart_mps'],
        `restart_mps (${turbine.restart_mps}) is above cut_out_mps.`,
        'A turbine starts again below the speed at which it stops.',
      ),
    );
  }
  return [...findings, ...curveFits(turbine, [...path, 'power_curve'])];
}

function curveFits(turbine: Turbine, path: JSONPath): Finding[] {
  const curve = turbine.power_curve;
  if (curve === undefined) return [];
  const { speed_mps: speed, power_kw: power } = curve;
  if (speed.length !== power.length) {
    const what = `The curve has ${speed.length} speeds and ${power.length} powers.`;
    return [finding([...path, 'power_kw'], what, 'Give one power for each speed.')];
  }
  const findings: Finding[] = [];
  const step = speed.findIndex((value, k) => k > 0 && !(value > speed[k - 1]!));
  if (step > 0) {
    const what = `Row ${step + 1} of the curve: the speed ${speed[step]} does not rise above the ${speed[step - 1]} before it.`;
    findings.push(finding([...path, 'speed_mps', step], what, 'Sort the rows by speed, each speed once.'));
  }
  const most = (Math.PI / 4) * turbine.rotor_diameter_m ** 2 * MOST_POWER_DENSITY;
  const high = power.findIndex((value) => value > most);
  if (high >= 0) {
    const what = `Row ${high + 1} of the curve: ${power[high]} kW is more than a rotor of ${turbine.rotor_diameter_m} m can take from the wind.`;
    findings.push(finding([...path, 'power_kw', high], what, 'Powers are in kilowatts, for one turbine.'));
  }
  if (power.every((value) => value === 0)) {
    findings.push(
      finding([...path, 'power_kw'], 'All powers of the curve are zero.', 'Give the power in kilowatts at each speed.'),
    );
  } else if (Math.max(...power) < 20 && turbine.rotor_diameter_m > 30) {
    const what = `The greatest power of the curve is ${Math.max(...power)} kW.`;
    findings.push(finding([...path, 'power_kw'], what, 'Powers are in kilowatts: multiply megawatts by 1000.'));
  }
  return findings;
}

function criteriaFit(file: SiteFile): Finding[] {
  if (typeof file.criteria !== 'object') return [];
  const { categories, ceiling_m: ceiling, nose_ceiling_m: nose } = file.criteria;
  const findings: Finding[] = [];
  if (nose !== undefined && nose > ceiling) {
    const what = `nose_ceiling_m (${nose}) is above ceiling_m (${ceiling}).`;
    findings.push(finding(['criteria', 'nose_ceiling_m'], what, 'Noses are sought within the levels looked at.'));
  }
  categories.forEach(({ speed_mps: speed, falloff_mps: falloff }, k) => {
    const weaker = categories[k - 1];
    if (weaker !== undefined && (speed < weaker.speed_mps || falloff < weaker.falloff_mps)) {
      findings.push(
        finding(
          ['criteria', 'categories', k],
          'This category is weaker than the one before it.',
          'Write the weakest category first.',
        ),
      );
    }
  });
  return findings;
}
