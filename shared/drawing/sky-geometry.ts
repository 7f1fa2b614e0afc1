import type { Element, FitResult, Prediction, Residual } from '../../fitting/types'
import type { Point } from './conic-outline'

const RADIANS_PER_DEGREE = Math.PI / 180
/** Below this |cos i| the sky is seen edge-on and a measure cannot be carried back onto the plane of the orbit. */
const LEAST_COS_INCLINATION = 0.05

/** A measure on the sky: where it was seen, and where the fit puts it; x east, y north, arcsec. */
export interface SkyMeasure {
  id: string
  observed: Point
  computed: Point
  status: Residual['status']
}

/**
 * Places of the residuals. What was not measured (θ alone, ρ alone) is taken from the computed place, so that the tick from one
 * to the other shows just the coordinate that was measured. A measure without any O−C (not resolved) has no place.
 * @param result a finished fit of kind `relative`.
 * @returns one entry a measure that has a place, in the order of the residuals.
 */
export function skyMeasures(result: FitResult): SkyMeasure[] {
  return result.residuals.flatMap((residual) => {
    const computed = skyPlace(residual.computed)
    const observed = observedPlace(residual)
    return computed && observed && isMeasured(residual) ? [{ id: residual.id, observed, computed, status: residual.status }] : []
  })
}

function observedPlace({ computed, observedMinusComputed }: Residual): Point | null {
  const measured = Object.entries(observedMinusComputed).filter((entry): entry is [string, number] => entry[1] !== null)
  const differences = Object.fromEntries(measured)
  const isRectangular = differences.eastArcsec !== undefined || differences.northArcsec !== undefined
  const names = isRectangular ? ['eastArcsec', 'northArcsec'] : ['thetaDeg', 'rhoArcsec']
  return skyPlace(Object.fromEntries(names.flatMap(name => computed[name] === undefined ? [] : [[name, computed[name] + (differences[name] ?? 0)]])))
}

function isMeasured({ observedMinusComputed }: Residual): boolean {
  return Object.values(observedMinusComputed).some(value => value !== null)
}

/**
 * A place on the sky from named values: θ and ρ, or east and north (θ and ρ are taken where both pairs are there).
 * @param values by name: thetaDeg, rhoArcsec, eastArcsec, northArcsec.
 * @returns x east, y north, arcsec; null where neither pair is there.
 */
export function skyPlace(values: Record<string, number>): Point | null {
  const { thetaDeg, rhoArcsec, eastArcsec, northArcsec } = values
  if (thetaDeg !== undefined && rhoArcsec !== undefined) {
    const thetaRad = thetaDeg * RADIANS_PER_DEGREE
    return { x: rhoArcsec * Math.sin(thetaRad), y: rhoArcsec * Math.cos(thetaRad) }
  }
  return eastArcsec !== undefined && northArcsec !== undefined ? { x: eastArcsec, y: northArcsec } : null
}

/**
 * The two points where the orbit crosses the plane of the sky, on either side of the primary.
 * @param elements of a fit of kind `relative`, model `kepler`.
 * @returns the one at position angle Ω first; null where an element is missing.
 */
export function skyNodes(elements: Record<string, Element>): [Point, Point] | null {
  const { semiMajorAxis, eccentricity, node, argumentOfPeriastron } = elements
  if (!semiMajorAxis || !eccentricity || !node || !argumentOfPeriastron) return null
  const p = semiMajorAxis.value * (1 - eccentricity.value ** 2)
  const eCosω = eccentricity.value * Math.cos(argumentOfPeriastron.value * RADIANS_PER_DEGREE)
  const [toEast, toNorth] = [Math.sin(node.value * RADIANS_PER_DEGREE), Math.cos(node.value * RADIANS_PER_DEGREE)]
  const [near, far] = [p / (1 + eCosω), p / (1 - eCosω)]
  return [{ x: near * toEast, y: near * toNorth }, { x: -far * toEast, y: -far * toNorth }]
}

/** Predicted places with their year; those of another kind are left out. */
export function skyPredictions(predictions: readonly Prediction[]): { yearYr: number; place: Point }[] {
  return predictions.flatMap(({ at, values }) => {
    const place = skyPlace(values)
    return place ? [{ yearYr: at, place }] : []
  })
}

/** True where |cos i| < 0.05: the measures are not carried back onto the plane of the orbit. */
export function isSeenEdgeOn(elements: Record<string, Element>): boolean {
  const inclination = elements.inclination
  return inclination !== undefined && Math.abs(Math.cos(inclination.value * RADIANS_PER_DEGREE)) < LEAST_COS_INCLINATION
}
