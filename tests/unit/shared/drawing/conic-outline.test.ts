import { describe, expect, it } from 'vitest'
import { conicOutline } from '../../../../shared/drawing/conic-outline'
import type { Point } from '../../../../shared/drawing/conic-outline'
import { element, pairResult, planeResult, residual } from '../../../builders/fit-result'

const radians = (degrees: number) => degrees * Math.PI / 180
const length = ({ x, y }: Point) => Math.hypot(x, y)

describe('conicOutline', () => {
  it('draws a face-on orbit with node and periastron at zero with its periastron due north at a(1 − e)', () => {
    const outline = conicOutline(pairResult({
      inclination: element(0, null, 'deg'), node: element(0, null, 'deg'), argumentOfPeriastron: element(0, null, 'deg'),
      semiMajorAxis: element(2, 0.01, 'arcsec'), eccentricity: element(0.4, 0.01, ''),
    }))
    expect(outline?.shape).toBe('closed')
    expect(outline?.periapsis?.x).toBeCloseTo(0, 12)
    expect(outline?.periapsis?.y).toBeCloseTo(1.2, 12)
    const farthest = Math.max(...outline!.points.map(length))
    expect(farthest).toBeCloseTo(2.8, 6)
  })

  it('turns the drawing through east when the node grows', () => {
    const at = (nodeDeg: number) => conicOutline(pairResult({ node: element(nodeDeg, 1, 'deg') }))!.points
    const before = at(20)
    const after = at(65)
    before.forEach((point, k) => {
      const turned = {
        x: point.x * Math.cos(radians(45)) + point.y * Math.sin(radians(45)),
        y: -point.x * Math.sin(radians(45)) + point.y * Math.cos(radians(45)),
      }
      expect(after[k]!.x).toBeCloseTo(turned.x, 12)
      expect(after[k]!.y).toBeCloseTo(turned.y, 12)
    })
  })

  it('keeps every point of a plane conic on r = p / (1 + e cos(φ − φ₀))', () => {
    for (const e of [0, 0.3, 0.97, 1, 1.8]) {
      const outline = conicOutline(planeResult({ semiLatusRectum: element(1.5, 0.1, 'au'), eccentricity: element(e, 0.01, ''), periapsisDirection: element(40, 1, 'deg') }))!
      for (const point of outline.points) {
        const phi = Math.atan2(point.y, point.x)
        expect(length(point) * (1 + e * Math.cos(phi - radians(40)))).toBeCloseTo(1.5, 9)
      }
    }
  })

  it('leaves a hyperbola open and still reaches past its farthest measure', () => {
    const outline = conicOutline(planeResult(
      { semiLatusRectum: element(1, 0.1, 'au'), eccentricity: element(1.5, 0.1, '') },
      { residuals: [residual('m1', { r: 9 })] },
    ))!
    expect(outline.shape).toBe('open')
    expect(Math.max(...outline.points.map(length))).toBeGreaterThan(9)
  })

  it('draws a straight motion through the computed places and a little past them', () => {
    const result = pairResult({}, {
      model: 'line',
      residuals: [residual('m1', { eastArcsec: 0, northArcsec: 1 }), residual('m2', { eastArcsec: 2, northArcsec: 1 }), residual('m3', { thetaDeg: 45, rhoArcsec: Math.SQRT2 })],
    })
    const outline = conicOutline(result)!
    expect(outline.shape).toBe('straight')
    const xs = outline.points.map(point => point.x).sort((a, b) => a - b)
    expect(xs[0]).toBeCloseTo(-0.3, 12)
    expect(xs[1]).toBeCloseTo(2.3, 12)
    for (const point of outline.points) expect(point.y).toBeCloseTo(1, 12)
  })

  it('draws nothing where an element that shapes the curve is missing', () => {
    expect(conicOutline(pairResult({ node: undefined }))).toBeNull()
    expect(conicOutline(pairResult({}, { model: 'still' }))).toBeNull()
  })
})
