/**
 * What an orbit about the Sun says of the motion: its class, the constants of motion, and the arc that was observed.
 * Source: Goldstein 1980, Classical Mechanics, ch. 3; profile likelihood: Venzon & Moolgavkar 1988, Applied Statistics 37, 87.
 */
import { constantsFromState, largestDrift } from '../conic/constants'
import { elementsFromState, lengthOf, type StateVectors } from '../conic/state'
import { eclipticFromEquatorial, SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth'
import { RAD } from '../elementary'
import { movedAlongConic, stateOfValues, type EquatorialOrbit } from '../models/equatorial-orbit'
import type { Sighting } from '../models/sighting'
import type { Conic, Constants, FitStatistics } from '../types'
import { centralGradients, type EquatorialElements } from './equatorial-elements'
import { elementOf, type Quantity } from './error-scale'
import { planeConic } from './plane-conic'
import type { Errors } from './relative-motion'

const FRAME = 'ecliptic and equinox of J2000'
const UNBOUND = 'a heliocentric eccentricity above 1 does not make it interstellar: that asks for the original orbit about the barycentre'

export interface MotionFindings {
  orbit: EquatorialOrbit
  values: ArrayLike<number>
  elements: EquatorialElements
  errors: Errors
  used: readonly Sighting[]
}

/** Place and velocity on ecliptic axes. */
function vectorsOf(state: ArrayLike<number>): StateVectors {
  return { place: eclipticFromEquatorial([state[0]!, state[1]!, state[2]!]), velocity: eclipticFromEquatorial([state[3]!, state[4]!, state[5]!]) }
}

/**
 * Class of the orbit with the probability that it is bound.
 * @param findings of the fit.
 * @param chiSquares χ², χ² with e = 1 held (null where there is none), and s² by which their difference is divided.
 * @returns the conic; a held parabola says so.
 * Source: Venzon & Moolgavkar 1988, Applied Statistics 37, 87.
 */
export function equatorialConic({ orbit, elements, errors }: MotionFindings, chiSquares: { chiSquare: number; parabolaChiSquare: number | null; scaleSquared: number }): Conic {
  const semiLatusRectum = elementOf(elements.semiLatusRectum, errors.covariance, errors.scale)
  const eccentricity = elementOf(elements.quantities.eccentricity!, errors.covariance, errors.scale)
  if (orbit.reference.motion) {
    return {
      class: 'parabola', semiLatusRectum, eccentricity: { value: 1, sigma: null, sigmaFormal: null, sigmaScaled: null, unit: '' },
      probabilityBound: null, parabolaExcluded: null, circleExcluded: null, statement: 'Parabola, held',
    }
  }
  const conic = planeConic({ semiLatusRectum, eccentricity, ...chiSquares })
  return conic.class === 'hyperbola' ? { ...conic, statement: `${conic.statement}; ${UNBOUND}` } : conic
}

/** ε, |h|, A by components, |A| of parameters. */
function numbersAt(orbit: EquatorialOrbit, values: ArrayLike<number>): number[] {
  const constants = constantsFromState(vectorsOf(stateOfValues(orbit, values)), MU)
  return [constants.specificEnergy, lengthOf(constants.angularMomentum), ...constants.laplaceRungeLenz, lengthOf(constants.laplaceRungeLenz)]
}

const UNITS = ['au²/d²', 'au²/d', 'au³/d²', 'au³/d²', 'au³/d²', 'au³/d²'] as const

/**
 * Constants of motion per unit mass at the epoch, in au and days.
 * @param findings of the fit.
 * @returns ε, h and the Laplace–Runge–Lenz vector with errors, and their largest drift along the conic over the measured times.
 * Source: Goldstein 1980, Classical Mechanics, ch. 3.
 */
export function equatorialConstants({ orbit, values, errors, used }: MotionFindings): Constants {
  const numbers = numbersAt(orbit, values)
  const gradients = centralGradients((parameters) => numbersAt(orbit, parameters), values, orbit.map.names, () => false)
  const element = (i: number) => elementOf({ value: numbers[i]!, gradient: gradients[i]!, unit: UNITS[i]! } satisfies Quantity, errors.covariance, errors.scale)
  const start = stateOfValues(orbit, values)
  const states = used.map((sighting) => movedAlongConic(start, sighting.jdTt - orbit.reference.jdTt)).filter((state) => state !== null)
  return {
    gravitationalParameter: { value: MU, sigma: null, sigmaFormal: null, sigmaScaled: null, unit: 'au³/d²' },
    specificEnergy: element(0),
    angularMomentum: element(1),
    laplaceRungeLenz: { frame: FRAME, components: [element(2), element(3), element(4)], magnitude: element(5) },
    largestDrift: largestDrift(states.map(vectorsOf), MU),
  }
}

/**
 * The arc in time, in periods and in true anomaly.
 * @param findings of the fit.
 * @returns the arc; no position angle belongs to it.
 */
export function equatorialArc({ orbit, values, elements, used }: MotionFindings): FitStatistics['arc'] {
  const [first, last] = [used[0]!, used[used.length - 1]!]
  const start = stateOfValues(orbit, values)
  const [from, to] = [first, last].map(({ jdTt }) => {
    const state = movedAlongConic(start, jdTt - orbit.reference.jdTt)
    return state === null ? NaN : elementsFromState(vectorsOf(state), MU).trueAnomalyRad * RAD
  }) as [number, number]
  const turns = elements.periodDays === null ? null : (last.jdTt - first.jdTt) / elements.periodDays
  const swept = to - from - 360 * Math.floor((to - from) / 360)
  return {
    firstEpochYr: first.epochYr, lastEpochYr: last.epochYr, turns,
    trueAnomalyCoveredDeg: turns !== null && turns >= 1 ? 360 : swept === swept ? swept : null,
    positionAngleCoveredDeg: null,
  }
}
