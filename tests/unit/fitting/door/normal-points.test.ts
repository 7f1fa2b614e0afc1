import { describe, expect, it } from 'vitest'
import { fitOrbit, type FitResult, type FitSettings, type RelativeMeasure } from '../../../../fitting'
import { simulatedSystem } from '../../../builders/double-star-systems'

function fitted(measures: RelativeMeasure[], settings: FitSettings = {}): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures, settings: { shortestPeriodYr: 18, ...settings } })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

const drawn = (seed: number, withoutErrors = false) =>
  simulatedSystem({ seed, count: 150, form: seed % 2 === 0 ? 'polar' : 'rectangular', coverage: [0.9, 1.5], sigma: [0.005, 0.015], eccentricity: [0.1, 0.6], withoutErrors })

describe('normal points', () => {
  it('give nearly the orbit and the errors of the single measures', () => {
    for (const seed of [61, 62, 63, 64]) {
      const { measures } = drawn(seed)
      const [single, pointed] = [fitted(measures), fitted(measures, { normalPoints: true })]
      for (const name of ['period', 'periastronTime', 'eccentricity', 'semiMajorAxis', 'inclination', 'node']) {
        const [a, b] = [single.elements[name]!, pointed.elements[name]!]
        expect(Math.abs(a.value - b.value)).toBeLessThan(0.3 * a.sigmaFormal!)
        expect(b.sigmaFormal! / a.sigmaFormal!).toBeCloseTo(1, 1)
      }
    }
  })

  it('hold each measure once, span at most a fiftieth of the period, and lie between their members', () => {
    const { measures } = drawn(65)
    const result = fitted(measures, { normalPoints: true })
    const points = result.normalPoints!
    const ids = points.flatMap((point) => point.members)
    expect(new Set(ids).size).toBe(ids.length)
    const epochOf = new Map(measures.map((measure) => [measure.id, measure.epochYr]))
    for (const point of points) {
      const epochs = point.members.map((id) => epochOf.get(id)!)
      expect(Math.max(...epochs) - Math.min(...epochs)).toBeLessThan(result.elements.period!.value / 50 * 1.01)
      expect(point.members.length).toBeGreaterThan(1)
      expect(point.epochYr).toBeGreaterThanOrEqual(Math.min(...epochs))
      expect(point.epochYr).toBeLessThanOrEqual(Math.max(...epochs))
    }
    const places = measures.length - ids.length + points.length
    expect(result.statistics.rows).toBe(2 * places)
    expect(result.statistics.used).toBe(measures.length)
    expect(result.residuals).toHaveLength(measures.length)
    expect(result.warnings.join(' ')).toContain(`${points.length} normal points`)
  })

  it('have the error of a weighted mean: two like measures, σ/√2', () => {
    const { measures, sigmaArcsec } = drawn(67)
    const point = fitted(measures, { normalPoints: true }).normalPoints!.find(({ members }) => members.length === 2)!
    expect(point.sigmaNorthArcsec).toBeCloseTo(sigmaArcsec / Math.SQRT2, 12)
    expect(point.correlation).toBeCloseTo(0, 12)
  })

  it('estimate errors from the single measures where none is stated', () => {
    const { measures, sigmaArcsec } = drawn(69, true)
    const result = fitted(measures, { normalPoints: true })
    expect(result.statistics.estimatedSigma!.position!.value / sigmaArcsec).toBeCloseTo(1, 0)
    expect(result.statistics.reducedChiSquare!).toBeGreaterThan(0.5)
    expect(result.statistics.reducedChiSquare!).toBeLessThan(1.6)
  })
})
