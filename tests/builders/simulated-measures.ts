import { randomStream } from '../../fitting/random'

/** A stated true orbit of a pair, from which measures are simulated; written apart from the engine, so that it can be held against it. */
export interface TruePair {
  periodYr: number
  periastronTimeYr: number
  eccentricity: number
  semiMajorAxisArcsec: number
  inclinationDeg: number
  nodeDeg: number
  argumentOfPeriastronDeg: number
}

export interface TruePlane {
  semiLatusRectum: number
  eccentricity: number
  periapsisDirectionDeg: number
}

export interface SimulatedMeasure {
  epochYr: number
  thetaDeg: number
  rhoArcsec: number
}

export interface Noise {
  sigmaThetaDeg: number
  sigmaRhoArcsec: number
  seed: number
}

const RADIANS_PER_DEGREE = Math.PI / 180

/** Where the companion truly is. */
export function truePlace(pair: TruePair, epochYr: number): { thetaDeg: number, rhoArcsec: number } {
  const e = pair.eccentricity
  const eccentricRad = eccentricAnomalyRad(2 * Math.PI * (epochYr - pair.periastronTimeYr) / pair.periodYr, e)
  const trueRad = 2 * Math.atan2(Math.sqrt(1 + e) * Math.sin(eccentricRad / 2), Math.sqrt(1 - e) * Math.cos(eccentricRad / 2))
  const radius = pair.semiMajorAxisArcsec * (1 - e * Math.cos(eccentricRad))
  const fromNodeRad = trueRad + pair.argumentOfPeriastronDeg * RADIANS_PER_DEGREE
  const along = Math.cos(fromNodeRad)
  const across = Math.sin(fromNodeRad) * Math.cos(pair.inclinationDeg * RADIANS_PER_DEGREE)
  return { thetaDeg: withinTurn(Math.atan2(across, along) / RADIANS_PER_DEGREE + pair.nodeDeg), rhoArcsec: radius * Math.hypot(along, across) }
}

/** Epochs as observers give them, about a step apart: at perfectly even steps short periods would fit as well as the true one. */
export function unevenEpochs({ from, count, stepYr, seed }: { from: number, count: number, stepYr: number, seed: number }): number[] {
  const random = randomStream(seed)
  return Array.from({ length: count }, (_, k) => from + stepYr * (k + 0.6 * random.uniform()))
}

/** Measures at these epochs with normal errors; the same seed gives the same measures. */
export function simulatePair(pair: TruePair, epochsYr: readonly number[], noise: Noise): SimulatedMeasure[] {
  const random = randomStream(noise.seed)
  return epochsYr.map((epochYr) => {
    const place = truePlace(pair, epochYr)
    return {
      epochYr,
      thetaDeg: withinTurn(place.thetaDeg + noise.sigmaThetaDeg * random.normal()),
      rhoArcsec: Math.max(0.01, place.rhoArcsec + noise.sigmaRhoArcsec * random.normal()),
    }
  })
}

/** Distances from the focus of a conic in these directions with normal errors. */
export function simulatePlane(plane: TruePlane, phisDeg: readonly number[], { sigmaR, seed }: { sigmaR: number, seed: number }): { phiDeg: number, r: number }[] {
  const random = randomStream(seed)
  return phisDeg.map(phiDeg => ({ phiDeg, r: trueRadius(plane, phiDeg) + sigmaR * random.normal() }))
}

export function trueRadius({ semiLatusRectum, eccentricity, periapsisDirectionDeg }: TruePlane, phiDeg: number): number {
  return semiLatusRectum / (1 + eccentricity * Math.cos((phiDeg - periapsisDirectionDeg) * RADIANS_PER_DEGREE))
}

/** E − e sin E = M by halving the interval: slow, and right for every e below 1. */
export function eccentricAnomalyRad(meanAnomalyRad: number, eccentricity: number): number {
  const turns = Math.round(meanAnomalyRad / (2 * Math.PI))
  const mean = meanAnomalyRad - 2 * Math.PI * turns
  let low = -Math.PI
  let high = Math.PI
  for (let k = 0; k < 80; k++) {
    const middle = (low + high) / 2
    if (middle - eccentricity * Math.sin(middle) < mean) low = middle
    else high = middle
  }
  return (low + high) / 2
}

export function withinTurn(degrees: number): number {
  return ((degrees % 360) + 360) % 360
}
