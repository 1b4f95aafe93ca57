// A series as few straight pieces: the swinging door.

/** Indices of the samples at which one straight piece ends and the next begins, first and last included. */
export type Corners = readonly number[];

/**
 * Swinging-door segmentation (Bristol 1990, "Swinging door trending: adaptive trend recording?", ISA National Conference;
 * used on wind ramps by Florita, Hodge & Orwig 2013, IEEE Green Technologies Conference; titles from memory): two doors
 * hinge half a width above and below the last corner and swing inward to each new sample; when they would be more than
 * parallel, the sample before is a corner.
 * @param time ascending
 * @param value same length, no NaN
 * @param width by how much a straight piece may miss a sample, in the unit of the values
 */
export function swingingDoor(time: ArrayLike<number>, value: ArrayLike<number>, width: number): Corners {
  const count = time.length;
  if (count === 0) return [];
  const corners = [0];
  let hinge = 0;
  let steepestUpper = -Infinity;
  let flattestLower = Infinity;
  for (let k = 1; k < count; k++) {
    const elapsed = time[k]! - time[hinge]!;
    const rise = value[k]! - value[hinge]!;
    steepestUpper = Math.max(steepestUpper, (rise - width) / elapsed);
    flattestLower = Math.min(flattestLower, (rise + width) / elapsed);
    if (steepestUpper <= flattestLower) continue;
    hinge = k - 1;
    corners.push(hinge);
    const step = time[k]! - time[hinge]!;
    steepestUpper = (value[k]! - value[hinge]! - width) / step;
    flattestLower = (value[k]! - value[hinge]! + width) / step;
  }
  if (count > 1) corners.push(count - 1);
  return corners;
}
