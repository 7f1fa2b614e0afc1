import { describe, expect, it } from 'vitest'
import { fitOrbit, type FitResult, type FitSettings, type RelativeMeasure } from '../../../../fitting'
import { nightsFactor } from '../../../../fitting/models/nights'
import { simulatedSystem } from '../../../builders/double-star-systems'

function fitted(measures: RelativeMeasure[], settings: FitSettings = {}): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures, settings: { shortestPeriodYr: 18, ...settings } })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

const nightsOf = (i: number) => (i % 2 === 0 ? 9 : 1)
const withNights = (measures: readonly RelativeMeasure[]) => measures.map((measure, i): RelativeMeasure => ({ ...measure, nights: nightsOf(i) }))
const system = (withoutErrors: boolean) => simulatedSystem({ seed: 11, count: 40, coverage: [0.8, 1.5], sigma: [0.01, 0.02], withoutErrors })

/** √(Σ r²) over the distance from the orbit, which is 1/σ where errors are round. */
function sigmaOf(result: FitResult, id: string): number {
  const { normalised, observedMinusComputed: { eastArcsec, northArcsec } } = result.residuals.find((residual) => residual.id === id)!
  return Math.hypot(eastArcsec!, northArcsec!) / normalised!
}

describe('numbers of nights', () => {
  it('divide the accidental part of an error and leave the systematic part', () => {
    expect(nightsFactor(1)).toBe(1)
    expect(nightsFactor(4) ** 2 * 1.25).toBeCloseTo(1 / 4 + 1 / 4, 14)
    expect(nightsFactor(16) ** 2 * 1.25).toBeCloseTo(1 / 16 + 1 / 4, 14)
  })

  it('change nothing where every measure states its error', () => {
    const { measures } = system(false)
    expect(JSON.stringify(fitted(withNights(measures)))).toBe(JSON.stringify(fitted(measures)))
  })

  it('give means of nine nights the error of nine nights where no error is stated, and say so', () => {
    const { measures } = system(true)
    const result = fitted(withNights(measures))
    expect(sigmaOf(result, 'm0000') / sigmaOf(result, 'm0001')).toBeCloseTo(nightsFactor(9), 12)
    expect(result.statistics.estimatedSigma!.position!.value).toBeCloseTo(sigmaOf(result, 'm0001'), 12)
    expect(result.warnings.join(' ')).toContain('20 measures state a number of nights but no error')
  })

  it('take a stated error as that of the mean when others are filled in from it', () => {
    const { measures, sigmaArcsec } = system(false)
    const one = withNights(measures).map((measure): RelativeMeasure => {
      const { position } = measure
      if (position.form !== 'rectangular' || measure.id !== 'm0001') return { ...measure, nights: 9 }
      return { ...measure, nights: 1, position: { ...position, sigmaEastArcsec: undefined, sigmaNorthArcsec: undefined } }
    })
    expect(sigmaOf(fitted(one), 'm0001')).toBeCloseTo(sigmaArcsec / nightsFactor(9), 12)
  })

  it('are left out where all measures are to weigh alike', () => {
    const { measures } = system(true)
    expect(JSON.stringify(fitted(withNights(measures), { weights: 'equal' }))).toBe(JSON.stringify(fitted(measures, { weights: 'equal' })))
  })
})
