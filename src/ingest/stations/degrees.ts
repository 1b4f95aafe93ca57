// Latitudes and longitudes as lists of stations write them: 52.5, -8.25, 52,5, 52.5N, 52 30N, 52-30-15N, 52°30'15"N.

/**
 * Degrees north or east; NaN where the text is neither.
 * @param decimalComma the table writes 52,5
 */
export function degreesIn(text: string, decimalComma: boolean): number {
  const plain = (decimalComma ? text.replace(',', '.') : text).trim();
  const [, sign, degrees, minutes = '0', seconds = '0', side = ''] =
    /^([-+]?)(\d{1,3}(?:\.\d+)?)\s*°?(?:[-\s]*(\d{1,2}(?:\.\d+)?)['′]?)?(?:[-\s]*(\d{1,2}(?:\.\d+)?)["″]?)?\s*([NSEWnsew]?)$/u.exec(
      plain,
    ) ?? [];
  if (degrees === undefined || Number(minutes) >= 60 || Number(seconds) >= 60) return NaN;
  const size = Number(degrees) + Number(minutes) / 60 + Number(seconds) / 3600;
  return sign === '-' || /[sw]/iu.test(side) ? -size : size;
}
