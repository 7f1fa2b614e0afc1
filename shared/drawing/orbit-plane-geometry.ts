import type { FitResult, Residual } from '../../fitting/types'
import type { Point } from './conic-outline'

const RADIANS_PER_DEGREE = Math.PI / 180
/** How much further than its outermost measure an open conic is drawn. */
const OPEN_OVERHANG = 1.15

/** The conic r(ν) = p / (1 + e cos ν) in its own plane; lengths in the target's unit, focus at the origin. */
export interface PlaneConic {
  semiLatusRectum: number
  eccentricity: number
  /** Direction of periapsis from φ = 0, degrees; 0 where only true anomalies are known. */
  periapsisDirectionDeg: number
}

/** The conic of any fit that has one; null for a line or a still pair. */
export function planeConic(result: FitResult): PlaneConic | null {
  if (!result.conic) return null
  return {
    semiLatusRectum: result.conic.semiLatusRectum.value,
    eccentricity: result.conic.eccentricity.value,
    periapsisDirectionDeg: result.elements.periapsisDirection?.value ?? 0,
  }
}

/**
 * The radius at a true anomaly.
 * @param conic lengths in the target's unit.
 * @param trueAnomalyDeg degrees from periapsis.
 * @returns the radius; Infinity where an open conic does not reach that direction.
 */
export function conicRadius(conic: PlaneConic, trueAnomalyDeg: number): number {
  const nearness = 1 + conic.eccentricity * Math.cos(trueAnomalyDeg * RADIANS_PER_DEGREE)
  return nearness > 1e-9 ? conic.semiLatusRectum / nearness : Infinity
}

/** A direction and a radius as a point: φ = 0 to the right, φ growing counter-clockwise. */
export function planePlace(phiDeg: number, radius: number): Point {
  return { x: radius * Math.cos(phiDeg * RADIANS_PER_DEGREE), y: radius * Math.sin(phiDeg * RADIANS_PER_DEGREE) }
}

/**
 * r against the true anomaly, for the drawing.
 * @param conic lengths in the target's unit.
 * @param reach the greatest radius that an open conic is drawn to.
 * @param steps how many pieces the curve is drawn in.
 * @returns points from −180° to 180°, or as far as `reach` for an open conic.
 */
export function radiusByAnomaly(conic: PlaneConic, reach: number, steps = 120): { trueAnomalyDeg: number; radius: number }[] {
  const half = halfAngleDeg(conic, reach)
  return Array.from({ length: steps + 1 }, (_, index) => {
    const trueAnomalyDeg = -half + (2 * half * index) / steps
    return { trueAnomalyDeg, radius: conicRadius(conic, trueAnomalyDeg) }
  })
}

function halfAngleDeg({ semiLatusRectum: p, eccentricity: e }: PlaneConic, reach: number): number {
  if (e < 1) return 180
  return Math.acos(Math.min(1, Math.max(-1, (p / reach - 1) / e))) / RADIANS_PER_DEGREE
}

/** The radius that a drawing must hold: of the outermost measure and, where the conic is closed, of its far apsis. */
export function reachOf(conic: PlaneConic, radii: readonly number[]): number {
  const { semiLatusRectum: p, eccentricity: e } = conic
  const outermost = radii.reduce((greatest, radius) => Math.max(greatest, radius), 0)
  return e < 1 ? Math.max(outermost, p / (1 - e)) : Math.max(outermost * OPEN_OVERHANG, (2 * p) / (1 + e))
}

/** A measure carried back onto the plane of the orbit. */
export interface CarriedBackMeasure {
  id: string
  /** −180 < ν ≤ 180. */
  trueAnomalyDeg: number
  radius: number
  status: Residual['status']
}

/** The measures that could be carried back; the others are missing from the list. */
export function carriedBackMeasures(result: FitResult): CarriedBackMeasure[] {
  return result.residuals.flatMap(({ id, status, inOrbitPlane }) =>
    inOrbitPlane ? [{ id, status, radius: inOrbitPlane.radius, trueAnomalyDeg: signedDegrees(inOrbitPlane.trueAnomalyDeg) }] : [])
}

/** A measure of a `plane` target where it was seen and where the fit puts it. */
export interface PlaneMeasurePlace {
  id: string
  observed: Point
  computed: Point
  status: Residual['status']
}

/** Places in the plane of the orbit; the tick from computed to observed lies along r. */
export function planeMeasures(result: FitResult): PlaneMeasurePlace[] {
  const conic = planeConic(result)
  if (!conic) return []
  return carriedBackMeasures(result).map(({ id, status, trueAnomalyDeg, radius }) => {
    const phiDeg = conic.periapsisDirectionDeg + trueAnomalyDeg
    return { id, status, observed: planePlace(phiDeg, radius), computed: planePlace(phiDeg, conicRadius(conic, trueAnomalyDeg)) }
  })
}

/** An angle as −180° < x ≤ 180°. */
export function signedDegrees(angleDeg: number): number {
  const turned = ((angleDeg % 360) + 360) % 360
  return turned > 180 ? turned - 360 : turned
}
