import { describe, expect, it } from 'vitest'
import { fitOrbit, randomStream, type FitResult, type FitSettings, type PlaneMeasure } from '../../../../fitting'

const DEG = Math.PI / 180

function drawn(seed: number, e: number, withSigma = true): PlaneMeasure[] {
  const random = randomStream(seed)
  const reach = e < 0.9 ? Math.PI : 0.6 * Math.PI
  return Array.from({ length: 25 }, (_, i): PlaneMeasure => {
    const nu = reach * (2 * random.uniform() - 1)
    const exact = 1.5 / (1 + e * Math.cos(nu))
    return { id: `p${i}`, observer: 'Tasque', phiRad: nu + 40 * DEG, r: exact * (1 + 0.01 * random.normal()), ...(withSigma ? { sigmaR: 0.01 * exact } : {}) }
  })
}

function fitted(measures: PlaneMeasure[], settings: FitSettings = {}): FitResult {
  const outcome = fitOrbit({ kind: 'plane', measures, settings })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

function refusalOf(measures: PlaneMeasure[], settings: FitSettings): string {
  const outcome = fitOrbit({ kind: 'plane', measures, settings })
  return outcome.ok ? 'fitted' : outcome.refusal.sentence
}

describe('held elements of a plane conic', () => {
  it.each(['semiLatusRectum', 'eccentricity', 'periapsisDirection'])('%s at its fitted value gives the free conic again, without an error of its own', (name) => {
    for (const seed of [1, 2, 3]) {
      const measures = drawn(seed, 0.4)
      const free = fitted(measures)
      const held = fitted(measures, { hold: { [name]: free.elements[name]!.value } })
      expect(held.statistics.chiSquare).toBeCloseTo(free.statistics.chiSquare, 6)
      expect(held.statistics.parameters).toBe(2)
      expect(held.elements[name]).toMatchObject({ sigma: 0, status: 'held' })
      expect(held.elements[name]!.value).toBeCloseTo(free.elements[name]!.value, 9)
      for (const [other, element] of Object.entries(held.elements)) if (other !== name) expect(element.sigmaFormal!).toBeLessThan(free.elements[other]!.sigmaFormal! * 1.0001)
    }
  })

  it('give a circle with one parameter, the weighted mean distance', () => {
    const measures = drawn(4, 0)
    const circle = fitted(measures, { conicClass: 'circle' })
    expect(circle.conic!.class).toBe('circle')
    expect(circle.statistics.degreesOfFreedom).toBe(24)
    const weights = measures.map((measure) => measure.sigmaR! ** -2)
    const mean = measures.reduce((sum, measure, i) => sum + measure.r! * weights[i]!, 0) / weights.reduce((a, b) => a + b)
    expect(circle.elements.semiLatusRectum!.value).toBeCloseTo(mean, 9)
    expect(circle.elements.semiLatusRectum!.sigmaFormal! ** -2 / weights.reduce((a, b) => a + b)).toBeCloseTo(1, 9)
  })

  it('give a parabola whose χ² is what the class of the free conic rests on', () => {
    for (const seed of [5, 6, 7]) {
      const measures = drawn(seed, 1)
      const [free, parabola] = [fitted(measures), fitted(measures, { conicClass: 'parabola' })]
      expect(parabola.conic).toMatchObject({ class: 'parabola', probabilityBound: null, statement: 'Parabola: its eccentricity is held at 1' })
      expect(parabola.elements.eccentricity).toMatchObject({ value: 1, sigma: 0, status: 'held' })
      expect(parabola.statistics.chiSquare - free.statistics.chiSquare).toBeGreaterThan(-1e-9)
      expect(parabola.statistics.chiSquare - free.statistics.chiSquare < 4).toBe(!free.conic!.parabolaExcluded)
    }
  })

  it('go with errors estimated from the residuals', () => {
    const result = fitted(drawn(8, 1, false), { conicClass: 'parabola' })
    expect(result.statistics.reducedChiSquare).toBeCloseTo(1, 6)
  })

  it('leave an ellipse as it is, and refuse one where the measures are unbound', () => {
    const measures = drawn(9, 0.4)
    expect(JSON.stringify(fitted(measures, { conicClass: 'ellipse' }))).toBe(JSON.stringify(fitted(measures)))
    expect(refusalOf(drawn(10, 1.3), { conicClass: 'ellipse' })).toContain('An ellipse was asked for')
  })

  it('are refused in words', () => {
    const measures = drawn(11, 0.4)
    expect(refusalOf(measures, { hold: { inclination: 3 } })).toContain('cannot be held')
    expect(refusalOf(measures, { conicClass: 'circle', hold: { periapsisDirection: 3 } })).toContain('no periapsis')
    expect(refusalOf(measures, { hold: { eccentricity: 3 } })).toContain('reaches every measured direction')
    expect(refusalOf(measures.map((measure, i) => ({ ...measure, epochYr: 2000 + i })), { conicClass: 'circle' })).toContain('without times')
  })
})
