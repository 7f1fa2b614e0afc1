/**
 * Simulated double stars: a true orbit and measures with normal errors, from a seed alone, by functions that give the same bits in every
 * engine. Used by unit tests, the golden results and the benchmark.
 */
import { apparentPlace, type CampbellElements } from '../../fitting/conic/ephemeris'
import { atan2, hypot, PI, acos } from '../../fitting/elementary'
import { randomStream } from '../../fitting/random'
import type { RelativeMeasure } from '../../fitting/types'

export interface SystemOptions {
  seed: number
  /** Number of measures. */
  count: number
  form?: 'rectangular' | 'polar'
  /** Standard error along and across as a part of a: from, to. */
  sigma?: readonly [number, number]
  /** Arc in periods: from, to. */
  coverage?: readonly [number, number]
  /** Largest eccentricity. */
  eccentricity?: readonly [number, number]
  inclinationRad?: number
  /** Measures say no error. */
  withoutErrors?: boolean
}

export interface SimulatedSystem {
  truth: CampbellElements
  measures: RelativeMeasure[]
  /** Standard error of each coordinate, arcsec. */
  sigmaArcsec: number
}

const OBSERVERS = ['Brandvik', 'Tasque', 'Orrowin', 'Soundraven']

function between(range: readonly [number, number], part: number): number {
  return range[0] + (range[1] - range[0]) * part
}

function drawTruth(options: SystemOptions, uniform: () => number): CampbellElements {
  const periodYr = 20 + 180 * uniform()
  const eccentricity = between(options.eccentricity ?? [0, 0.95], uniform())
  const inclinationRad = options.inclinationRad ?? acos(2 * uniform() - 1)
  if (options.inclinationRad !== undefined) uniform()
  return {
    periodYr, eccentricity, inclinationRad,
    semiMajorAxisArcsec: 0.2 + 3 * uniform(),
    nodeRad: PI * uniform(), argumentOfPeriastronRad: 2 * PI * uniform(), periastronTimeYr: 1950 + periodYr * uniform(),
  }
}

/**
 * Draws a system and its measures.
 * @param options seed, number of measures, and ranges; each has a default.
 * @returns true elements and measures in order of their numbers, not of time.
 */
export function simulatedSystem(options: SystemOptions): SimulatedSystem {
  const random = randomStream(options.seed)
  const truth = drawTruth(options, random.uniform)
  const spanYr = Math.min(350, truth.periodYr * between(options.coverage ?? [0.3, 3], random.uniform()))
  const sigmaArcsec = truth.semiMajorAxisArcsec * between(options.sigma ?? [0.005, 0.05], random.uniform())
  const firstYr = Math.min(1950, 2020 - spanYr)
  const measures = Array.from({ length: options.count }, (_, i): RelativeMeasure => {
    const epochYr = firstYr + spanYr * random.uniform()
    const place = apparentPlace(truth, epochYr)
    const northArcsec = place.northArcsec + sigmaArcsec * random.normal()
    const eastArcsec = place.eastArcsec + sigmaArcsec * random.normal()
    const stated = options.withoutErrors ? undefined : sigmaArcsec
    const base = { id: `m${String(i).padStart(4, '0')}`, observer: OBSERVERS[i % OBSERVERS.length]!, epochYr }
    if (options.form !== 'polar') return { ...base, position: { form: 'rectangular', eastArcsec, northArcsec, sigmaEastArcsec: stated, sigmaNorthArcsec: stated } }
    return {
      ...base,
      position: {
        form: 'polar', thetaRad: atan2(eastArcsec, northArcsec), rhoArcsec: hypot(northArcsec, eastArcsec),
        sigmaRhoArcsec: stated, sigmaThetaRad: stated === undefined ? undefined : stated / Math.max(place.separationArcsec, stated),
      },
    }
  })
  return { truth, measures, sigmaArcsec }
}
