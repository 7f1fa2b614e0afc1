import { describe, expect, it } from 'vitest'
import { fitOrbit, randomStream, type FitResult, type FitSettings, type RelativeMeasure } from '../../../../fitting'
import { simulatedSystem } from '../../../builders/double-star-systems'

function fitted(measures: RelativeMeasure[], settings: FitSettings = {}): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures, settings: { shortestPeriodYr: 18, weights: 'by-observer', ...settings } })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

/** Measures of a system, those of one observer with further errors of so many times σ. */
function withOnePoorObserver(seed: number, observer: string, times: number) {
  const system = simulatedSystem({ seed, count: 80, coverage: [0.9, 1.5], sigma: [0.005, 0.01], withoutErrors: true })
  const random = randomStream(seed + 1000)
  const measures = system.measures.map((measure): RelativeMeasure => {
    const { position } = measure
    if (position.form !== 'rectangular' || measure.observer !== observer) return measure
    const off = times * system.sigmaArcsec
    return { ...measure, position: { ...position, eastArcsec: position.eastArcsec + off * random.normal(), northArcsec: position.northArcsec + off * random.normal() } }
  })
  return { system, measures }
}

const errorOf = (result: FitResult, observer: string) => result.statistics.observerErrors!.find((error) => error.observer === observer)!

describe('weights by observer', () => {
  it('find the error of each observer from the residuals', () => {
    for (const seed of [21, 22, 23, 24]) {
      const { system, measures } = withOnePoorObserver(seed, 'Tasque', 6)
      const result = fitted(measures)
      expect(errorOf(result, 'Tasque').sigmaArcsec / (Math.sqrt(37) * system.sigmaArcsec)).toBeGreaterThan(0.7)
      expect(errorOf(result, 'Tasque').sigmaArcsec / (Math.sqrt(37) * system.sigmaArcsec)).toBeLessThan(1.4)
      for (const observer of ['Brandvik', 'Orrowin', 'Soundraven']) {
        expect(errorOf(result, observer).sigmaArcsec / system.sigmaArcsec).toBeGreaterThan(0.7)
        expect(errorOf(result, observer).sigmaArcsec / system.sigmaArcsec).toBeLessThan(1.35)
      }
      expect(result.statistics.reducedChiSquare).toBeCloseTo(1, 4)
    }
  })

  it('bring the orbit nearer to the truth than equal weights do', () => {
    const errors = { 'by-observer': 0, equal: 0 }
    for (let seed = 21; seed < 33; seed++) {
      const { system, measures } = withOnePoorObserver(seed, 'Tasque', 10)
      for (const weights of ['by-observer', 'equal'] as const) {
        errors[weights] += Math.log(fitted(measures, { weights }).elements.period!.value / system.truth.periodYr) ** 2
      }
    }
    expect(errors['by-observer']).toBeLessThan(0.5 * errors.equal)
  })

  it('tell methods of one observer apart, and give a lone measure the typical error', () => {
    const { measures } = withOnePoorObserver(21, 'nobody', 0)
    const marked = measures.map((measure, i): RelativeMeasure => ({ ...measure, method: i === 0 ? 'photograph' : 'micrometer' }))
    const errors = fitted(marked).statistics.observerErrors!
    expect(errors).toHaveLength(5)
    const lone = errors.find(({ method }) => method === 'photograph')!
    expect(lone).toMatchObject({ observer: 'Brandvik', measures: 1, basis: 'typical', weight: 1 })
  })

  it('never let an observer through whose measures the orbit passes draw more than eleven times the typical weight', () => {
    const { system, measures } = withOnePoorObserver(25, 'Tasque', 0)
    const clean = fitted(measures)
    const exact = measures.map((measure): RelativeMeasure => {
      const computed = clean.residuals.find(({ id }) => id === measure.id)!.computed
      return measure.observer === 'Tasque' ? { ...measure, position: { form: 'rectangular', eastArcsec: computed.eastArcsec!, northArcsec: computed.northArcsec! } } : measure
    })
    const error = errorOf(fitted(exact), 'Tasque')
    expect(error.basis).toBe('floor')
    expect(error.weight).toBeCloseTo(1 / 0.09, 9)
    expect(error.sigmaArcsec).toBeGreaterThan(0.1 * system.sigmaArcsec)
  })

  it('do not look at stated errors, nor at the order of the measures', () => {
    const { measures } = withOnePoorObserver(22, 'Orrowin', 5)
    const stated = measures.map((measure, i): RelativeMeasure => (measure.position.form === 'rectangular'
      ? { ...measure, position: { ...measure.position, sigmaEastArcsec: 0.01 + i, sigmaNorthArcsec: 1 } } : measure)).reverse()
    expect(JSON.stringify(fitted(stated))).toBe(JSON.stringify(fitted(measures)))
  })

  it('serve straight motion as well', () => {
    const { measures } = withOnePoorObserver(23, 'Tasque', 6)
    const result = fitted(measures, { model: 'line' })
    expect(result.statistics.observerErrors).toHaveLength(4)
  })
})
