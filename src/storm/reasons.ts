// What is missing from a storm assessment and why, told once a reason.

import type { StormNumbers } from './numbers.ts';
import { NO_LFC } from './parcel.ts';

/** In words, and whether data are wanting: air without free convection is an answer, not a gap. */
export interface Reasons {
  readonly why: string;
  readonly wanting: boolean;
}

/** Each reason once, with what it keeps from being known. */
export function reasonsOf(
  numbers: Omit<StormNumbers, 'status' | 'why' | 'notes' | 'airFrom' | 'windAloft' | 'airAloft'>,
): Reasons {
  const { parcels, inflow, shear, helicity, motion, clusters } = numbers;
  const { cloudLayer, upwind } = clusters;
  const told: [what: string, why: string][] = [
    ...parcels.map((parcel): [string, string] => [`${parcel.name} parcel`, parcel.why]),
    ['inflow layer', inflow.kind === 'not-assessable' ? inflow.why : ''],
    ['shear 0-1 km', shear.to1km.why],
    ['shear 0-3 km', shear.to3km.why],
    ['shear 0-6 km', shear.to6km.why],
    ['helicity 0-1 km', helicity.to1km.why],
    ['helicity 0-3 km', helicity.to3km.why],
    ['storm motion', motion.mean.why === '' ? motion.right.why : motion.mean.why],
    ['cloud-layer wind', cloudLayer.why],
    ['cluster motion', cloudLayer.why === '' ? upwind.why : cloudLayer.why],
  ];
  const byReason = new Map<string, string[]>();
  for (const [what, why] of told) {
    if (why !== '') byReason.set(why, [...(byReason.get(why) ?? []), what]);
  }
  const sentences = [...byReason].map(([why, what]) => `${capital(what.join(', '))}: ${why}`);
  return { why: sentences.join(' '), wanting: [...byReason.keys()].some((why) => why !== NO_LFC) };
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
