/** Profile intervals of the elements of a relative orbit. Angles and T are followed continuously from the solution. */
import { TWO_PI } from '../elementary'
import { shapeOf } from '../models/relative-kepler'
import type { Element, FitResult, FitSettings } from '../types'
import { profileInterval, type Minimum, type Profiled } from './profile'
import { ELEMENT_NAMES, relativeElements, type RelativeElements } from './relative-elements'

type Name = (typeof ELEMENT_NAMES)[number]

const LIMITS: Partial<Record<Name, { from?: number; to?: number }>> = { period: { from: 0 }, eccentricity: { from: 0, to: 1 }, semiMajorAxis: { from: 0 }, inclination: { from: 0, to: 180 } }
const POORLY_KNOWN_PERIOD = 0.1
const HIGH_CONDITION = 1e4
/** Beyond this many rows profiles are computed only where asked for: each takes hundreds of passes over the rows. */
const PROFILED_ROWS = 1000
/** Node and argument of periastron turn together by 180°. */
const TURN_DEG = 180

/**
 * Do the linearised errors fail here?
 * @param period with its published error.
 * @param conditionNumber of the column-scaled Jacobian; null where the problem is singular.
 * @returns whether σ_P/P is above 0.1 or the condition number above 1e4.
 */
export function isWeaklyDetermined(period: Element | undefined, conditionNumber: number | null): boolean {
  const sigma = period?.sigma ?? null
  return (sigma !== null && sigma / period!.value > POORLY_KNOWN_PERIOD) || (conditionNumber !== null && conditionNumber > HIGH_CONDITION)
}

/**
 * Are profile intervals due?
 * @param asked the setting `errors`.
 * @param rows of the fit.
 * @param period with its published error.
 * @param conditionNumber of the column-scaled Jacobian.
 * @returns always for 'profile', never for 'linear'; else where the linearised errors fail and there are at most 1000 rows.
 */
export function isProfileDue(asked: FitSettings['errors'], rows: number, period: Element | undefined, conditionNumber: number): boolean {
  return asked === 'profile' || (asked === undefined && rows <= PROFILED_ROWS && isWeaklyDetermined(period, conditionNumber))
}

/** Elements at trial values, their angles and T next to those of the solution. */
function followed(name: Name, solved: RelativeElements, values: ArrayLike<number>, referenceEpochYr: number): Profiled['at'] {
  const centre = solved.quantities[name].value
  const varpi = shapeOf(values[1]!, values[2]!).varpiRad
  const firstTurns = Math.round((solved.quantities.periastronTime.value - referenceEpochYr) / solved.periodYr - varpi / TWO_PI)
  return (trial) => {
    const elements = relativeElements({ values: trial, covariance: null, referenceEpochYr, lastEpochYr: referenceEpochYr })
    const quantity = elements.quantities[name]
    if (name === 'node' || name === 'argumentOfPeriastron') {
      return { value: quantity.value + TURN_DEG * Math.round((centre - quantity.value) / TURN_DEG), gradient: quantity.gradient }
    }
    if (name !== 'periastronTime') return quantity
    const turns = firstTurns + Math.round((varpi - shapeOf(trial[1]!, trial[2]!).varpiRad) / TWO_PI)
    const gradient = Float64Array.from(quantity.gradient)
    gradient[0] = gradient[0]! + turns * elements.periodYr
    return { value: quantity.value + turns * elements.periodYr, gradient }
  }
}

/**
 * Profile intervals of P, T, e, a, i, Ω and ω.
 * @param minimum solution in the regular parameters.
 * @param solved its elements.
 * @param referenceEpochYr Julian year.
 * @returns intervals by element, in the element's unit; without those that are not determined.
 * Source: Venzon & Moolgavkar 1988, Applied Statistics 37, 87.
 */
export function relativeProfile(minimum: Minimum, solved: RelativeElements, referenceEpochYr: number): NonNullable<FitResult['profile']> {
  const intervals = ELEMENT_NAMES.map((name) => [name, profileInterval(minimum, { at: followed(name, solved, minimum.values, referenceEpochYr), ...LIMITS[name] })] as const)
  return Object.fromEntries(intervals.flatMap(([name, interval]) => (interval === null ? [] : [[name, interval]])))
}
