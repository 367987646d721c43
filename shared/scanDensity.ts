const mmPerInch = 25.4

/**
 * Densities that cameras, phones and screens write when nothing was measured (common practice, no source). A page of
 * writing is never scanned this coarsely, so they count as unknown.
 */
const placeholderDensities: readonly number[] = [72, 96]

/** Pixels per mm from the dots per inch a file states; null when it states none that could have been measured. */
export function pixelsPerMmOf(dotsPerInch: number | null): number | null {
  if (dotsPerInch === null || !Number.isFinite(dotsPerInch) || dotsPerInch <= 0) return null
  if (placeholderDensities.includes(Math.round(dotsPerInch))) return null
  return dotsPerInch / mmPerInch
}
