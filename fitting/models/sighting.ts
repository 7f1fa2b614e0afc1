/**
 * Equatorial measures made ready for the fit: sorted, each with its observer, its axes on the sky and its errors.
 *
 * Errors: as stated where every used measure states both (formal), all alike where none does (scaled), else the median stated for the
 * missing (mixed). Measures of one observer at one station in one night share their systematic part: above four of them
 * σ is taken √(n/4) times as large. An error of the clock enters along the motion m (rad/s): C + σₜ² m mᵀ.
 *
 * Source: night weights: Carpino, Milani & Chesley 2003, Icarus 166, 248 (practice, from memory); Cholesky whitening: Golub & Van Loan 1996.
 */
import type { Vector } from '../conic/state'
import { cos, DEG, sin } from '../elementary'
import { median } from '../solve/median'
import { julianEpochFromJd } from '../time'
import type { EquatorialMeasure, FitSettings, FitStatistics } from '../types'
import { knownObserver } from './known-observers'
import type { Sight } from './sight-rows'
import { compareMeasures } from './sky-measure'

export const ARCSEC_RAD = DEG / 3600
/** Where no measure states an error this stands until the residuals tell, arcsec. */
const PROVISIONAL_SIGMA_ARCSEC = 1
/** So many measures of one night count in full. */
const FULL_WEIGHT_A_NIGHT = 4

/** One measure with its line of sight and errors. */
export interface Sighting extends Sight {
  id: string
  credit: string
  status: 'used' | 'set-aside'
  jdUtc: number
  epochYr: number
  raRad: number
  decRad: number
  /** σ in use, arcsec, without the night's and the clock's part. */
  sigmaEastArcsec: number
  sigmaNorthArcsec: number
  correlation: number
  sigmaTimeS: number
  /** Factor on 1/σ² from the request and from the number in the night. */
  weight: number
  /** Observer, station and night. */
  night: string
  magnitude: number | null
  band: string
}

export interface Sightings {
  all: Sighting[]
  used: Sighting[]
  basis: FitStatistics['errorBasis']
}

/** Motion on the sky, rad/d, east and north. */
export type SkyMotion = readonly [number, number]

/** Local noon to local noon. */
function nightOf(measure: EquatorialMeasure): string {
  return `${measure.observer}\u0000${measure.station ?? ''}\u0000${Math.floor(measure.jdUtc + measure.site.longitudeEastDeg / 360)}`
}

/** Unit vector of a direction. */
export function unitOf(raRad: number, decRad: number): Vector {
  const level = cos(decRad)
  return [level * cos(raRad), level * sin(raRad), sin(decRad)]
}

function axesOf(measure: EquatorialMeasure): Float64Array {
  const u = unitOf(measure.raRad, measure.decRad)
  // At a pole, the meridian named by the right ascension is north, so Δα cos δ keeps its sense.
  const east: Vector = [-sin(measure.raRad), cos(measure.raRad), 0]
  const north: Vector = [u[1] * east[2] - u[2] * east[1], u[2] * east[0] - u[0] * east[2], u[0] * east[1] - u[1] * east[0]]
  return Float64Array.of(...u, ...east, ...north)
}

/**
 * Fills the whitening of a sighting.
 * @param sighting its errors in use.
 * @param motion on the sky, rad/d; [0, 0] leaves the clock out.
 * Source: Golub & Van Loan 1996, Matrix Computations, 4.2 (Cholesky).
 */
export function whiten(sighting: Sighting, motion: SkyMotion): void {
  const { sigmaEastArcsec, sigmaNorthArcsec, correlation, sigmaTimeS, weight, whitening } = sighting
  const [a, b] = [sigmaEastArcsec * ARCSEC_RAD, sigmaNorthArcsec * ARCSEC_RAD]
  const clock = sigmaTimeS / 86400
  const [east, north] = [motion[0] * clock, motion[1] * clock]
  const ee = (a * a + east * east) / weight
  const en = (correlation * a * b + east * north) / weight
  const nn = (b * b + north * north) / weight
  const first = Math.sqrt(ee)
  const below = en / first
  const second = Math.sqrt(nn - below * below)
  whitening[0] = 1 / first
  whitening[2] = 1 / second
  whitening[1] = -below / (first * second)
}

function basisOf(used: readonly EquatorialMeasure[], settings: FitSettings): Sightings['basis'] {
  if (settings.weights === 'equal') return 'scaled'
  const errors = used.flatMap((m) => [m.sigmaRaCosDecArcsec, m.sigmaDecArcsec])
  const stated = errors.filter((sigma) => sigma !== undefined).length
  return stated === errors.length ? 'formal' : stated === 0 ? 'scaled' : 'mixed'
}

function nightWeights(used: readonly EquatorialMeasure[]): Map<string, number> {
  const counts = new Map<string, number>()
  for (const measure of used) counts.set(nightOf(measure), (counts.get(nightOf(measure)) ?? 0) + 1)
  return new Map([...counts].map(([night, n]) => [night, Math.min(1, FULL_WEIGHT_A_NIGHT / n)]))
}

function sightingOf(measure: EquatorialMeasure, errors: { east: number; north: number; correlation: number }, nightWeight: number): Sighting {
  const { jdTt, place, sunVelocity } = knownObserver(measure.site, measure.jdUtc)
  const sighting: Sighting = {
    id: measure.id, credit: measure.observer, status: measure.setAside === true ? 'set-aside' : 'used',
    jdUtc: measure.jdUtc, jdTt, epochYr: julianEpochFromJd(jdTt), raRad: measure.raRad, decRad: measure.decRad,
    observer: Float64Array.from(place), sunVelocity: Float64Array.from(sunVelocity), axes: axesOf(measure),
    sigmaEastArcsec: errors.east, sigmaNorthArcsec: errors.north, correlation: errors.correlation, sigmaTimeS: measure.sigmaTimeS ?? 0,
    weight: (measure.weightFactor ?? 1) * nightWeight, night: nightOf(measure), whitening: new Float64Array(3),
    magnitude: measure.magnitude ?? null, band: measure.band ?? '',
  }
  whiten(sighting, [0, 0])
  return sighting
}

/**
 * Sorts measures, places their observers and resolves their errors.
 * @param measures validated.
 * @param settings weights 'stated' (default) or 'equal'; sigmaScale multiplies every stated error.
 * @returns all sightings and the used ones, both in order of time, with the basis of their errors.
 * Source: Carpino, Milani & Chesley 2003, Icarus 166, 248 (from memory).
 */
export function prepareSightings(measures: readonly EquatorialMeasure[], settings: FitSettings): Sightings {
  const sorted = [...measures].sort((a, b) => a.jdUtc - b.jdUtc || compareMeasures(a, b))
  const used = sorted.filter((measure) => measure.setAside !== true)
  const basis = basisOf(used, settings)
  const stated = used.flatMap((m) => [m.sigmaRaCosDecArcsec, m.sigmaDecArcsec]).filter((sigma): sigma is number => sigma !== undefined)
  const missing = basis === 'scaled' ? PROVISIONAL_SIGMA_ARCSEC : median(stated)
  const nights = nightWeights(used)
  const scale = basis === 'scaled' ? 1 : settings.sigmaScale ?? 1
  const all = sorted.map((m) => {
    const errors = basis === 'scaled'
      ? { east: missing, north: missing, correlation: 0 }
      : { east: scale * (m.sigmaRaCosDecArcsec ?? missing), north: scale * (m.sigmaDecArcsec ?? missing), correlation: m.correlation ?? 0 }
    return sightingOf(m, errors, nights.get(nightOf(m)) ?? 1)
  })
  return { all, used: all.filter((sighting) => sighting.status === 'used'), basis }
}

/**
 * Multiplies every error by a factor, as when equal errors are estimated from the residuals.
 * @param sightings as prepared; changed in place.
 * @param factor > 0.
 */
export function rescaleSightings(sightings: Sightings, factor: number): void {
  for (const sighting of sightings.all) {
    sighting.sigmaEastArcsec *= factor
    sighting.sigmaNorthArcsec *= factor
    whiten(sighting, [0, 0])
  }
}
