import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { eccentricAnomalyRad, hyperbolicAnomalyRad, solveBarker, solveKeplerInto } from '../../../../fitting/conic'
import { cell, readFixture } from '../../../reference/published'

const eccentricity = fc.oneof(fc.double({ min: 0, max: 0.9999, noNaN: true }), fc.double({ min: -16, max: -2, noNaN: true }).map(x => 1 - 10 ** x).filter(e => e < 1))
const meanAnomaly = fc.oneof(fc.double({ min: -Math.PI, max: Math.PI, noNaN: true }), fc.double({ min: -14, max: 0, noNaN: true }).map(x => 10 ** x))
const runs = { seed: 20261201, numRuns: 5000 }

describe('solveKeplerInto', () => {
  const out = new Float64Array(3)

  it('leaves a residual of at most 1e-15 for every e below 1', () => {
    fc.assert(fc.property(eccentricity, meanAnomaly, (e, m) => {
      solveKeplerInto(m, e, out)
      expect(Math.abs(out[0]! - e * out[1]! - m)).toBeLessThanOrEqual(1e-15)
    }), runs)
  })

  it('returns the sine and cosine of the anomaly it found', () => {
    fc.assert(fc.property(eccentricity, meanAnomaly, (e, m) => {
      solveKeplerInto(m, e, out)
      expect(Math.abs(out[1]! - Math.sin(out[0]!))).toBeLessThanOrEqual(5e-16)
      expect(Math.abs(out[2]! - Math.cos(out[0]!))).toBeLessThanOrEqual(5e-16)
    }), runs)
  })

  it('is odd in M', () => {
    fc.assert(fc.property(eccentricity, meanAnomaly, (e, m) => {
      expect(eccentricAnomalyRad(-m, e)).toBe(-eccentricAnomalyRad(m, e))
    }), runs)
  })

  it('grows with M', () => {
    fc.assert(fc.property(eccentricity, meanAnomaly, meanAnomaly, (e, m1, m2) => {
      fc.pre(m2 - m1 > 1e-12)
      expect(eccentricAnomalyRad(m2, e)).toBeGreaterThan(eccentricAnomalyRad(m1, e))
    }), runs)
  })

  it('stays in the turn of M', () => {
    fc.assert(fc.property(eccentricity, meanAnomaly, fc.integer({ min: -1000, max: 1000 }), (e, m, turns) => {
      fc.pre(Math.abs(m) < 3.14)
      const shifted = m + turns * 2 * Math.PI
      expect(Math.abs(eccentricAnomalyRad(shifted, e) - shifted)).toBeLessThanOrEqual(e + 1e-9)
    }), runs)
  })

  it('returns E = M for a circle, 0 at 0 and π at π', () => {
    expect(eccentricAnomalyRad(1.25, 0)).toBeCloseTo(1.25, 15)
    for (const e of [0, 0.3, 0.99, 1 - 1e-12]) {
      expect(eccentricAnomalyRad(0, e)).toBe(0)
      expect(eccentricAnomalyRad(Math.PI, e)).toBeCloseTo(Math.PI, 15)
    }
  })

  it('holds for a mean anomaly of any size', () => {
    for (const m of [1e6, -1e6, 1e12, 1e22, -1e300]) {
      solveKeplerInto(m, 0.6, out)
      const within = Math.atan2(Math.sin(m), Math.cos(m))
      expect(Math.abs(Math.sin(Math.atan2(out[1]!, out[2]!) - 0.6 * out[1]! - within))).toBeLessThanOrEqual(2e-15)
    }
  })

  it.each([[NaN, 0.5], [Infinity, 0.5], [1, NaN], [1, -0.1], [1, 1], [1, 1.5], [1, Infinity]])('answers NaN, not a wrong number, for M = %d and e = %d', (m, e) => {
    solveKeplerInto(m, e, out)
    expect([...out]).toEqual([NaN, NaN, NaN])
  })
})

/** Change of the root for a change of one part in 2⁵³ of each given number, in units of the root. */
function conditionOf(e: number, m: number, root: number): number {
  const slope = e < 1 ? (1 - e) + e * (1 - Math.cos(root)) : (e - 1) + e * (Math.cosh(root) - 1)
  return Math.max(1, m / (slope * root))
}

describe('Kepler\'s equation against roots of 60 digits', () => {
  const rows = readFixture('kepler_roots.csv')

  it('the list holds both kinds of conic', () => {
    expect(rows.filter(row => cell(row, 'eccentricity') < 1)).toHaveLength(168)
    expect(rows.filter(row => cell(row, 'eccentricity') > 1)).toHaveLength(100)
  })

  it('the ellipse keeps 1e-15 of its root up to e = 1 − 1e-16', () => {
    for (const row of rows.filter(row => cell(row, 'eccentricity') < 1)) {
      const [e, m, root] = [cell(row, 'eccentricity'), cell(row, 'mean_anomaly_rad'), cell(row, 'anomaly_rad')]
      expect(Math.abs(eccentricAnomalyRad(m, e) / root - 1), JSON.stringify(row)).toBeLessThanOrEqual(1e-15 * conditionOf(e, m, root))
    }
  })

  it('the hyperbola keeps 2e-15 of its root down to e = 1 + 2e-16', () => {
    for (const row of rows.filter(row => cell(row, 'eccentricity') > 1)) {
      const [e, m, root] = [cell(row, 'eccentricity'), cell(row, 'mean_anomaly_rad'), cell(row, 'anomaly_rad')]
      expect(Math.abs(hyperbolicAnomalyRad(m, e) / root - 1), JSON.stringify(row)).toBeLessThanOrEqual(2e-15)
    }
  })
})

describe('hyperbolicAnomalyRad', () => {
  it('satisfies e·sinh H − H = M for every e above 1 and every M', () => {
    const excess = fc.double({ min: -15, max: 3, noNaN: true }).map(x => 1 + 10 ** x)
    const m = fc.tuple(fc.boolean(), fc.double({ min: -12, max: 12, noNaN: true })).map(([isNegative, x]) => (isNegative ? -1 : 1) * 10 ** x)
    fc.assert(fc.property(excess, m, (e, m) => {
      const h = hyperbolicAnomalyRad(m, e)
      expect(Math.abs(e * Math.sinh(h) - h - m)).toBeLessThanOrEqual(4e-15 * Math.max(1, Math.abs(m) * Math.max(1, Math.abs(h))))
    }), runs)
  })

  it.each([[1, 1], [1, 0.5], [NaN, 2], [Infinity, 2], [1, NaN], [1, Infinity]])('answers NaN for M = %d and e = %d', (m, e) => {
    expect(hyperbolicAnomalyRad(m, e)).toBeNaN()
  })

  it('answers a finite anomaly for the largest M', () => {
    expect(hyperbolicAnomalyRad(1e300, 1.5)).toBeCloseTo(Math.log(2e300 / 1.5), 10)
  })
})

describe('solveBarker', () => {
  it('satisfies s + s³/3 = M for every M', () => {
    fc.assert(fc.property(fc.tuple(fc.boolean(), fc.double({ min: -300, max: 90, noNaN: true })), ([isNegative, exponent]) => {
      const m = (isNegative ? -1 : 1) * 10 ** exponent
      const s = solveBarker(m)
      expect(Math.abs((s + s ** 3 / 3) / m - 1)).toBeLessThanOrEqual(3e-15)
    }), runs)
  })

  it('answers NaN for a mean anomaly that is not finite', () => {
    expect(solveBarker(NaN)).toBeNaN()
    expect(solveBarker(Infinity)).toBeNaN()
    expect(solveBarker(0)).toBe(0)
  })
})
