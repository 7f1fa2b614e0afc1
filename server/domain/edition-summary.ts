import type { Element, FitResult } from '../../fitting/types'
import { formatElement, formatValueAndSigma, withUnit } from '../../shared/units/value-and-sigma'

/** One line of what an edition says, for lists and mail: "P 62.41 ± 0.38 yr, e 0.482, a 0.861″". */
export function editionSummary(result: FitResult): string {
  if (result.model === 'line') return 'Motion so far straight'
  if (result.model === 'still') return 'No motion so far'
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
