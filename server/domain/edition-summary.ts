import type { Element, FitResult } from '../../fitting/types'
import { formatUncertain, formatValue } from '../../shared/units/uncertain-text'

/** How a unit stands behind a number in a sentence; a sign follows it closely. */
const UNIT_TEXT: Record<string, string> = { arcsec: '″', deg: '°', arcmin: '′', yr: ' yr' }

/** One line of what an edition says, for lists and mail: "P 62.41 ± 0.38 yr, e 0.482, a 0.861″". */
export function editionSummary(result: FitResult): string {
  if (result.model === 'line') return 'Motion so far straight'
  if (result.model === 'still') return 'No motion so far'
  const parts = result.kind === 'plane' ? planeParts(result) : pairParts(result)
  return parts.filter(part => part !== null).join(', ') || (result.conic?.statement ?? result.stop.sentence)
}

function pairParts({ elements }: FitResult): (string | null)[] {
  return [
    said('P', elements.period, true),
    said('e', elements.eccentricity, false),
    said('a', elements.semiMajorAxis, false),
  ]
}

function planeParts({ elements }: FitResult): (string | null)[] {
  return [
    said('e', elements.eccentricity, true),
    said('p', elements.semiLatusRectum, true),
    said('periapsis toward', elements.periapsisDirection, true),
  ]
}

function said(name: string, element: Element | undefined, withSigma: boolean): string | null {
  if (element === undefined) return null
  const value = withSigma ? formatUncertain(element.value, element.sigma) : formatValue(element.value, element.sigma)
  return `${name} ${value}${UNIT_TEXT[element.unit] ?? (element.unit === '' || element.unit === '1' ? '' : ` ${element.unit}`)}`
}
