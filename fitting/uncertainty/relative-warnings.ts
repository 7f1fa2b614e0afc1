/** Cautions in words that belong to a relative fit. Each says what, why it matters and what would help. */
import { cos } from '../elementary'
import type { Alternative, Conic, Element, FitStatistics, Residual } from '../types'
import type { RelativeElements } from './relative-elements'
import { combinedAngle, EDGE_ON_BELOW, type Errors } from './relative-motion'
import { isWeaklyDetermined } from './relative-profile'
import type { Straightness } from './straightness'

const LONG_PERIOD_SPANS = 12
const LARGE_SCATTER = 2
const OUTLIER_SIGMA = 6
/** One-sided probability of so large a curvature on straight motion. */
const STRAIGHT_ABOVE = 0.05
/** Δχ² within which two orbits fit just as well. */
const EQUAL_WITHIN = 0.1

export interface RelativeFindings {
  elements: RelativeElements
  published: Record<string, Element>
  errors: Errors
  conic: Conic
  statistics: FitStatistics
  residuals: Residual[]
  alternatives: Alternative[]
  /** |(u, v)| met its limit. */
  isAtLimit: boolean
  /** Profile intervals stand in the result. */
  hasProfile: boolean
  /** Test of straight motion; null where it could not be made, left out where the arc is long. */
  straightness?: Straightness | null
}

const round = (value: number, digits: number) => value.toFixed(digits)

function aboutAngles({ elements, errors, conic }: RelativeFindings): string[] {
  const warnings: string[] = []
  const combined = combinedAngle(elements, errors)
  if (combined !== null) {
    const { value, sigma } = combined.element
    warnings.push(`The orbit is seen nearly face on: node and argument of periastron are not determined apart, only ${combined.words} = ${round(value, 2)}°${sigma === null ? '' : ` ± ${round(sigma, 2)}°`}.`)
  }
  if (elements.isCircle) warnings.push('The orbit is a circle to rounding: ω is given as 0 and T as the passage of the node.')
  else if (conic.circleExcluded === false) warnings.push('A circle is not excluded: argument of periastron and time of periastron are poorly known; their combination, the phase, is not.')
  if (Math.abs(cos(elements.inclinationRad)) < EDGE_ON_BELOW) warnings.push('The orbit is seen nearly edge on (|cos i| below 0.05): measures are not carried back into its plane.')
  return warnings
}

function aboutAlternatives({ alternatives, elements }: RelativeFindings): string[] {
  if (alternatives.length === 0) return []
  const shorter = alternatives.filter(({ deltaChiSquare, elements: other }) => deltaChiSquare <= EQUAL_WITHIN && other.period!.value < elements.periodYr)
  const known = `${alternatives.length === 1 ? 'Another orbit fits' : `${alternatives.length} other orbits fit`} almost as well (Δχ² below 9): see the alternatives before publishing.`
  if (shorter.length === 0) return [known]
  return [known, `${shorter.length === 1 ? 'A shorter period fits' : `${shorter.length} shorter periods fit`} just as well, as happens with measures at equal intervals; the longest is given.`]
}

/** Without a significant curvature the line is what the measures show. */
function aboutStraightness(straightness: Straightness | null | undefined): string[] {
  if (straightness === undefined) return []
  if (straightness === null) return ['The arc is too short to tell an orbit from straight motion: fit the straight line as well.']
  const { kappa, sigma, probability } = straightness
  if (probability <= STRAIGHT_ABOVE) return []
  return [`The motion so far is straight: curvature towards the primary is ${round(kappa / sigma, 1)} times its error. Publish the straight line, not this orbit.`]
}

function aboutArc({ published, statistics, isAtLimit, straightness, hasProfile }: RelativeFindings): string[] {
  const warnings: string[] = aboutStraightness(straightness)
  const turns = statistics.arc.turns ?? 0
  if (turns < 0.5) warnings.push(`The measures cover ${round(100 * turns, 0)} % of one period: elements of so short an arc change much with every new measure.`)
  if (turns * LONG_PERIOD_SPANS < 1 || isAtLimit) {
    warnings.push('The arc is too short to bound the orbit (period beyond 12 spans, or eccentricity at the limit of 0.9999): compare with straight motion before publishing an orbit.')
  }
  const condition = statistics.conditionNumber
  if (isWeaklyDetermined(published.period, condition)) {
    warnings.push(hasProfile ? 'On so weakly determined an orbit the linearised errors are too small or too symmetric: go by the profile intervals.'
      : 'The errors given are those of a linearised fit; on so weakly determined an orbit they are too small or too symmetric.')
  }
  if (condition === null) warnings.push('The measures do not determine all elements: no errors can be given.')
  return warnings
}

function aboutScatter({ statistics, residuals }: RelativeFindings): string[] {
  const warnings: string[] = []
  const { errorBasis, reducedChiSquare, degreesOfFreedom } = statistics
  if (errorBasis === 'mixed') warnings.push('Some measures state no error; the median of the stated errors was taken for them.')
  if (statistics.observerErrors) warnings.push('Stated errors were set aside: the error of each observer and method comes from the scatter of its residuals.')
  else if (errorBasis === 'scaled') warnings.push('No measure states an error: all weigh alike, and errors come from the scatter of the residuals.')
  if (degreesOfFreedom === 0) warnings.push('There are as many rows as parameters: the orbit passes through every measure and nothing tests it.')
  if (errorBasis !== 'scaled' && reducedChiSquare !== null && reducedChiSquare > LARGE_SCATTER) {
    warnings.push(`The scatter is ${round(Math.sqrt(reducedChiSquare), 1)} times what the stated errors say: look for offsets, changed quadrants or errors stated too small.`)
  }
  const outliers = residuals.filter((residual) => residual.status === 'used' && (residual.normalised ?? 0) > OUTLIER_SIGMA * Math.sqrt(Math.max(1, reducedChiSquare ?? 1)))
  if (outliers.length > 0) warnings.push(`${outliers.length === 1 ? 'One measure lies' : `${outliers.length} measures lie`} more than ${OUTLIER_SIGMA} σ off: ${outliers.slice(0, 5).map((residual) => residual.id).join(', ')}${outliers.length > 5 ? ', …' : ''}.`)
  const limits = residuals.filter((residual) => residual.status === 'not-fitted').length
  if (limits > 0) warnings.push(`${limits === 1 ? 'One measure is a limit' : `${limits} measures are limits`} (not resolved): shown, not fitted.`)
  return warnings
}

/**
 * Warnings of a relative fit.
 * @param findings everything that the fit found.
 * @returns sentences, most consequential first.
 */
export function relativeWarnings(findings: RelativeFindings): string[] {
  return [...aboutAlternatives(findings), ...aboutArc(findings), ...aboutAngles(findings), ...aboutScatter(findings)]
}
