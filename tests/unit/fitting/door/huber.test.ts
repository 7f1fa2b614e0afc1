import { describe, expect, it } from 'vitest'
import { fitOrbit, randomStream, type FitResult, type FitSettings, type RelativeMeasure } from '../../../../fitting'
import { huberWeight } from '../../../../fitting/solve/biweight'
import { simulatedSystem } from '../../../builders/double-star-systems'

function fitted(measures: RelativeMeasure[], settings: FitSettings): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures, settings: { shortestPeriodYr: 18, ...settings } })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

/** One measure in ten moved by 5 to 8 σ. */
function withTails(seed: number) {
  const system = simulatedSystem({ seed, count: 60, coverage: [0.9, 1.5], sigma: [0.01, 0.02] })
  const random = randomStream(seed + 500)
  const measures = system.measures.map((measure, i): RelativeMeasure => {
    const { position } = measure
    if (position.form !== 'rectangular' || i % 10 !== 3) return measure
    return { ...measure, position: { ...position, eastArcsec: position.eastArcsec + (5 + 3 * random.uniform()) * system.sigmaArcsec } }
  })
  return { system, measures }
}

describe("Huber's loss", () => {
  it('weighs fully up to c s and as 1/d beyond, at the same share of normal measures for pairs and single rows', () => {
    expect(huberWeight(1.3, 1, false)).toBe(1)
    expect(huberWeight(2.69, 1, false)).toBeCloseTo(0.5, 14)
    expect(huberWeight(1.8, 1, true)).toBe(1)
    expect(huberWeight(2 * 1.8559, 1, true)).toBeCloseTo(0.5, 14)
    expect(Math.exp(-(1.8559 ** 2) / 2)).toBeCloseTo(0.1786, 3)
  })

  it('lies nearer to the clean fit than least squares does where some measures are far off', () => {
    let [robust, squares] = [0, 0]
    for (let seed = 51; seed < 57; seed++) {
      const { system, measures } = withTails(seed)
      const clean = fitted(system.measures, {})
      for (const name of ['period', 'eccentricity', 'semiMajorAxis']) {
        const { value, sigmaFormal } = clean.elements[name]!
        robust += ((fitted(measures, { loss: 'huber' }).elements[name]!.value - value) / sigmaFormal!) ** 2
        squares += ((fitted(measures, {}).elements[name]!.value - value) / sigmaFormal!) ** 2
      }
    }
    expect(robust).toBeLessThan(0.5 * squares)
  })

  it('satisfies its own equation: the weights are those of the residuals, and none is 0', () => {
    const { measures } = withTails(52)
    const result = fitted(measures, { loss: 'huber' })
    const lengths = result.residuals.map((residual) => residual.normalised!).sort((a, b) => a - b)
    const scale = (lengths[29]! + lengths[30]!) / 2 / 1.1774100225154747
    for (const residual of result.residuals) expect(residual.weight).toBeCloseTo(huberWeight(residual.normalised!, scale, true), 2)
    expect(Math.min(...result.residuals.map((residual) => residual.weight))).toBeLessThan(0.5)
    expect(result.proposals).toEqual([])
  })

  it('gives the same result whatever the order of the measures', () => {
    const { measures } = withTails(53)
    expect(JSON.stringify(fitted([...measures].reverse(), { loss: 'huber' }))).toBe(JSON.stringify(fitted(measures, { loss: 'huber' })))
  })
})
