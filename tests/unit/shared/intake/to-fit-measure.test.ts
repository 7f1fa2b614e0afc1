import { describe, expect, it } from 'vitest'
import { readRow } from '../../../../shared/intake/read-row'
import { toFitMeasure } from '../../../../shared/intake/to-fit-measure'
import type { RelativeMeasure } from '../../../../fitting/types'

function measureOf(cells: Record<string, string>): RelativeMeasure {
  const { parsed } = readRow({ epoch: 'J1976.25', theta_deg: '90', rho_arcsec: '1.2', ...cells }, 'relative')
  if (parsed?.kind !== 'relative') throw new Error('The row could not be read.')
  return toFitMeasure(parsed, 'id', 'T. Orrowin')
}

describe('a row handed to the engine', () => {
  it('carries the method, so that errors can be estimated by observer and method', () => {
    expect(measureOf({ method: 'speckle' }).method).toBe('speckle')
    expect(measureOf({})).not.toHaveProperty('method')
  })

  it.each([['ICRS', 2000], ['J2000', 2000], ['of_date', 1976.25], ['1900', 1900]])('takes a frame of θ given as %s for the equinox %s', (theta_frame, equinoxYr) => {
    expect(measureOf({ theta_frame }).thetaEquinoxYr).toBe(equinoxYr)
  })

  it('takes B1950 for the Besselian year it is', () => {
    // B1950.0 = JD 2433282.42345905 (Lieske 1979, A&A 73, 282) = J1949.999790
    expect(measureOf({ theta_frame: 'B1950' }).thetaEquinoxYr).toBeCloseTo(1949.99979, 5)
  })

  it('assumes no frame of θ where none is stated', () => {
    expect(measureOf({})).not.toHaveProperty('thetaEquinoxYr')
  })
})
