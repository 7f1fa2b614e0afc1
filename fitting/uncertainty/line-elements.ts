/**
 * What a straight motion (x₀, y₀, ẋ, ẏ) says, with gradients by its parameters.
 *   ψ = atan2(ẏ, ẋ) the direction of motion, v its size, d = |x₀ sin ψ − y₀ cos ψ| the closest approach,
 *   at t₀ − (x₀ cos ψ + y₀ sin ψ)/v, in the direction ψ ∓ 90°.
 */
import { atan2, cos, PI, RAD, sin } from '../elementary'
import { withinTurn } from '../conic/thiele-innes'
import type { Quantity } from './error-scale'

/** Names of the published elements of a line, in the order of the covariance matrix. */
export const LINE_ELEMENT_NAMES = ['closestApproach', 'closestApproachTime', 'closestApproachPositionAngle', 'motion', 'motionDirection'] as const
export type LineElementName = (typeof LINE_ELEMENT_NAMES)[number]

/**
 * Elements of straight motion.
 * @param values x₀, y₀ (arcsec), ẋ, ẏ (arcsec a year).
 * @param referenceEpochYr t₀, Julian year.
 * @returns closest approach (arcsec), its time (Julian year) and position angle (deg), motion (arcsec a year) and its direction (deg).
 */
export function lineElements(values: ArrayLike<number>, referenceEpochYr: number): Record<LineElementName, Quantity> {
  const [x0, y0, vx, vy] = [values[0]!, values[1]!, values[2]!, values[3]!]
  const speed = Math.sqrt(vx * vx + vy * vy)
  const psi = atan2(vy, vx)
  const [c, s] = [cos(psi), sin(psi)]
  const signed = x0 * s - y0 * c
  const side = signed < 0 ? -1 : 1
  const along = x0 * c + y0 * s
  const dPsi = [0, 0, -vy / (speed * speed), vx / (speed * speed)]
  const dSpeed = [0, 0, c, s]
  return {
    closestApproach: { value: Math.abs(signed), gradient: [side * s, -side * c, side * along * dPsi[2]!, side * along * dPsi[3]!], unit: 'arcsec' },
    closestApproachTime: {
      value: referenceEpochYr - along / speed,
      gradient: [-c / speed, -s / speed, ...[2, 3].map((j) => (signed * dPsi[j]!) / speed + (along / (speed * speed)) * dSpeed[j]!)],
      unit: 'Julian year',
    },
    closestApproachPositionAngle: { value: withinTurn(psi - (side * PI) / 2) * RAD, gradient: dPsi.map((value) => value * RAD), unit: 'deg' },
    motion: { value: speed, gradient: dSpeed, unit: 'arcsec/yr' },
    motionDirection: { value: withinTurn(psi) * RAD, gradient: dPsi.map((value) => value * RAD), unit: 'deg' },
  }
}

/**
 * Elements of a companion that does not move.
 * @param values x₀, y₀, arcsec.
 * @returns separation (arcsec) and position angle (deg).
 */
export function stillElements(values: ArrayLike<number>): Record<'separation' | 'positionAngle', Quantity> {
  const [x, y] = [values[0]!, values[1]!]
  const rho = Math.sqrt(x * x + y * y)
  return {
    separation: { value: rho, gradient: [x / rho, y / rho], unit: 'arcsec' },
    positionAngle: { value: withinTurn(atan2(y, x)) * RAD, gradient: [(-y / (rho * rho)) * RAD, (x / (rho * rho)) * RAD], unit: 'deg' },
  }
}
