import { describe, expect, it } from 'vitest'
import { isSeenEdgeOn, skyMeasures, skyNodes, skyPlace, skyPredictions } from '../../../../shared/drawing/sky-geometry'
import { element, pairResult, residual } from '../../../builders/fit-result'

describe('places on the sky', () => {
  it('reads a position angle from north through east', () => {
    expect(skyPlace({ thetaDeg: 90, rhoArcsec: 2 })!.x).toBeCloseTo(2, 12)
    expect(skyPlace({ thetaDeg: 180, rhoArcsec: 2 })!.y).toBeCloseTo(-2, 12)
    expect(skyPlace({ eastArcsec: 0.3, northArcsec: -0.4 })).toEqual({ x: 0.3, y: -0.4 })
    expect(skyPlace({ thetaDeg: 90 })).toBeNull()
  })

  it('puts a measure where it was seen: computed plus O−C, in the coordinates it was measured in', () => {
    const polar = residual('polar', { thetaDeg: 10, rhoArcsec: 1, eastArcsec: 0.17, northArcsec: 0.98 }, { observedMinusComputed: { thetaDeg: 80, rhoArcsec: 0.5, eastArcsec: null, northArcsec: null } })
    const rectangular = residual('rectangular', { thetaDeg: 10, rhoArcsec: 1, eastArcsec: 0.2, northArcsec: 0.9 }, { observedMinusComputed: { thetaDeg: null, rhoArcsec: null, eastArcsec: 0.1, northArcsec: -0.2 } })
    const [first, second] = skyMeasures(pairResult({}, { residuals: [polar, rectangular] }))
    expect(first!.observed.x).toBeCloseTo(1.5, 12)
    expect(first!.observed.y).toBeCloseTo(0, 12)
    expect(second!.observed.x).toBeCloseTo(0.3, 12)
    expect(second!.observed.y).toBeCloseTo(0.7, 12)
  })

  it('takes from the fit what was not measured, and leaves out what was not resolved', () => {
    const onlyTheta = residual('theta', { thetaDeg: 0, rhoArcsec: 2 }, { observedMinusComputed: { thetaDeg: 90, rhoArcsec: null } })
    const unresolved = residual('limit', { thetaDeg: 0, rhoArcsec: 2 }, { status: 'not-fitted', observedMinusComputed: { thetaDeg: null, rhoArcsec: null } })
    const places = skyMeasures(pairResult({}, { residuals: [onlyTheta, unresolved] }))
    expect(places.map(place => place.id)).toEqual(['theta'])
    expect(places[0]!.observed.x).toBeCloseTo(2, 12)
  })

  it('draws the nodes at position angle Ω and opposite, on either side of the primary', () => {
    const { elements } = pairResult({ node: element(30, 1, 'deg'), argumentOfPeriastron: element(0, 1, 'deg'), semiMajorAxis: element(2, null, 'arcsec'), eccentricity: element(0.5, null, '') })
    const [near, far] = skyNodes(elements)!
    expect(Math.hypot(near.x, near.y)).toBeCloseTo(1, 12)
    expect(Math.hypot(far.x, far.y)).toBeCloseTo(3, 12)
    expect(Math.atan2(near.x, near.y) * 180 / Math.PI).toBeCloseTo(30, 10)
    expect(Math.atan2(far.x, far.y) * 180 / Math.PI).toBeCloseTo(-150, 10)
    expect(skyNodes({})).toBeNull()
  })

  it('says that an orbit is seen edge-on below |cos i| = 0.05', () => {
    expect(isSeenEdgeOn(pairResult({ inclination: element(87.2, 1, 'deg') }).elements)).toBe(true)
    expect(isSeenEdgeOn(pairResult({ inclination: element(87.0, 1, 'deg') }).elements)).toBe(false)
    expect(isSeenEdgeOn(pairResult({ inclination: element(92.8, 1, 'deg') }).elements)).toBe(true)
  })

  it('leaves out predictions of another kind', () => {
    expect(skyPredictions([{ at: 30, values: { r: 1 }, sigmas: { r: null }, correlation: null }])).toEqual([])
  })
})
