import { describe, expect, it } from 'vitest'
import { fitOrbit, predict, type FitResult, type FitStart, type PlaneMeasure } from '../../../../fitting'
import { parabolaProblem } from '../../../../fitting/models/plane'
import { preparePlanePoints } from '../../../../fitting/models/plane-measure'
import { planeMotionProblem, PLANE_MOTION_NAMES } from '../../../../fitting/models/plane-motion'
import { planeTimeQuantities } from '../../../../fitting/uncertainty/plane-motion-elements'
import { centralDifferences } from '../../../builders/central-differences'
import { planeStateValues, simulatedPlaneMotion } from '../../../builders/simulated-plane'

function fitted(measures: PlaneMeasure[], start?: FitStart): FitResult {
  const outcome = fitOrbit({ kind: 'plane', measures, settings: { radiusUnit: 'au' }, start })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

const value = (result: FitResult, name: string) => result.elements[name]!.value

describe('a conic in its plane with times', () => {
  it.each([[0, 0.02], [0.3, 0.7], [0.9, 0.95]])('comes back from exact places of a bound orbit, e from %d to %d, in either sense', (from, to) => {
    for (let seed = 1; seed <= 6; seed++) {
      const { truth, measures } = simulatedPlaneMotion({ seed, count: 30, eccentricity: [from, to], sigma: [0, 0] })
      const result = fitted(measures)
      expect(value(result, 'period') / truth.periodYr).toBeCloseTo(1, 7)
      expect(value(result, 'eccentricity')).toBeCloseTo(truth.e, 7)
      const turns = (value(result, 'periapsisTime') - truth.periapsisYr) / truth.periodYr
      expect(Math.abs(turns - Math.round(turns))).toBeLessThan(1e-5)
      expect(Math.sign(result.constants!.angularMomentum.value)).toBe(truth.sense)
      expect(result.warnings.some((warning) => warning.includes('retrograde'))).toBe(truth.sense < 0)
    }
  })

  it('comes back from exact places beyond e = 1, with no period and the gravitational parameter of the motion', () => {
    for (let seed = 1; seed <= 6; seed++) {
      const { truth, measures } = simulatedPlaneMotion({ seed, count: 30, eccentricity: [1.05, 3], sigma: [0, 0] })
      const result = fitted(measures)
      expect(result.elements.period).toBeUndefined()
      expect(value(result, 'eccentricity')).toBeCloseTo(truth.e, 7)
      expect(value(result, 'periapsisTime')).toBeCloseTo(truth.periapsisYr, 5)
      expect(result.constants!.gravitationalParameter.value / truth.mu).toBeCloseTo(1, 6)
      expect(result.constants!.largestDrift).toBeLessThan(1e-10)
      expect(result.conic!.class).toBe('hyperbola')
    }
  })

  it('has an analytic Jacobian that agrees with central differences, also with e = 1 held and for diameters', () => {
    for (const [seed, e] of [[1, 0.4], [2, 1.6]] as const) {
      const { truth, measures } = simulatedPlaneMotion({ seed, count: 6, eccentricity: [e, e] })
      const mixed = measures.map((measure, i): PlaneMeasure => (i === 2 ? { ...measure, r: undefined, sigmaR: undefined, diameterArcmin: 30 / measure.r!, sigmaDiameterArcmin: 0.3 } : i === 4 ? { ...measure, epochYr: undefined } : measure))
      const points = preparePlanePoints(mixed, { diameterScaleArcmin: 30 })
      const full = planeMotionProblem(points.used, points.diameterScale, 2000)
      const values = planeStateValues(truth, 2000)
      for (const [problem, at] of [[full, values], [parabolaProblem(full), [values[0]!, 0.3, values[3]!, 0.5]]] as const) {
        const residuals = new Float64Array(problem.rows)
        const jacobian = new Float64Array(problem.rows * problem.parameters)
        if (!problem.evaluate(Float64Array.from(at), residuals, jacobian)) continue
        const numeric = centralDifferences(problem, at)
        const largest = Math.max(...numeric.map(Math.abs))
        numeric.forEach((expected, i) => expect(Math.abs(jacobian[i]! - expected)).toBeLessThan(1e-6 * largest))
      }
    }
  })

  it('has gradients of period and time of periapsis that agree with central differences', () => {
    const { truth } = simulatedPlaneMotion({ seed: 4, count: 3, eccentricity: [0.4, 0.4] })
    const values = planeStateValues(truth, 2000)
    const quantities = planeTimeQuantities(values, 2000)
    for (const name of ['period', 'periapsisTime']) {
      for (let j = 0; j < PLANE_MOTION_NAMES.length; j++) {
        const step = 1e-5 * Math.max(0.1, Math.abs(values[j]!))
        const shifted = (sign: number) => planeTimeQuantities(values.map((v, i) => (i === j ? v + sign * step : v)), 2000)[name]!.value
        const numeric = (shifted(1) - shifted(-1)) / (2 * step)
        expect(Math.abs(quantities[name]!.gradient[j]! - numeric)).toBeLessThan(1e-6 * Math.max(1, Math.abs(numeric)))
      }
    }
  })

  it('finds the true motion without a guess: χ² no larger than that of a fit started there', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const { truth, measures } = simulatedPlaneMotion({ seed: 100 + seed, count: 30, eccentricity: [0, 1.5] })
      const start: FitStart = { state: { model: 'plane', names: [...PLANE_MOTION_NAMES], values: planeStateValues(truth, 2000), covariance: null, referenceEpochYr: 2000 } }
      expect(fitted(measures).statistics.chiSquare).toBeLessThan(1.01 * fitted(measures, start).statistics.chiSquare)
    }
  })

  it('keeps the law of areas in simulated motion, and warns where times run unevenly', () => {
    const { measures } = simulatedPlaneMotion({ seed: 8, count: 60, eccentricity: [0.3, 0.3], arc: [0.8, 0.8], sigma: [0.003, 0.003] })
    const { arealLaw } = fitted(measures).statistics
    expect(Math.abs(arealLaw!.changePerYr)).toBeLessThan(3 * arealLaw!.sigma)
    const first = Math.min(...measures.map((measure) => measure.epochYr!))
    const uneven = measures.map((measure) => ({ ...measure, epochYr: measure.epochYr! + 0.15 * (measure.epochYr! - first) ** 2 / (2000 - first) }))
    expect(fitted(uneven).warnings.join(' ')).toContain('areal velocity')
  })

  it('takes measures without a time for the shape alone, and fits the shape alone where times are of fewer than three epochs', () => {
    const { measures } = simulatedPlaneMotion({ seed: 9, count: 20, eccentricity: [0.5, 0.5] })
    const mixed = measures.map((measure, i) => (i % 4 === 0 ? { ...measure, epochYr: undefined } : measure))
    expect(fitted(mixed).statistics.rows).toBe(35)
    const bare = fitted(measures.map((measure, i) => (i < 2 ? measure : { ...measure, epochYr: undefined })))
    expect(bare.elements.period).toBeUndefined()
    expect(bare.warnings.join(' ')).toContain('fewer than three epochs')
  })

  it('predicts the distance in a direction with the error of all five parameters', () => {
    const { measures } = simulatedPlaneMotion({ seed: 10, count: 20, eccentricity: [0.3, 0.3] })
    const [prediction] = predict(fitted(measures), [40])
    expect(prediction!.sigmas.r).toBeGreaterThan(0)
  })
})
