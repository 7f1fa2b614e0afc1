import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { eccentricFromTrueRad, meanFromTrueRad, placeAtTime, radiusAtTrue, trueFromEccentricRad, trueFromMeanRad } from '../../../../fitting/conic'

const runs = { seed: 5, numRuns: 3000 }
const bound = fc.oneof(fc.double({ min: 0, max: 0.999, noNaN: true }), fc.double({ min: -9, max: -3, noNaN: true }).map(x => 1 - 10 ** x))
const open = fc.double({ min: -9, max: 1.5, noNaN: true }).map(x => 1 + 10 ** x)

describe('anomalies', () => {
  it('true to eccentric and back returns the same angle, in the same turn', () => {
    fc.assert(fc.property(bound, fc.double({ min: -20, max: 20, noNaN: true }), (e, nu) => {
      expect(Math.abs(trueFromEccentricRad(eccentricFromTrueRad(nu, e), e) - nu)).toBeLessThanOrEqual(2e-14 * Math.sqrt((1 + e) / (1 - e)))
    }), runs)
  })

  it('true to mean and back returns the same angle on an ellipse', () => {
    fc.assert(fc.property(fc.double({ min: 0, max: 0.99, noNaN: true }), fc.double({ min: -3.1, max: 3.1, noNaN: true }), (e, nu) => {
      expect(Math.abs(trueFromMeanRad(meanFromTrueRad(nu, e), e) - nu)).toBeLessThanOrEqual(1e-13 / (1 - e))
    }), runs)
  })

  it('true to mean and back returns the same angle on parabola and hyperbola', () => {
    fc.assert(fc.property(fc.oneof(fc.constant(1), open), fc.double({ min: -0.99, max: 0.99, noNaN: true }), (e, share) => {
      const nu = share * Math.acos(-1 / e)
      expect(Math.abs(trueFromMeanRad(meanFromTrueRad(nu, e), e) - nu)).toBeLessThanOrEqual(1e-12)
    }), runs)
  })

  it('a direction beyond the asymptote has no mean anomaly', () => {
    expect(meanFromTrueRad(2.5, 2)).toBeNaN()
    expect(meanFromTrueRad(Math.PI, 1)).toBeNaN()
  })

  it('passes smoothly from ellipse through parabola to hyperbola', () => {
    const at = (eccentricity: number, t: number) => placeAtTime({ periapsisDistance: 0.7, eccentricity, gravitationalParameter: 2.9591220828559115e-4 }, t)
    for (const t of [-200, -20, -0.5, 1e-6, 3, 90, 400]) {
      const parabola = at(1, t)
      for (const step of [1e-15, 1e-12, 1e-9]) {
        for (const e of [1 - step, 1 + step]) {
          expect(Math.abs(at(e, t).trueAnomalyRad - parabola.trueAnomalyRad)).toBeLessThanOrEqual(2 * step + 2e-14)
          expect(Math.abs(at(e, t).radius / parabola.radius - 1)).toBeLessThanOrEqual(5 * step + 1e-13)
        }
      }
    }
  })

  it('sweeps equal areas in equal times on every conic', () => {
    fc.assert(fc.property(fc.double({ min: 0, max: 3, noNaN: true }), fc.double({ min: 0.01, max: 2, noNaN: true }), (e, t) => {
      const motion = { periapsisDistance: 1, eccentricity: e, gravitationalParameter: 1 }
      const step = 1e-4
      const before = placeAtTime(motion, t - step)
      const after = placeAtTime(motion, t + step)
      const rate = (after.trueAnomalyRad - before.trueAnomalyRad) / (2 * step)
      const { radius } = placeAtTime(motion, t)
      expect(Math.abs(radius ** 2 * rate / Math.sqrt(1 + e) - 1)).toBeLessThanOrEqual(1e-6)
    }), { seed: 5, numRuns: 500 })
  })

  it('the radius is q at periapsis and q(1 + e)/(1 − e) opposite', () => {
    expect(radiusAtTrue(0.4, 0.9, 0)).toBeCloseTo(0.4, 15)
    expect(radiusAtTrue(0.4, 0.9, Math.PI)).toBeCloseTo(7.6, 12)
  })
})
