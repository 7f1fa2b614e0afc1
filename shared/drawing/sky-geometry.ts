import type { Element, FitResult, Prediction, Residual } from '../../fitting/types'
import type { PlanePoint } from './drawing-plate'

const RADIANS_PER_DEGREE = Math.PI / 180

/**
 * The sky as it is drawn: north up and east to the left, as one sees it. x is therefore minus east.
 * All lengths are arcseconds.
 */
export interface SkyOrbit {
  semiMajorAxisArcsec: number
  eccentricity: number
  inclinationRad: number
  nodeRad: number
  argumentOfPeriastronRad: number
}

/** The ellipse's elements as the drawing needs them; null where the fit is no ellipse on the sky (a line, a still pair). */
export function skyOrbit(elements: Record<string, Element>): SkyOrbit | null {
  const { semiMajorAxis, eccentricity } = elements
  if (!semiMajorAxis || !eccentricity || !(eccentricity.value < 1)) return null
  const radians = (name: string) => (elements[name]?.value ?? 0) * RADIANS_PER_DEGREE
  return {
    semiMajorAxisArcsec: semiMajorAxis.value,
    eccentricity: eccentricity.value,
    inclinationRad: radians('inclination'),
    nodeRad: radians('node'),
    argumentOfPeriastronRad: radians('argumentOfPeriastron'),
  }
}

/** Where the companion stands at a true anomaly, on the sky as drawn. */
export function skyPointAtAnomaly(orbit: SkyOrbit, trueAnomalyRad: number): PlanePoint {
  const { semiMajorAxisArcsec: a, eccentricity: e } = orbit
  const r = (a * (1 - e * e)) / (1 + e * Math.cos(trueAnomalyRad))
  return skyPointInPlane(orbit, r, trueAnomalyRad)
}

function skyPointInPlane(orbit: SkyOrbit, r: number, trueAnomalyRad: number): PlanePoint {
  const u = trueAnomalyRad + orbit.argumentOfPeriastronRad
  const alongNode = r * Math.cos(u)
  const acrossNode = r * Math.sin(u) * Math.cos(orbit.inclinationRad)
  const [sinNode, cosNode] = [Math.sin(orbit.nodeRad), Math.cos(orbit.nodeRad)]
  const north = alongNode * cosNode - acrossNode * sinNode
  const east = alongNode * sinNode + acrossNode * cosNode
  return skyPoint(east, north)
}

/** East and north, arcsec, as a point of the drawing (east is drawn to the left). */
export function skyPoint(eastArcsec: number, northArcsec: number): PlanePoint {
  return { x: -eastArcsec, y: northArcsec }
}

/** A position angle (from north through east) and separation as a point of the drawing. */
export function skyPointPolar(thetaDeg: number, rhoArcsec: number): PlanePoint {
  const theta = thetaDeg * RADIANS_PER_DEGREE
  return skyPoint(rhoArcsec * Math.sin(theta), rhoArcsec * Math.cos(theta))
}

/** The whole ellipse in even steps of the eccentric anomaly, so that its sharp end is drawn as finely as the rest. */
export function skyEllipse(orbit: SkyOrbit, steps = 180): PlanePoint[] {
  const { semiMajorAxisArcsec: a, eccentricity: e } = orbit
  return Array.from({ length: steps }, (_, index) => {
    const E = (2 * Math.PI * index) / steps
    const [x, y] = [a * (Math.cos(E) - e), a * Math.sqrt(1 - e * e) * Math.sin(E)]
    return skyPointInPlane(orbit, Math.hypot(x, y), Math.atan2(y, x))
  })
}

/** From periastron to apastron, through the primary. */
export function skyApsides(orbit: SkyOrbit): { periastron: PlanePoint; apastron: PlanePoint } {
  return { periastron: skyPointAtAnomaly(orbit, 0), apastron: skyPointAtAnomaly(orbit, Math.PI) }
}

/** The two points where the orbit crosses the plane of the sky; the first lies at the position angle Ω. */
export function skyNodes(orbit: SkyOrbit): [PlanePoint, PlanePoint] {
  const ω = orbit.argumentOfPeriastronRad
  return [skyPointAtAnomaly(orbit, -ω), skyPointAtAnomaly(orbit, Math.PI - ω)]
}

/** A measure on the sky: where it was seen, and where the fit puts it. */
export interface SkyMeasure {
  id: string
  observed: PlanePoint
  computed: PlanePoint
  status: Residual['status']
}

/**
 * Observed and computed place of each residual. What was not measured (θ alone, ρ alone) is taken from the computed place,
 * so that the tick shows just the coordinate that was measured. Measures without any O−C (not resolved) have no place.
 */
export function skyMeasures(result: FitResult): SkyMeasure[] {
  return result.residuals.flatMap(residual => {
    const computed = pointOf(residual.computed)
    const observed = pointOf(withDifference(residual))
    const isSeen = Object.values(residual.observedMinusComputed).some(value => value !== null)
    return computed && observed && isSeen ? [{ id: residual.id, observed, computed, status: residual.status }] : []
  })
}

function withDifference(residual: Residual): Record<string, number> {
  return Object.fromEntries(
    Object.entries(residual.computed).map(([name, value]) => [name, value + (residual.observedMinusComputed[name] ?? 0)]),
  )
}

function pointOf(values: Record<string, number>): PlanePoint | null {
  const { thetaDeg, rhoArcsec, eastArcsec, northArcsec } = values
  if (eastArcsec !== undefined && northArcsec !== undefined && thetaDeg === undefined) return skyPoint(eastArcsec, northArcsec)
  if (thetaDeg !== undefined && rhoArcsec !== undefined) return skyPointPolar(thetaDeg, rhoArcsec)
  return null
}

/** A predicted place; null where the prediction is of another kind. */
export function skyPrediction(prediction: Prediction): PlanePoint | null {
  return pointOf(prediction.values)
}

/** The inclination below which measures cannot be carried back onto the plane of the orbit: |cos i| < 0.05. */
export function isSeenEdgeOn(elements: Record<string, Element>): boolean {
  const inclination = elements.inclination
  return inclination !== undefined && Math.abs(Math.cos(inclination.value * RADIANS_PER_DEGREE)) < 0.05
}
