import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fitOrbit, type FitResult, type PlaneMeasure } from '../../../../fitting'
import { parabolaProblem, planeProblem } from '../../../../fitting/models/plane'
import { preparePlanePoints } from '../../../../fitting/models/plane-measure'
import { centralDifferences } from '../../../builders/central-differences'

function fitted(measures: PlaneMeasure[], settings = {}): FitResult {
  const outcome = fitOrbit({ kind: 'plane', measures, settings })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

/** Directions that the conic reaches, well inside the asymptotes. */
function exactConic(p: number, e: number, phi0: number, count = 15): PlaneMeasure[] {
  const reach = e < 1 ? Math.PI * 0.95 : 0.85 * Math.acos(-1 / e)
  return Array.from({ length: count }, (_, i) => {
    const phiRad = phi0 + reach * ((2 * i) / (count - 1) - 1)
    return { id: `p${String(i).padStart(2, '0')}`, observer: 'Quellmann', phiRad, r: p / (1 + e * Math.cos(phiRad - phi0)) }
  })
}

const element = (result: FitResult, name: string) => result.elements[name]!.value

describe('a conic in its plane', () => {
  it('comes back from noise-free distances to 1e-10, for any e from 0 to 3', () => {
    fc.assert(fc.property(fc.double({ min: 0, max: 3, noNaN: true }), fc.double({ min: 0, max: 6.28, noNaN: true }), fc.double({ min: 1e-3, max: 1e3, noNaN: true }), (e, phi0, p) => {
      fc.pre(Math.abs(e - 1) > 1e-3)
      const result = fitted(exactConic(p, e, phi0))
      expect(Math.abs(element(result, 'semiLatusRectum') / p - 1)).toBeLessThan(1e-10)
      expect(Math.abs(element(result, 'eccentricity') - e)).toBeLessThan(1e-10)
    }), { seed: 11, numRuns: 200 })
  })

  it('scales p, and nothing else, when all distances are scaled', () => {
    const one = fitted(exactConic(1.5, 0.4, 2))
    const ten = fitted(exactConic(15, 0.4, 2))
    expect(element(ten, 'semiLatusRectum') / element(one, 'semiLatusRectum')).toBeCloseTo(10, 10)
    expect(element(ten, 'eccentricity')).toBeCloseTo(element(one, 'eccentricity'), 10)
    expect(element(ten, 'periapsisDirection')).toBeCloseTo(element(one, 'periapsisDirection'), 8)
  })

  it('turns with the directions', () => {
    const measures = exactConic(1, 0.3, 1).map((measure, i) => ({ ...measure, r: measure.r! * (1 + 0.01 * Math.sin(7 * i)) }))
    const turned = measures.map((measure) => ({ ...measure, phiRad: measure.phiRad + 0.5 }))
    const difference = element(fitted(turned), 'periapsisDirection') - element(fitted(measures), 'periapsisDirection')
    expect(difference).toBeCloseTo((0.5 * 180) / Math.PI, 7)
  })

  it('has an analytic Jacobian that agrees with central differences, for distances and diameters', () => {
    const measures: PlaneMeasure[] = [
      ...exactConic(1, 0.3, 1, 4).map((measure) => ({ ...measure, sigmaR: 0.02 })),
      { id: 'd', observer: 'Tasque', phiRad: 2, diameterArcmin: 31, sigmaDiameterArcmin: 0.1 },
    ]
    const points = preparePlanePoints(measures, { diameterScaleArcmin: 30 })
    for (const [problem, values] of [
      [planeProblem(points.used, points.diameterScale), [1.1, 0.2, 0.15]], [parabolaProblem(planeProblem(points.used, points.diameterScale)), [1.1, 1.2]],
    ] as const) {
      const residuals = new Float64Array(problem.rows)
      const jacobian = new Float64Array(problem.rows * problem.parameters)
      problem.evaluate(Float64Array.from(values), residuals, jacobian)
      const numeric = centralDifferences(problem, values)
      jacobian.forEach((value, i) => expect(Math.abs(value - numeric[i]!)).toBeLessThan(1e-5 * Math.max(1, Math.abs(value))))
    }
  })

  it('tells bound from unbound by the profile over e', () => {
    const noisy = (e: number) => exactConic(1, e, 1, 30).map((measure, i) => ({ ...measure, r: measure.r! * (1 + 0.004 * Math.sin(5 * i * i)), sigmaR: 0.004 * measure.r! }))
    const bound = fitted(noisy(0.6)).conic!
    const unbound = fitted(noisy(1.4)).conic!
    expect(bound.probabilityBound).toBeGreaterThan(0.999)
    expect(bound.parabolaExcluded).toBe(true)
    expect(unbound.probabilityBound).toBeLessThan(0.001)
    expect(unbound.class).toBe('hyperbola')
  })

  it('does not exclude a circle where e is within its error', () => {
    const round = exactConic(1, 0, 0, 20).map((measure, i) => ({ ...measure, r: 1 + 0.01 * Math.sin(3 * i * i), sigmaR: 0.01 }))
    const result = fitted(round)
    expect(result.conic!.circleExcluded).toBe(false)
    expect(result.warnings.join(' ')).toContain('A circle is not excluded')
  })

  it('reports a set-aside measure with its residual, and leaves it out of every sum', () => {
    const measures = exactConic(1, 0.3, 1)
    const spoiled = [...measures, { id: 'zz', observer: 'Orrowin', phiRad: 1, r: 50, setAside: true }]
    const result = fitted(spoiled)
    expect(element(result, 'eccentricity')).toBeCloseTo(0.3, 10)
    const aside = result.residuals.find((residual) => residual.id === 'zz')!
    expect(aside.status).toBe('set-aside')
    expect(aside.observedMinusComputed.r).toBeCloseTo(50 - 1 / 1.3, 8)
    expect(aside.leverage).toBeNull()
  })

  it('is exact, and says so, with three measures', () => {
    const result = fitted(exactConic(1, 0.3, 1, 3))
    expect(result.stop.reason).toBe('exact')
    expect(result.statistics.degreesOfFreedom).toBe(0)
    expect(result.elements.semiLatusRectum!.sigma).toBeNull()
  })
})
