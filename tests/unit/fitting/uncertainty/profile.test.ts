import { describe, expect, it } from 'vitest'
import { fitOrbit, type FitResult, type FitSettings } from '../../../../fitting'
import type { LeastSquaresProblem } from '../../../../fitting/solve/least-squares-problem'
import { solveLeastSquares } from '../../../../fitting/solve/levenberg-marquardt'
import { covarianceOf } from '../../../../fitting/solve/covariance'
import { profileInterval } from '../../../../fitting/uncertainty/profile'
import { simulatedSystem } from '../../../builders/double-star-systems'

const SHORT_ARC = simulatedSystem({ seed: 77, count: 40, coverage: [0.55, 0.55], sigma: [0.02, 0.02], eccentricity: [0.3, 0.5], inclinationRad: 1 })
const WHOLE_TURNS = simulatedSystem({ seed: 78, count: 40, coverage: [2, 2], sigma: [0.01, 0.01], eccentricity: [0.3, 0.5], inclinationRad: 1 })

function fitted(system: typeof SHORT_ARC, settings: FitSettings = {}): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures: system.measures, settings: { shortestPeriodYr: 10, ...settings } })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

/** y = exp(a) + b t, measured at five times: nonlinear in a, so that the profile of a is skew. */
function skewProblem(): LeastSquaresProblem {
  return {
    parameters: 2,
    rows: 5,
    evaluate(values, residuals, jacobian) {
      for (let i = 0; i < 5; i++) {
        residuals[i] = (Math.exp(values[0]!) + values[1]! * (i - 2) - 2 - 0.3 * (i - 2)) / 0.8
        jacobian?.set([Math.exp(values[0]!) / 0.8, (i - 2) / 0.8], 2 * i)
      }
      return true
    },
  }
}

describe('profile intervals', () => {
  it('meet the closed form on a problem that is linear in exp a', () => {
    const problem = skewProblem()
    const solution = solveLeastSquares(problem, [0.5, 0])
    const { matrix } = covarianceOf({ rows: 5, columns: 2, jacobian: solution.jacobian, residuals: solution.residuals })
    const interval = profileInterval({ problem, values: solution.values, chiSquare: solution.chiSquare, covariance: matrix!, roots: [1, 1.959963984540054] }, { at: (values) => ({ value: values[0]!, gradient: [1, 0] }) })!
    const sigma = 0.8 / Math.sqrt(5)
    expect(interval.low68!).toBeCloseTo(Math.log(2 - sigma), 2)
    expect(interval.high68!).toBeCloseTo(Math.log(2 + sigma), 2)
    expect(interval.low95!).toBeCloseTo(Math.log(2 - 1.96 * sigma), 2)
    expect(interval.high95!).toBeCloseTo(Math.log(2 + 1.96 * sigma), 2)
  })

  it('say so where a quantity is not bounded on one side', () => {
    const problem: LeastSquaresProblem = {
      parameters: 1,
      rows: 1,
      evaluate(values, residuals, jacobian) {
        residuals[0] = Math.exp(-values[0]!) - 0.8
        if (jacobian) jacobian[0] = -Math.exp(-values[0]!)
        return true
      },
    }
    const solution = solveLeastSquares(problem, [0])
    const interval = profileInterval({ problem, values: solution.values, chiSquare: 0, covariance: [[1 / 0.64]], roots: [1, 1.96] }, { at: (values) => ({ value: values[0]!, gradient: [1] }) })!
    expect(interval.low68!).toBeCloseTo(-Math.log(1.8), 2)
    expect(interval.high68).toBeNull()
    expect(interval.high95).toBeNull()
  })

  it('end where χ² of a fit with the element held there has risen by 1 and by 3.84', () => {
    const { profile, statistics } = fitted(SHORT_ARC, { errors: 'profile' })
    for (const name of ['period', 'eccentricity', 'semiMajorAxis'] as const) {
      for (const [end, rise] of [['low68', 1], ['high68', 1], ['low95', 3.841], ['high95', 3.841]] as const) {
        const held = fitted(SHORT_ARC, { hold: { [name]: profile![name]![end]! } })
        expect(held.statistics.chiSquare - statistics.chiSquare, `${name} ${end}`).toBeGreaterThan(0.95 * rise)
        expect(held.statistics.chiSquare - statistics.chiSquare, `${name} ${end}`).toBeLessThan(1.05 * rise)
      }
    }
  }, 60_000)

  it('agree with the linearised errors on a well-covered orbit, within a tenth', () => {
    const { profile, elements } = fitted(WHOLE_TURNS, { errors: 'profile' })
    for (const name of ['period', 'eccentricity', 'semiMajorAxis', 'inclination', 'node', 'periastronTime']) {
      const { value, sigma } = elements[name]!
      expect((profile![name]!.high68! - value) / sigma!).toBeCloseTo(1, 1)
      expect((value - profile![name]!.low68!) / sigma!).toBeCloseTo(1, 1)
    }
  })

  it('stand in a result where the period is poorly known, or where asked for, and never where only linear errors are', () => {
    const weak = fitted(simulatedSystem({ seed: 79, count: 30, coverage: [0.4, 0.4], sigma: [0.04, 0.04], eccentricity: [0.3, 0.5], inclinationRad: 1 }))
    expect(weak.elements.period!.sigma! / weak.elements.period!.value).toBeGreaterThan(0.1)
    expect(weak.profile!.period!.high95 === null || weak.profile!.period!.high95 > weak.elements.period!.value).toBe(true)
    expect(weak.warnings.join(' ')).toContain('go by the profile intervals')
    expect(fitted(WHOLE_TURNS).profile).toBeUndefined()
    expect(fitted(SHORT_ARC, { errors: 'linear' }).profile).toBeUndefined()
  })
})
