import type { Element, FitResult } from '../../fitting/types'
import type { PlanePoint } from './drawing-plate'

const RADIANS_PER_DEGREE = Math.PI / 180

/** The conic r(φ) = p / (1 + e cos(φ − φ₀)) in its own plane; lengths in the target's unit, focus at the origin. */
export interface PlaneConic {
  semiLatusRectum: number
  eccentricity: number
  /** Direction of periapsis, degrees; 0 where the drawing is turned so that periapsis is φ = 0. */
  periapsisDirectionDeg: number
}

/** The conic of any fit that has one; null for a line or a still pair. */
export function planeConic(result: FitResult): PlaneConic | null {
  if (!result.conic) return null
  return {
    semiLatusRectum: result.conic.semiLatusRectum.value,
    eccentricity: result.conic.eccentricity.value,
    periapsisDirectionDeg: directionOf(result.elements),
  }
}

function directionOf(elements: Record<string, Element>): number {
  return elements.periapsisDirection?.value ?? 0
}

/** r at a direction φ, degrees; Infinity where an open conic does not reach that direction. */
export function conicRadius(conic: PlaneConic, phiDeg: number): number {
  const nearness = 1 + conic.eccentricity * Math.cos((phiDeg - conic.periapsisDirectionDeg) * RADIANS_PER_DEGREE)
  return nearness > 1e-9 ? conic.semiLatusRectum / nearness : Infinity
}

/** A direction and a radius as a point: φ = 0 to the right, φ growing counter-clockwise. */
export function planePoint(phiDeg: number, r: number): PlanePoint {
  const phi = phiDeg * RADIANS_PER_DEGREE
  return { x: r * Math.cos(phi), y: r * Math.sin(phi) }
}

/** True where the conic closes on itself. */
export function isClosedConic(conic: PlaneConic): boolean {
  return conic.eccentricity < 1
}

/** How far from periapsis an open conic is drawn: to the radius `greatestRadius`, degrees; 180 for a closed one. */
export function drawnHalfAngleDeg(conic: PlaneConic, greatestRadius: number): number {
  if (isClosedConic(conic)) return 180
  const cosine = (conic.semiLatusRectum / greatestRadius - 1) / conic.eccentricity
  return Math.acos(Math.min(1, Math.max(-1, cosine))) / RADIANS_PER_DEGREE
}

/** The conic as points from one end to the other, about periapsis. */
export function conicPoints(conic: PlaneConic, greatestRadius: number, steps = 180): PlanePoint[] {
  const half = drawnHalfAngleDeg(conic, greatestRadius)
  const count = isClosedConic(conic) ? steps : steps + 1
  return Array.from({ length: count }, (_, index) => {
    const phiDeg = conic.periapsisDirectionDeg - half + (2 * half * index) / steps
    return planePoint(phiDeg, conicRadius(conic, phiDeg))
  })
}

/** r against the true anomaly, degrees from −180 to 180 (an open conic as far as `greatestRadius`). */
export function radiusByAnomaly(conic: PlaneConic, greatestRadius: number, steps = 120): { trueAnomalyDeg: number; radius: number }[] {
  const half = drawnHalfAngleDeg(conic, greatestRadius)
  return Array.from({ length: steps + 1 }, (_, index) => {
    const trueAnomalyDeg = -half + (2 * half * index) / steps
    return { trueAnomalyDeg, radius: conicRadius(conic, trueAnomalyDeg + conic.periapsisDirectionDeg) }
  })
}

/** A measure carried back onto the plane of the orbit: true anomaly in (−180, 180]. */
export interface CarriedBackMeasure {
  id: string
  trueAnomalyDeg: number
  radius: number
  isUsed: boolean
}

/** The measures that could be carried back; the others are missing from the list. */
export function carriedBackMeasures(result: FitResult): CarriedBackMeasure[] {
  return result.residuals.flatMap(({ id, status, inOrbitPlane }) =>
    inOrbitPlane
      ? [{ id, trueAnomalyDeg: signedDegrees(inOrbitPlane.trueAnomalyDeg), radius: inOrbitPlane.radius, isUsed: status === 'used' }]
      : [])
}

/** An angle as −180° < x ≤ 180°. */
export function signedDegrees(angleDeg: number): number {
  const turned = ((angleDeg % 360) + 360) % 360
  return turned > 180 ? turned - 360 : turned
}

/** The greatest radius a drawing must hold: that of the measures and, where closed, of the apocentre. */
export function greatestRadius(conic: PlaneConic, radii: readonly number[]): number {
  const { semiLatusRectum: p, eccentricity: e } = conic
  const seen = radii.reduce((greatest, r) => Math.max(greatest, r), 0)
  return isClosedConic(conic) ? Math.max(seen, p / (1 - e)) : Math.max(seen * 1.15, (2 * p) / (1 + e))
}
