/** Scatter and offset of the residuals, for the whole fit and by observer. */
import type { FitStatistics, Residual } from '../types'

/** Keys of observedMinusComputed with the unit of each. */
export type CoordinateUnits = Readonly<Record<string, string>>

function valuesOf(residuals: readonly Residual[], key: string): number[] {
  return residuals.map((residual) => residual.observedMinusComputed[key]).filter((value): value is number => typeof value === 'number')
}

function rootMeanSquare(values: readonly number[]): number {
  return Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length)
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length
}

function byKey(residuals: readonly Residual[], keys: readonly string[], statistic: (values: readonly number[]) => number): Record<string, number> {
  const out: Record<string, number> = {}
  for (const key of keys) {
    const values = valuesOf(residuals, key)
    if (values.length > 0) out[key] = statistic(values)
  }
  return out
}

/**
 * Root mean square of the used residuals by coordinate.
 * @param residuals of one fit.
 * @param units coordinates to report and their units.
 * @returns one entry for each coordinate that was measured at least once.
 */
export function rmsByCoordinate(residuals: readonly Residual[], units: CoordinateUnits): FitStatistics['rms'] {
  const used = residuals.filter((residual) => residual.status === 'used')
  const out: FitStatistics['rms'] = {}
  for (const [key, value] of Object.entries(byKey(used, Object.keys(units), rootMeanSquare))) out[key] = { value, unit: units[key]! }
  return out
}

/**
 * Number, scatter and mean offset of the used residuals of each observer, by name in code-unit order.
 * @param residuals of one fit.
 * @param observers observer of each residual, same order.
 * @param keys coordinates to report.
 * @returns one entry an observer with at least one used measure.
 */
export function statisticsByObserver(residuals: readonly Residual[], observers: readonly string[], keys: readonly string[]): FitStatistics['byObserver'] {
  const groups = new Map<string, Residual[]>()
  residuals.forEach((residual, i) => {
    if (residual.status !== 'used') return
    const group = groups.get(observers[i]!)
    if (group) group.push(residual)
    else groups.set(observers[i]!, [residual])
  })
  return [...groups.keys()].sort((a, b) => (a < b ? -1 : 1)).map((observer) => {
    const own = groups.get(observer)!
    return { observer, measures: own.length, rms: byKey(own, keys, rootMeanSquare), bias: byKey(own, keys, mean) }
  })
}
