/**
 * Elements of an orbit about the Sun with their gradients by the fitted parameters, by central differences.
 * Angles are differenced within half a turn, so that a node at 0° does no harm. Where e or sin i is as small as its error, ω, Ω and T
 * have gradients as large as that uncertainty is.
 * Source: propagation of errors, Bevington & Robinson (2003), 3.2; elements as models/perihelion.ts.
 */
import { meanMotion } from '../conic/anomalies'
import { withinTurn } from '../conic/thiele-innes'
import { SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth'
import { RAD } from '../elementary'
import type { EquatorialOrbit } from '../models/equatorial-orbit'
import { perihelionFromState, type PerihelionElements } from '../models/perihelion'
import type { Quantity } from './error-scale'

/** Elements every orbit has, then those of a bound one. */
export const PERIHELION_NAMES = ['perihelionDistance', 'eccentricity', 'inclination', 'node', 'argumentOfPerihelion', 'perihelionTime'] as const

export interface EquatorialElements {
  at: PerihelionElements
  quantities: Record<string, Quantity>
  semiLatusRectum: Quantity
  /** Revolutions a day; null where unbound. */
  periodDays: number | null
}

/** Steps of the differences: rad, ln and the rates in rad/d. */
const STEP = 1e-6
const RATE_STEP = 2e-8
const HALF_TURN_DEG = 180

/** All numbers that are published, in the order of `UNITS`. */
function numbersOf(elements: PerihelionElements, epochJdTt: number): number[] {
  const { perihelionDistanceAu: q, eccentricity: e } = elements
  const since = epochJdTt - elements.perihelionTimeJdTt
  const motion = meanMotion({ periapsisDistance: q, eccentricity: e, gravitationalParameter: MU })
  return [
    q, e, elements.inclinationRad * RAD, elements.nodeRad * RAD, elements.argumentOfPerihelionRad * RAD, -since,
    q / (1 - e), motion * since * RAD, motion * RAD, q * (1 + e),
  ]
}

const UNITS = ['au', '', 'deg', 'deg', 'deg', 'JD TT', 'au', 'deg', 'deg/d', 'au'] as const
const ANGLES = new Set([2, 3, 4, 7])

/** Values at these parameters; null outside the domain. */
type NumbersAt = (values: ArrayLike<number>) => number[] | null

function stepOf(name: string): number {
  return name === 'xiDot' || name === 'etaDot' || name === 'distanceRate' ? RATE_STEP : STEP
}

/**
 * Gradients by central differences.
 * @param at numbers at given parameters.
 * @param values the parameters.
 * @param names of the parameters, which tell the steps.
 * @param isAngle whether a number is an angle in degrees.
 * @returns one gradient a number; NaN where a step leaves the domain.
 */
export function centralGradients(at: NumbersAt, values: ArrayLike<number>, names: readonly string[], isAngle: (index: number) => boolean): Float64Array[] {
  const count = at(values)?.length ?? 0
  const gradients = Array.from({ length: count }, () => new Float64Array(names.length).fill(NaN))
  names.forEach((name, j) => {
    const h = stepOf(name)
    const shifted = (by: number) => at(Float64Array.from(values, (value, k) => (k === j ? value + by : value)))
    const [above, below] = [shifted(h), shifted(-h)]
    if (above === null || below === null) return
    for (let i = 0; i < count; i++) {
      const change = above[i]! - below[i]!
      const turns = isAngle(i) ? Math.round(change / (2 * HALF_TURN_DEG)) : 0
      gradients[i]![j] = (change - 2 * HALF_TURN_DEG * turns) / (2 * h)
    }
  })
  return gradients
}

/**
 * Elements of a fitted orbit.
 * @param orbit reference and map.
 * @param values the fitted parameters.
 * @param epochJdTt epoch of the elements, JD of TT.
 * @returns elements with gradients; semiMajorAxis, meanAnomaly and meanMotion where bound.
 * Source: Bevington & Robinson (2003), 3.2.
 */
export function equatorialElements(orbit: EquatorialOrbit, values: ArrayLike<number>, epochJdTt: number): EquatorialElements {
  const { map, motion, reference } = orbit
  const isParabola = reference.motion !== undefined
  const state = new Float64Array(6)
  const moved = new Float64Array(6)
  const elementsAt = (parameters: ArrayLike<number>): PerihelionElements | null => {
    if (!map.stateInto(parameters, state, null)) return null
    if (epochJdTt === reference.jdTt) moved.set(state)
    else if (!motion.begin(state, false) || !motion.at(epochJdTt - motion.epochJdTt, moved)) return null
    const elements = perihelionFromState(moved, epochJdTt)
    return isParabola ? { ...elements, eccentricity: 1 } : elements
  }
  const at = elementsAt(values)
  if (at === null) throw new RangeError('Elements were asked of parameters outside the domain.')
  const numbers = numbersOf(at, epochJdTt)
  const gradients = centralGradients((parameters) => {
    const elements = elementsAt(parameters)
    return elements && numbersOf(elements, epochJdTt)
  }, values, map.names, (index) => ANGLES.has(index))
  const quantity = (i: number): Quantity => ({ value: numbers[i]!, gradient: gradients[i]!, unit: UNITS[i]! })
  const quantities: Record<string, Quantity> = {}
  PERIHELION_NAMES.forEach((name, i) => { quantities[name] = quantity(i) })
  quantities.perihelionTime!.value = at.perihelionTimeJdTt
  const isBound = at.eccentricity < 1
  if (isBound) {
    quantities.semiMajorAxis = quantity(6)
    quantities.meanAnomaly = { ...quantity(7), value: withinTurn(numbers[7]! / RAD) * RAD }
    quantities.meanMotion = quantity(8)
  }
  return { at, quantities, semiLatusRectum: quantity(9), periodDays: isBound ? 360 / numbers[8]! : null }
}
