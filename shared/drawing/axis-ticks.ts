export interface AxisTicks {
  values: number[]
  /** Distance from tick to tick; 1, 2 or 5 times a power of ten. */
  step: number
  /** Decimals that the ticks' labels need. */
  decimals: number
}

/** The smallest of 1, 2, 5 × 10ⁿ that is at least `atLeast` (any unit, > 0). */
export function roundStep(atLeast: number): number {
  if (!(atLeast > 0) || !Number.isFinite(atLeast)) throw new RangeError(`A step needs a length above 0, not ${atLeast}.`)
  const power = Math.floor(Math.log10(atLeast) + 1e-9)
  const scale = 10 ** power
  const lead = [1, 2, 5, 10].find(candidate => candidate * scale >= atLeast * (1 - 1e-9)) ?? 10
  return lead * scale
}

/** Round ticks inside [least, greatest], at most `atMost` of them (≥ 2). */
export function axisTicks(least: number, greatest: number, atMost: number): AxisTicks {
  const span = greatest - least
  if (!(span > 0)) throw new RangeError(`An axis needs a span above 0, not ${least} to ${greatest}.`)
  const step = roundStep(span / Math.max(1, atMost - 1))
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9))
  const first = Math.ceil(least / step - 1e-9)
  const last = Math.floor(greatest / step + 1e-9)
  const values = Array.from({ length: last - first + 1 }, (_, index) => Number(((first + index) * step).toFixed(decimals)))
  return { values, step, decimals }
}

/** Ticks at whole multiples of a stated step, such as 90° of a circle. */
export function ticksEvery(least: number, greatest: number, step: number): AxisTicks {
  const first = Math.ceil(least / step - 1e-9)
  const last = Math.floor(greatest / step + 1e-9)
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9))
  return { values: Array.from({ length: last - first + 1 }, (_, index) => (first + index) * step), step, decimals }
}
