/**
 * Orbits from nothing where some measures are wrong: the full scan, scans of random halves and of handfuls, on the measures as stated
 * and on a copy whose quadrants follow each other in time. The most promising minima are polished on all measures as stated, first with
 * the weights of least absolute deviations, then with biweights, and ranked by the sum of the smallest three quarters of d².
 * Source: random subsets and trimmed sums: Rousseeuw 1984, J. American Statistical Association 79, 871; biweight: Beaton & Tukey 1974.
 */
import { PI } from '../elementary'
import { TurnedOrbit } from '../models/relative-kepler'
import type { SkyMeasure } from '../models/sky-measure'
import { randomStream, type RandomStream } from '../random'
import { biweight, robustScale, SMALLEST_WEIGHT, trimmedSum } from '../solve/biweight'
import { searchRelative, type SearchRequest } from './blind-search'
import { isSameMinimum, polish } from './polish'
import { ProjectedOrbit } from './projected-orbit'
import { chainedSigns, searchPoints, type SearchPoints } from './search-points'

const HALVES = 5
/** Measures in a handful: enough for an orbit with something left to test it. */
const HANDFUL = 9
const HANDFULS_AS_STATED = 40
const HANDFULS_FOLLOWING = 10
const MINIMA_EACH = 2
/** Minima polished in each part; there are many parts. */
const POLISHED_EACH = 10
const POLISHED_AT_MOST = 16
const REWEIGHTINGS = 9
/** Rounds that weigh by s/d, which pulls in from further away, before the biweight. */
const PULLING_ROUNDS = 4
const STEPS_EACH = 4

/** A candidate with its trimmed sum; lower is better. */
export interface RobustMinimum {
  values: Float64Array
  trimmed: number
}

/** Every measure free to change its quadrant. */
function asAmbiguous(measures: readonly SkyMeasure[]): SkyMeasure[] {
  return measures.map((measure) => (measure.form === 'rho' ? measure : { ...measure, isAmbiguous: true }))
}

/** Measures turned to the given signs, and fixed there. */
function turned(measures: readonly SkyMeasure[], signs: Int8Array): SkyMeasure[] {
  return measures.map((measure, i) => {
    const thetaRad = signs[i]! < 0 ? measure.thetaRad + PI : measure.thetaRad
    return { ...measure, isAmbiguous: false, thetaRad, north: signs[i]! * measure.north, east: signs[i]! * measure.east }
  })
}

/** A random part, in the order of the whole. */
function randomPart(measures: readonly SkyMeasure[], size: number, random: RandomStream): SkyMeasure[] {
  const indices = measures.map((_, i) => i)
  for (let i = 0; i < size; i++) {
    const other = i + random.below(indices.length - i)
    const kept = indices[i]!
    indices[i] = indices[other]!
    indices[other] = kept
  }
  return indices.slice(0, size).sort((a, b) => a - b).map((i) => measures[i]!)
}

/** d of every point at seven parameters. */
function distancesAt(points: SearchPoints, referenceEpochYr: number, values: ArrayLike<number>): Float64Array {
  const orbit = new TurnedOrbit(referenceEpochYr)
  const distances = new Float64Array(points.count)
  if (!orbit.prepare(values[0]!, values[1]!, values[2]!)) return distances.fill(Infinity)
  for (let i = 0; i < points.count; i++) {
    orbit.at(points.epochsYr[i]!, false)
    const x = values[3]! * orbit.X + values[5]! * orbit.Y
    const y = values[4]! * orbit.X + values[6]! * orbit.Y
    const square = points.m11[i]! * x * x + 2 * points.m12[i]! * x * y + points.m22[i]! * y * y - 2 * (x * points.v1[i]! + y * points.v2[i]!) + points.own[i]!
    distances[i] = Math.sqrt(Math.max(0, square))
  }
  return distances
}

function weighted(points: SearchPoints, weights: Float64Array): SearchPoints {
  const scaled = (values: Float64Array) => values.map((value, i) => value * weights[i]!)
  const own = scaled(points.own)
  return {
    ...points, m11: scaled(points.m11), m12: scaled(points.m12), m22: scaled(points.m22), v1: scaled(points.v1), v2: scaled(points.v2), own,
    constant: own.reduce((sum, value) => sum + value, 0),
  }
}

/** s/d beyond s: the weight of least absolute deviations. */
function pullingWeight(distance: number, scale: number): number {
  return distance > scale ? Math.max(SMALLEST_WEIGHT, scale / distance) : 1
}

/** Reweights and polishes in turn; returns where that ends. */
function polishRobustly(points: SearchPoints, referenceEpochYr: number, start: Float64Array): RobustMinimum {
  let values = start
  for (let round = 0; round < REWEIGHTINGS; round++) {
    const distances = distancesAt(points, referenceEpochYr, values)
    const scale = robustScale(distances, (i) => points.isPair[i] === 1)
    const weights = distances.map((d, i) => {
      const own = points.isPair[i] === 1 ? scale.pair : scale.single
      return round < PULLING_ROUNDS ? pullingWeight(d, own) : biweight(d, own)
    })
    const next = polish(new ProjectedOrbit(weighted(points, weights), referenceEpochYr), values.subarray(0, 3), STEPS_EACH, 1e-4)
    if (!(next.chiSquare < Infinity)) break
    values = next.values
  }
  return { values, trimmed: trimmedSum(distancesAt(points, referenceEpochYr, values)) }
}

/** What is searched of one copy of the measures: all, halves, and handfuls of which some hold no wrong measure. */
function partsOf(measures: readonly SkyMeasure[], handfuls: number, random: RandomStream): (readonly SkyMeasure[])[] {
  const some = (count: number, size: number) =>
    Array.from({ length: size < measures.length ? count : 0 }, () => randomPart(measures, size, random))
  return [measures, ...some(HALVES, Math.floor((measures.length + 1) / 2)), ...some(handfuls, HANDFUL)]
}

/** The lower of the trimmed sums of an orbit and of the orbit turned by 180°, with the one it belongs to. */
function asTurnedBest(points: SearchPoints, referenceEpochYr: number, values: Float64Array): RobustMinimum {
  const turnedValues = values.map((value, j) => (j < 3 ? value : -value))
  const [own, other] = [values, turnedValues].map((v) => ({ values: v, trimmed: trimmedSum(distancesAt(points, referenceEpochYr, v)) }))
  return other!.trimmed < own!.trimmed ? other! : own!
}

function byTrimmed(a: RobustMinimum, b: RobustMinimum): number {
  return a.trimmed - b.trimmed
}

function keepDistinct(minima: readonly RobustMinimum[]): RobustMinimum[] {
  const kept: RobustMinimum[] = []
  for (const minimum of minima) if (!kept.some((other) => isSameMinimum(other.values, minimum.values))) kept.push(minimum)
  return kept
}

/**
 * Searches for relative orbits among measures of which some are wrong.
 * @param request as for the plain search.
 * @param seed of the random parts; stored with the result.
 * @returns distinct candidates, lowest trimmed sum over the measures as stated first.
 */
export function searchRobustly(request: SearchRequest, seed: number): RobustMinimum[] {
  const random = randomStream(seed)
  const { measures, referenceEpochYr } = request
  const points = searchPoints(measures, new Int8Array(measures.length).fill(1))
  const following = turned(measures, chainedSigns(asAmbiguous(measures)))
  const parts = [...partsOf(measures, HANDFULS_AS_STATED, random), ...partsOf(following, HANDFULS_FOLLOWING, random)]
  const found = parts.flatMap((part, k) => {
    const minima = searchRelative({ ...request, measures: part, polishedAtMost: POLISHED_EACH, onProgress: () => undefined }).slice(0, MINIMA_EACH)
    request.onProgress((k + 1) / parts.length)
    return minima.map((minimum) => asTurnedBest(points, referenceEpochYr, minimum.values))
  })
  const promising = keepDistinct(found.sort(byTrimmed)).slice(0, POLISHED_AT_MOST)
  return keepDistinct(promising.map((minimum) => polishRobustly(points, referenceEpochYr, minimum.values)).sort(byTrimmed))
}
