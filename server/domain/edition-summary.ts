import type { Element, FitResult, HonestArc } from '../../fitting/types'
import { formatNumber } from '../../shared/units/number-text'
import { formatElement, formatValueAndSigma, withUnit } from '../../shared/units/value-and-sigma'

/** One line of what an edition says, for lists and mail: "P 62.41 ± 0.38 yr, e 0.482, a 0.861″". */
export function editionSummary(result: FitResult): string {
  if (result.model === 'line') return straightSummary(result)
  if (result.model === 'still') return 'No motion so far'
  if (result.kind === 'equatorial') return solarSummary(result)
  const parts = result.kind === 'plane' ? planeParts(result) : pairParts(result)
  return parts.filter(part => part !== null).join(', ') || (result.conic?.statement ?? result.stop.sentence)
}

function pairParts({ elements }: FitResult): (string | null)[] {
  return [
    said('P', elements.period, formatElement),
    said('e', elements.eccentricity, formatAlone),
    said('a', elements.semiMajorAxis, formatAlone),
  ]
}

/** "Motion so far straight: 0.0410 ± 0.0012″/yr toward 231.2°, closest 3.12″ in 2088.1", as far as the elements are known. */
function straightSummary({ elements: { motion, motionDirection, closestApproach, closestApproachTime } }: FitResult): string {
  const moving = motion && motionDirection ? `${formatElement(motion)} toward ${formatAlone(motionDirection)}` : null
  const closest = closestApproach && closestApproachTime ? `closest ${formatAlone(closestApproach)} in ${formatValueAndSigma(closestApproachTime.value, closestApproachTime.sigma).value}` : null
  return ['Motion so far straight', [moving, closest].filter(part => part !== null).join(', ')].filter(part => part !== '').join(': ')
}

/** "q 0.8841 ± 0.0006 au, e 0.9987 ± 0.0021, parabola not excluded; honest over its 41-day arc". */
function solarSummary({ elements, conic, honestArc }: FitResult): string {
  const parts = [
    said('q', elements.perihelionDistance, formatElement),
    said('e', elements.eccentricity, formatElement),
    conic?.parabolaExcluded === false && conic.class !== 'parabola' ? 'parabola not excluded' : null,
  ]
  const line = parts.filter(part => part !== null).join(', ')
  return honestArc ? `${line}; ${arcWords(honestArc)}` : line
}

function arcWords({ days, standing }: HonestArc): string {
  const arc = `${formatNumber(days, days < 10 ? 1 : 0)}-day arc`
  if (standing === 'perturbed') return `with the planets over its ${arc}`
  return standing === 'honest' ? `honest over its ${arc}` : `its ${arc} is too long for the Sun alone`
}

function planeParts({ elements }: FitResult): (string | null)[] {
  return [
    said('e', elements.eccentricity, formatElement),
    said('p', elements.semiLatusRectum, formatElement),
    said('periapsis toward', elements.periapsisDirection, formatElement),
  ]
}

function said(name: string, element: Element | undefined, format: (element: Element) => string): string | null {
  return element === undefined ? null : `${name} ${format(element)}`
}

/** With the decimals that its error allows, without the error. */
function formatAlone({ value, sigma, unit }: Element): string {
  return withUnit(formatValueAndSigma(value, sigma).value, unit)
}
