export interface ScaleBar {
  /** A round length in the drawing's unit: 1, 2 or 5 × 10ⁿ. */
  length: number
  lengthPx: number
  /** Decimals the label needs. */
  decimals: number
}

/** The longest round length that is no longer than `longestPx` on a drawing of `pxPerUnit` pixels a unit. */
export function scaleBar(pxPerUnit: number, longestPx: number): ScaleBar {
  const longest = longestPx / pxPerUnit
  if (!(longest > 0) || !Number.isFinite(longest)) throw new RangeError(`A scale bar needs a scale above 0, not ${pxPerUnit} pixels a unit.`)
  const power = Math.floor(Math.log10(longest) + 1e-9)
  const lead = [5, 2, 1].find(candidate => candidate * 10 ** power <= longest * (1 + 1e-9)) ?? 1
  const decimals = Math.max(0, -power)
  const length = Number((lead * 10 ** power).toFixed(decimals))
  return { length, lengthPx: length * pxPerUnit, decimals }
}
