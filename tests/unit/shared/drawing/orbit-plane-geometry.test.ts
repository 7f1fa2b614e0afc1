import { describe, expect, it } from 'vitest'
import type { FitResult } from '../../../../fitting/types'
import { carriedBackMeasures, conicRadius, planeMeasures, radiusByAnomaly, reachOf, signedDegrees } from '../../../../shared/drawing/orbit-plane-geometry'
import { planeSheet, radiusSheet } from '../../../../shared/drawing/plane-sheet'
import { element, planeResult, residual } from '../../../builders/fit-result'

const conicOf = (semiLatusRectum: number, eccentricity: number) => ({ semiLatusRectum, eccentricity, periapsisDirectionDeg: 0 })
const withConic = (p: number, e: number, residuals: FitResult['residuals'] = []) => planeResult(
  { semiLatusRectum: element(p, 0.001, 'au'), eccentricity: element(e, 0.001, ''), periapsisDirection: element(90, 1, 'deg') },
  { residuals, conic: { class: 'ellipse', semiLatusRectum: element(p, 0.001, 'au'), eccentricity: element(e, 0.001, ''), probabilityBound: null, parabolaExcluded: null, circleExcluded: null, statement: '' } },
)

describe('the conic in its own plane', () => {
  it('is nearest at periapsis, and p away at right angles to it', () => {
    expect(conicRadius(conicOf(1.2, 0.5), 0)).toBeCloseTo(0.8, 12)
    expect(conicRadius(conicOf(1.2, 0.5), 90)).toBeCloseTo(1.2, 12)
    expect(conicRadius(conicOf(1.2, 0.5), 180)).toBeCloseTo(2.4, 12)
  })

  it('does not reach behind the focus where it is open', () => {
    expect(conicRadius(conicOf(1, 1), 180)).toBe(Infinity)
    expect(conicRadius(conicOf(1, 1.5), 150)).toBe(Infinity)
  })

  it('is drawn once around where it is closed, and to a stated radius where it is open', () => {
    const closed = radiusByAnomaly(conicOf(1, 0.3), 5)
    expect([closed[0]!.trueAnomalyDeg, closed.at(-1)!.trueAnomalyDeg]).toEqual([-180, 180])
    for (const e of [1, 1.4, 3]) {
      const open = radiusByAnomaly(conicOf(1, e), 5)
      expect(Math.max(...open.map(point => point.radius))).toBeCloseTo(5, 6)
      expect(open.every(point => Number.isFinite(point.radius))).toBe(true)
    }
  })

  it('leaves room for the far apsis, or for the outermost measure of an open conic', () => {
    expect(reachOf(conicOf(1, 0.5), [0.9])).toBe(2)
    expect(reachOf(conicOf(1, 1.5), [4])).toBeGreaterThan(4)
  })

  it('writes angles between −180° and 180°', () => {
    expect([190, -190, 540, 180, -180, 0].map(signedDegrees)).toEqual([-170, 170, 180, 180, 180, 0])
  })

  it('leaves out measures that could not be carried back', () => {
    const result = withConic(1, 0.5, [residual('a', {}, { inOrbitPlane: { trueAnomalyDeg: 350, radius: 0.7 } }), residual('b', {})])
    expect(carriedBackMeasures(result)).toEqual([{ id: 'a', status: 'used', trueAnomalyDeg: -10, radius: 0.7 }])
  })

  it('turns measures to their direction φ: periapsis toward 90° stands upward', () => {
    const [measure] = planeMeasures(withConic(1, 0.5, [residual('a', {}, { inOrbitPlane: { trueAnomalyDeg: 0, radius: 0.7 } })]))
    expect(measure!.observed.x).toBeCloseTo(0, 12)
    expect(measure!.observed.y).toBeCloseTo(0.7, 12)
    expect(measure!.computed.y).toBeCloseTo(2 / 3, 12)
  })
})

describe('the drawings of a plane target', () => {
  it('points φ = 0 to the right and lets φ grow counter-clockwise', () => {
    const { focus, zeroDirection, periapsis } = planeSheet(withConic(1, 0.5))
    expect(zeroDirection[1].x).toBeGreaterThan(focus.x)
    expect(zeroDirection[1].y).toBeCloseTo(focus.y, 6)
    expect(periapsis!.y).toBeLessThan(focus.y)
  })

  it('marks p as the chord at φ = ±90°, on the curve', () => {
    const sheet = radiusSheet(withConic(1, 0.5))!
    expect(sheet.chord!.left).toBeCloseTo(sheet.anomalyTicks[1]!.px, 6)
    expect(sheet.chord!.right).toBeCloseTo(sheet.anomalyTicks[3]!.px, 6)
    expect(sheet.curve).toContain(`L${Math.round(sheet.chord!.right * 10) / 10} ${sheet.chord!.y}`)
  })

  it('has no r against φ where the fit has no conic', () => {
    expect(radiusSheet(planeResult())).toBeNull()
  })
})
