/**
 * Apparent places of a double star's companion from its Campbell elements.
 *
 * Symbols: P period and T periastron passage (Julian years), e eccentricity, θ position angle from north through east (rad), ρ separation
 * (arcsec). X = cos E − e, Y = √(1 − e²)·sin E; north = A·X + F·Y, east = B·X + G·Y. θ belongs to the equinox of Ω.
 *
 * Source: Heintz 1978, Double Stars, ch. 4.
 */
import { atan2, hypot, sinCosInto, TWO_PI } from '../elementary'
import { solveKeplerInto } from './kepler'
import type { OrbitOrientation, ThieleInnes } from './thiele-innes'
import { thieleInnesFromCampbell, withinTurn } from './thiele-innes'

/** Campbell elements of a double star. */
export interface CampbellElements extends OrbitOrientation {
  /** P, Julian years, > 0. */
  periodYr: number
  /** T, Julian year. */
  periastronTimeYr: number
  /** e, 0 ≤ e < 1. */
  eccentricity: number
}

/** Place of the companion relative to the primary. */
export interface ApparentPlace {
  /** θ from north through east, rad, 0 to 2π. */
  positionAngleRad: number
  /** ρ, arcsec. */
  separationArcsec: number
  eastArcsec: number
  northArcsec: number
}

const anomaly = new Float64Array(3)

/**
 * Place of the companion at an epoch.
 * @param elements P, T, e, a, i, Ω, ω.
 * @param epochYr Julian year, any finite number.
 * @returns θ, ρ, east and north; NaN where e is outside [0, 1) or P is not above 0.
 * Source: Heintz 1978, Double Stars, ch. 4.
 */
export function apparentPlace(elements: CampbellElements, epochYr: number): ApparentPlace {
  return apparentPlaces(elements, [epochYr])[0]!
}

/**
 * Places of the companion at several epochs.
 * @param elements P, T, e, a, i, Ω, ω.
 * @param epochsYr Julian years.
 * @returns one place an epoch, as apparentPlace.
 * Source: Heintz 1978, Double Stars, ch. 4.
 */
export function apparentPlaces(elements: CampbellElements, epochsYr: readonly number[]): ApparentPlace[] {
  const constants = thieleInnesFromCampbell(elements)
  return epochsYr.map((epochYr) => {
    solveKeplerInto(meanAnomalyAt(elements, epochYr), elements.eccentricity, anomaly)
    return placeFromThieleInnes(constants, elements.eccentricity, anomaly[1]!, anomaly[2]!)
  })
}

/**
 * Mean anomaly at an epoch, of the turn about the nearest periastron passage.
 * @param elements P (Julian years, > 0) and T (Julian year).
 * @param epochYr Julian year.
 * @returns M, rad, −π to π; NaN where P is not above 0.
 * Source: definition, M = 2π·(t − T)/P.
 */
export function meanAnomalyAt(elements: Pick<CampbellElements, 'periodYr' | 'periastronTimeYr'>, epochYr: number): number {
  if (!(elements.periodYr > 0)) return NaN
  const turns = (epochYr - elements.periastronTimeYr) / elements.periodYr
  return TWO_PI * (turns - Math.floor(turns + 0.5))
}

/**
 * Apparent place from Thiele–Innes constants and the eccentric anomaly.
 * @param constants A, B, F, G, arcsec.
 * @param eccentricity e, 0 ≤ e < 1.
 * @param sinE sin E.
 * @param cosE cos E.
 * @returns θ, ρ, east and north.
 * Source: Heintz 1978, Double Stars, ch. 4.
 */
export function placeFromThieleInnes(constants: ThieleInnes, eccentricity: number, sinE: number, cosE: number): ApparentPlace {
  const x = cosE - eccentricity
  const y = Math.sqrt((1 - eccentricity) * (1 + eccentricity)) * sinE
  const northArcsec = constants.a * x + constants.f * y
  const eastArcsec = constants.b * x + constants.g * y
  return {
    positionAngleRad: withinTurn(atan2(eastArcsec, northArcsec)),
    separationArcsec: hypot(eastArcsec, northArcsec),
    eastArcsec,
    northArcsec,
  }
}

const argumentDirection = new Float64Array(2)

/**
 * Eccentricity of the apparent ellipse.
 * @param elements e, i, ω.
 * @returns its eccentricity, 0 to 1.
 * Source: Meeus 1998, Astronomical Algorithms, ch. 57.
 */
export function apparentEccentricity(elements: Pick<CampbellElements, 'eccentricity' | 'inclinationRad' | 'argumentOfPeriastronRad'>): number {
  const e = elements.eccentricity
  sinCosInto(elements.argumentOfPeriastronRad, argumentDirection)
  const sinArgument = argumentDirection[0]!
  const cosArgument = argumentDirection[1]!
  sinCosInto(elements.inclinationRad, argumentDirection)
  const cosTilt = argumentDirection[1]!
  const a = (1 - e * e * cosArgument * cosArgument) * cosTilt * cosTilt
  const b = e * e * sinArgument * cosArgument * cosTilt
  const c = 1 - e * e * sinArgument * sinArgument
  const d = hypot(a - c, 2 * b)
  return Math.sqrt(2 * d / (a + c + d))
}
