/**
 * Class of a conic fitted in its plane.
 *   P(e < 1) = Φ(±√Δχ²), Δχ² = χ²(e = 1 held) − χ², + where e < 1;  parabola not excluded while Δχ² < 4;
 *   circle not excluded while exp(−e²/2σ²) > 0.05.
 * Source: profile likelihood: Venzon & Moolgavkar 1988, Applied Statistics 37, 87; circle: Lucy & Sweeney 1971, AJ 76, 544 (from memory).
 */
import type { Conic, Element } from '../types'
import { isCircleExcluded } from './circle-test'
import { normalShares } from './distributions'

const PARABOLA_EXCLUDED_FROM = 4
/** e within this of 0 or 1 is that to rounding. */
const EXACT = 1e-9

export interface PlaneShape {
  semiLatusRectum: Element
  eccentricity: Element
  chiSquare: number
  /** χ² with e = 1 held; null where no parabola reaches every measured direction. */
  parabolaChiSquare: number | null
  /** s² by which Δχ² is divided. */
  scaleSquared: number
}

function classOf(e: number): Conic['class'] {
  if (e < EXACT) return 'circle'
  if (Math.abs(e - 1) < EXACT) return 'parabola'
  return e < 1 ? 'ellipse' : 'hyperbola'
}

const NAMES: Record<Conic['class'], string> = { circle: 'Circle', ellipse: 'Ellipse', parabola: 'Parabola', hyperbola: 'Hyperbola' }

/**
 * The conic with the probability that it is bound.
 * @param shape p and e with errors, χ² with and without e = 1 held.
 * @returns class, probability and statement.
 * Source: Venzon & Moolgavkar 1988, Applied Statistics 37, 87.
 */
export function planeConic(shape: PlaneShape): Conic {
  const { eccentricity, semiLatusRectum, chiSquare, parabolaChiSquare, scaleSquared } = shape
  const { value: e, sigma } = eccentricity
  const hasErrors = sigma !== null
  const delta = parabolaChiSquare === null ? Infinity : Math.max(0, (parabolaChiSquare - chiSquare) / scaleSquared)
  const beyond = delta < Infinity ? normalShares(Math.sqrt(delta)).lower : 1
  const probabilityBound = hasErrors ? (e < 1 ? beyond : 1 - beyond) : null
  const parabolaExcluded = hasErrors ? delta >= PARABOLA_EXCLUDED_FROM : null
  const circleExcluded = isCircleExcluded(e, sigma)
  const remarks = [
    probabilityBound === null ? 'its errors are not known' : `probability of being bound ${probabilityBound.toFixed(3)}`,
    parabolaExcluded === false ? 'a parabola is not excluded' : '',
    circleExcluded === false ? 'a circle is not excluded' : '',
  ].filter((remark) => remark !== '')
  return {
    class: classOf(e), semiLatusRectum, eccentricity, probabilityBound, parabolaExcluded, circleExcluded,
    statement: `${NAMES[classOf(e)]}: ${remarks.join('; ')}`,
  }
}
