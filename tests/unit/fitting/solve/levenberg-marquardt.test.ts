import { describe, expect, it } from 'vitest'
import { covarianceOf } from '../../../../fitting/solve/covariance'
import type { LeastSquaresProblem } from '../../../../fitting/solve/least-squares-problem'
import { solveLeastSquares, type Solution } from '../../../../fitting/solve/levenberg-marquardt'
import { centralDifferences } from '../../../builders/central-differences'

/** y = a + b x with one σ a row, whitened. */
function straightLine(xs: number[], ys: number[], sigmas: number[]): LeastSquaresProblem {
  return {
    parameters: 2,
    rows: xs.length,
    evaluate([a, b], residuals, jacobian) {
      xs.forEach((x, i) => {
        residuals[i] = (a! + b! * x - ys[i]!) / sigmas[i]!
        if (jacobian) jacobian.set([1 / sigmas[i]!, x / sigmas[i]!], 2 * i)
      })
      return true
    },
  }
}

/** y = a exp(−b x), defined for b > 0 only. */
function decay(xs: number[], ys: number[], sigma: number): LeastSquaresProblem {
  return {
    parameters: 2,
    rows: xs.length,
    evaluate([a, b], residuals, jacobian) {
      if (b! <= 0) return false
      xs.forEach((x, i) => {
        const fall = Math.exp(-b! * x)
        residuals[i] = (a! * fall - ys[i]!) / sigma
        if (jacobian) jacobian.set([fall / sigma, (-a! * x * fall) / sigma], 2 * i)
      })
      return true
    },
  }
}

function errorsOf(solution: Solution, rows: number): number[] {
  const { matrix } = covarianceOf({ rows, columns: solution.values.length, jacobian: solution.jacobian, residuals: solution.residuals })
  return matrix!.map((row, i) => Math.sqrt(row[i]!))
}

const XS = [0, 1, 2, 3, 5, 8]
const YS = [1.02, 2.9, 5.2, 6.8, 11.3, 16.7]
const SIGMAS = [0.1, 0.2, 0.1, 0.4, 0.3, 0.2]

describe('solveLeastSquares', () => {
  it('fits a weighted straight line to the closed-form solution', () => {
    const w = SIGMAS.map((s) => 1 / (s * s))
    const sum = (f: (i: number) => number) => XS.reduce((total, _, i) => total + w[i]! * f(i), 0)
    const [s0, sx, sxx, sy, sxy] = [sum(() => 1), sum((i) => XS[i]!), sum((i) => XS[i]! ** 2), sum((i) => YS[i]!), sum((i) => XS[i]! * YS[i]!)]
    const determinant = s0 * sxx - sx * sx
    const solution = solveLeastSquares(straightLine(XS, YS, SIGMAS), [0, 0])
    expect(solution.values[0]).toBeCloseTo((sxx * sy - sx * sxy) / determinant, 9)
    expect(solution.values[1]).toBeCloseTo((s0 * sxy - sx * sy) / determinant, 9)
    const errors = errorsOf(solution, XS.length)
    expect(errors[0]).toBeCloseTo(Math.sqrt(sxx / determinant), 9)
    expect(errors[1]).toBeCloseTo(Math.sqrt(s0 / determinant), 9)
  })

  it('takes n equal rows for one row with σ / √n', () => {
    const repeats = XS.map((_, i) => 1 + ((i * 7) % 5))
    const repeat = (values: number[]) => values.flatMap((value, i) => new Array<number>(repeats[i]!).fill(value))
    const many = solveLeastSquares(decay(repeat(XS), repeat(YS.map((y) => 18 / y)), 0.3), [15, 0.5])
    const few = solveLeastSquares(
      { ...decay(XS, YS, 1), evaluate: weighted(XS, YS.map((y) => 18 / y), repeats.map((n) => 0.3 / Math.sqrt(n))) }, [15, 0.5])
    const manyErrors = errorsOf(many, repeat(XS).length)
    const fewErrors = errorsOf(few, XS.length)
    for (const j of [0, 1]) {
      expect(Math.abs(many.values[j]! / few.values[j]! - 1)).toBeLessThan(1e-9)
      expect(Math.abs(manyErrors[j]! / fewErrors[j]! - 1)).toBeLessThan(1e-9)
    }
    expect(many.chiSquare).toBeCloseTo(few.chiSquare, 9)
  })

  it('returns from a trial outside the domain instead of failing', () => {
    const solution = solveLeastSquares(decay(XS, YS.map((y) => 18 / y), 0.01), [15, 5])
    expect(['chi-square-settled', 'step-settled', 'gradient-settled']).toContain(solution.reason)
    expect(solution.values[1]).toBeGreaterThan(0)
  })

  it('refuses a start outside the domain as a programmer’s error', () => {
    expect(() => solveLeastSquares(decay(XS, YS, 1), [1, -1])).toThrow(RangeError)
  })

  it('says that the iteration limit was met', () => {
    expect(solveLeastSquares(decay(XS, YS.map((y) => 18 / y), 1), [1, 0.01], { maxIterations: 2 }).reason).toBe('iteration-limit')
  })

  it('finds the exact solution of a noise-free problem', () => {
    const solution = solveLeastSquares(decay(XS, XS.map((x) => 3 * Math.exp(-0.25 * x)), 0.1), [1, 1])
    expect(solution.values[0]).toBeCloseTo(3, 12)
    expect(solution.values[1]).toBeCloseTo(0.25, 12)
  })
})

describe('covarianceOf', () => {
  it('gives no covariance where a parameter has no effect', () => {
    const jacobian = Float64Array.from([1, 0, 2, 0, 3, 0])
    const estimate = covarianceOf({ rows: 3, columns: 2, jacobian, residuals: new Float64Array(3) })
    expect(estimate.matrix).toBeNull()
    expect(estimate.conditionNumber).toBe(Infinity)
  })

  it('does not change its condition number when a parameter is measured in another unit', () => {
    const jacobian = Float64Array.from([1, 1, 1, 2, 1, 3, 1, 5])
    const rescaled = jacobian.map((value, i) => (i % 2 ? value * 1e6 : value))
    const first = covarianceOf({ rows: 4, columns: 2, jacobian, residuals: new Float64Array(4) })
    const second = covarianceOf({ rows: 4, columns: 2, jacobian: rescaled, residuals: new Float64Array(4) })
    expect(second.conditionNumber).toBeCloseTo(first.conditionNumber, 9)
    expect(second.matrix![1]![1]! * 1e12).toBeCloseTo(first.matrix![1]![1]!, 12)
  })
})

describe('the Jacobians of these tests', () => {
  it('agree with central differences', () => {
    const problem = decay(XS, YS, 0.5)
    const residuals = new Float64Array(XS.length)
    const jacobian = new Float64Array(XS.length * 2)
    problem.evaluate(Float64Array.from([3, 0.4]), residuals, jacobian)
    const numeric = centralDifferences(problem, [3, 0.4])
    jacobian.forEach((value, i) => expect(value).toBeCloseTo(numeric[i]!, 6))
  })
})

function weighted(xs: number[], ys: number[], sigmas: number[]): LeastSquaresProblem['evaluate'] {
  return ([a, b], residuals, jacobian) => {
    if (b! <= 0) return false
    xs.forEach((x, i) => {
      const fall = Math.exp(-b! * x)
      residuals[i] = (a! * fall - ys[i]!) / sigmas[i]!
      if (jacobian) jacobian.set([fall / sigmas[i]!, (-a! * x * fall) / sigmas[i]!], 2 * i)
    })
    return true
  }
}
