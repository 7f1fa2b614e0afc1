import { describe, expect, it } from 'vitest'
import { fitOrbit, predict, type FitRequest, type FitResult, type FitSettings, type RelativeMeasure } from '../../../../fitting'
import { simulatedSystem, type SystemOptions } from '../../../builders/double-star-systems'

function fitted(measures: RelativeMeasure[], settings: FitSettings = {}): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures, settings: { shortestPeriodYr: 18, ...settings } })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

function refusalOf(settings: FitSettings): string {
  const outcome = fitOrbit({ kind: 'relative', measures: simulatedSystem({ seed: 1, count: 20 }).measures, settings } as FitRequest)
  return outcome.ok ? 'fitted' : `${outcome.refusal.code}: ${outcome.refusal.sentence}`
}

const drawn = (seed: number, options: Partial<SystemOptions> = {}) =>
  simulatedSystem({ seed, count: 40, form: seed % 2 === 0 ? 'polar' : 'rectangular', coverage: [0.7, 1.6], sigma: [0.005, 0.02], eccentricity: [0.1, 0.8], ...options })

const NAMES = ['period', 'periastronTime', 'eccentricity', 'semiMajorAxis', 'inclination', 'node', 'argumentOfPeriastron'] as const

describe('held elements', () => {
  it.each(NAMES)('holding %s at its fitted value gives the free orbit again, with no error of its own and no larger ones', (name) => {
    for (const seed of [31, 32, 33]) {
      const { measures } = drawn(seed)
      const free = fitted(measures)
      const held = fitted(measures, { hold: { [name]: free.elements[name]!.value } })
      expect(held.statistics.chiSquare).toBeCloseTo(free.statistics.chiSquare, 5)
      expect(held.statistics.parameters).toBe(6)
      expect(held.statistics.degreesOfFreedom).toBe(free.statistics.degreesOfFreedom + 1)
      expect(held.elements[name]).toMatchObject({ value: free.elements[name]!.value, sigma: 0, sigmaFormal: 0, sigmaScaled: 0, status: 'held' })
      for (const other of NAMES.filter((n) => n !== name)) {
        const [a, b] = [held.elements[other]!, free.elements[other]!]
        expect(Math.abs(a.value - b.value)).toBeLessThan(1e-3 * b.sigmaFormal! + 1e-9 * Math.abs(b.value))
        expect(a.sigmaFormal!).toBeLessThan(b.sigmaFormal! * 1.0001)
        expect(a.status).toBeUndefined()
      }
      expect(held.warnings.join(' ')).toContain(`Held, not fitted: ${name}`)
    }
  })

  it('give the conditional covariance of the free fit: C − c cᵀ/σ²', () => {
    const { measures } = drawn(34)
    const free = fitted(measures)
    const held = fitted(measures, { hold: { eccentricity: free.elements.eccentricity!.value } })
    const [names, full] = [free.covariance!.names, free.covariance!.matrix]
    const e = names.indexOf('eccentricity')
    for (const name of ['period', 'semiMajorAxis', 'inclination', 'node', 'argumentOfPeriastron']) {
      const i = names.indexOf(name)
      const conditional = full[i]![i]! - full[i]![e]! ** 2 / full[e]![e]!
      expect(held.elements[name]!.sigmaFormal! ** 2 / conditional).toBeCloseTo(1, 4)
    }
    expect(held.covariance!.matrix[e]!.every((value) => value === 0)).toBe(true)
  })

  it('move the others where the value is another one, at a higher χ²', () => {
    for (const seed of [35, 36, 37, 38]) {
      const { measures } = drawn(seed)
      const free = fitted(measures)
      for (const name of NAMES) {
        const { value, sigmaFormal } = free.elements[name]!
        const step = value + 2 * sigmaFormal! > (name === 'eccentricity' ? 0.99 : name === 'inclination' ? 178 : Infinity) ? -2 : 2
        const held = fitted(measures, { hold: { [name]: (value + step * sigmaFormal! + (name.startsWith('node') || name.startsWith('arg') ? 360 : 0)) % (name === 'periastronTime' ? Infinity : 360) } })
        expect(held.statistics.chiSquare - free.statistics.chiSquare).toBeGreaterThan(1)
        expect(held.statistics.chiSquare - free.statistics.chiSquare).toBeLessThan(9)
      }
    }
  })

  it.each([
    ['a circle', { conicClass: 'circle' }, { eccentricity: [0, 0] }],
    ['a circle held by its eccentricity', { hold: { eccentricity: 0 } }, { eccentricity: [0, 0] }],
    ['an orbit face on', { hold: { inclination: 0 } }, { inclinationRad: 0 }],
    ['a retrograde orbit face on', { hold: { inclination: 180 } }, { inclinationRad: Math.PI }],
    ['an orbit edge on', { hold: { inclination: 90 } }, { inclinationRad: Math.PI / 2 }],
  ] as [string, FitSettings, Partial<SystemOptions>][])('serve %s', (_, settings, options) => {
    for (const seed of [41, 42, 43, 44]) {
      const system = drawn(seed, options)
      const result = fitted(system.measures, settings)
      expect(result.statistics.reducedChiSquare!).toBeLessThan(1.6)
      expect(Math.abs(result.elements.period!.value - system.truth.periodYr)).toBeLessThan(5 * result.elements.period!.sigmaFormal!)
      expect(result.statistics.parameters).toBe(options.eccentricity ? 5 : options.inclinationRad === Math.PI / 2 ? 6 : 5)
      expect(result.constants!.largestDrift).toBeLessThan(1e-11)
      if (options.eccentricity) expect(result.conic!.class).toBe('circle')
    }
  })

  it('find the orbit of a held period that is no minimum of the free search', () => {
    const { measures, truth } = drawn(45, { coverage: [1, 1.2] })
    const wrong = fitted(measures, { hold: { period: 2.5 * truth.periodYr } })
    expect(wrong.elements.period!.value).toBe(2.5 * truth.periodYr)
    const again = fitOrbit({ kind: 'relative', measures, settings: { hold: { period: 2.5 * truth.periodYr } }, start: { state: wrong.state } })
    expect(again.ok && again.result.statistics.chiSquare).toBeCloseTo(wrong.statistics.chiSquare, 4)
    expect(wrong.statistics.chiSquare).toBeGreaterThan(fitted(measures).statistics.chiSquare)
  })

  it('predict with a covariance that knows what was held', () => {
    const { measures } = drawn(46)
    const [free, held] = [fitted(measures), fitted(measures, { hold: { period: fitted(measures).elements.period!.value } })]
    const at = [2040]
    expect(predict(held, at)[0]!.values.rhoArcsec).toBeCloseTo(predict(free, at)[0]!.values.rhoArcsec!, 5)
    expect(predict(held, at)[0]!.sigmas.rhoArcsec!).toBeLessThan(predict(free, at)[0]!.sigmas.rhoArcsec!)
  })

  it.each([
    ['cannot be held', { hold: { mass: 1 } }],
    ['not a number from 0 to 0.9999', { hold: { eccentricity: 1 } }],
    ['not a number from 0 to 180', { hold: { inclination: NaN } }],
    ['has no periastron', { hold: { eccentricity: 0, periastronTime: 2000 } }],
    ['held at 0.3', { conicClass: 'circle', hold: { eccentricity: 0.3 } }],
    ['bound by construction', { conicClass: 'parabola' }],
    ['nothing is left to fit', { hold: { period: 30, periastronTime: 2000, eccentricity: 0.1, semiMajorAxis: 1, inclination: 20, node: 3, argumentOfPeriastron: 4 } }],
    ['no elements of an orbit', { model: 'line', hold: { period: 30 } }],
  ] as [string, FitSettings][])('are refused in words: %s', (words, settings) => {
    expect(refusalOf(settings)).toContain(words)
  })
})
