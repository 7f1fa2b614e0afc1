import { describe, expect, it } from 'vitest'
import { fitOrbit, predict, randomStream, type EquatorialMeasure, type FitRequest, type FitSettings } from '../../../../fitting'
import { ORBIT_CLASSES, simulatedSightings } from '../../../builders/simulated-sightings'

const { measures: GOOD } = simulatedSightings({ seed: 3, orbitClass: 'main belt', arcDays: [20, 30] })
const SITE = { longitudeEastDeg: 10, rhoCosPhi: 0.6, rhoSinPhi: 0.79 }

function refusalOf(request: unknown): string {
  const outcome = fitOrbit(request as FitRequest)
  if (outcome.ok) throw new Error('this request should be refused')
  expect(outcome.refusal.remedy.length).toBeGreaterThan(10)
  return outcome.refusal.code
}

/** Every number in a result is finite; null stands where there is none. */
function expectFinite(value: unknown, path = 'result'): void {
  if (typeof value === 'number') expect(Number.isFinite(value), path).toBe(true)
  else if (value !== null && typeof value === 'object') for (const [key, inner] of Object.entries(value)) expectFinite(inner, `${path}.${key}`)
}

function expectFittedOrRefused(measures: EquatorialMeasure[], settings: FitSettings = {}): void {
  const outcome = fitOrbit({ kind: 'equatorial', measures, settings })
  if (!outcome.ok) {
    expect(outcome.refusal.sentence).not.toBe('')
    return
  }
  expectFinite(outcome.result)
  expectFinite(predict(outcome.result, [2455000.5, 2460000.5]))
}

describe('values that are no directions are refused by name of the measure', () => {
  it.each([
    ['a time that is not a number', { jdUtc: NaN }],
    ['a time before 1620', { jdUtc: 2300000 }],
    ['a time after 2500', { jdUtc: 2640000 }],
    ['a right ascension beyond 24h', { raRad: 6.3 }],
    ['a declination beyond the pole', { decRad: 1.6 }],
    ['no place of observation', { site: undefined }],
    ['a latitude beyond the pole', { site: { longitudeEastDeg: 1, latitudeDeg: 91, heightM: 0 } }],
    ['parallax constants of no place on the Earth', { site: { longitudeEastDeg: 1, rhoCosPhi: 2, rhoSinPhi: 0 } }],
    ['a σ of zero', { sigmaDecArcsec: 0 }],
    ['a correlation of 1', { correlation: 1 }],
    ['a negative error of the clock', { sigmaTimeS: -1 }],
    ['a magnitude at infinity', { magnitude: Infinity }],
  ])('%s', (_, change) => {
    const outcome = fitOrbit({ kind: 'equatorial', measures: [{ ...GOOD[0]!, ...change } as EquatorialMeasure, ...GOOD.slice(1)] })
    expect(outcome.ok ? '' : outcome.refusal.code).toBe('value-out-of-range')
    expect(outcome.ok ? '' : outcome.refusal.sentence).toContain(GOOD[0]!.id)
  })
})

describe('requests that no orbit can be fitted to are refused with a reason', () => {
  it.each([
    ['too-few-measures', GOOD.slice(0, 2), {}],
    ['too-few-measures', GOOD.map((measure) => ({ ...measure, setAside: true })), {}],
    ['one-epoch', GOOD.map((measure) => ({ ...measure, jdUtc: 2455000 })), {}],
    ['too-few-measures', GOOD.map((measure, i) => ({ ...measure, jdUtc: 2455000 + (i % 2) })), {}],
    ['setting-not-available', GOOD, { conicClass: 'ellipse' }],
    ['setting-not-available', GOOD, { loss: 'biweight' }],
    ['setting-not-available', GOOD, { shortestPeriodYr: 1 }],
    ['setting-not-available', GOOD, { model: 'line' }],
    ['setting-out-of-range', GOOD, { forces: 'moon' }],
  ])('%s (case %#)', (code, measures, settings) => {
    expect(refusalOf({ kind: 'equatorial', measures, settings })).toBe(code)
  })

  it('a start of another kind, or with impossible values', () => {
    const outcome = fitOrbit({ kind: 'equatorial', measures: GOOD })
    if (!outcome.ok) throw new Error(outcome.refusal.sentence)
    const { state } = outcome.result
    for (const wrong of [{ ...state, reference: undefined }, { ...state, values: state.values.map(() => NaN) }, { ...state, names: ['lnPeriod'] }, { ...state, values: state.values.map(() => 1e9) }]) {
      expect(refusalOf({ kind: 'equatorial', measures: GOOD, start: { state: wrong } })).toBe('setting-out-of-range')
    }
  })

  it('a body bound to the Earth', () => {
    // A circle of 0.004 au about the Earth's centre, once in 21 days.
    const measures = Array.from({ length: 8 }, (_, i): EquatorialMeasure => ({
      id: `m${i}`, observer: 'Tasque', site: { longitudeEastDeg: 0, rhoCosPhi: 0, rhoSinPhi: 0 }, jdUtc: 2455000 + i / 4, raRad: 1 + (2 * Math.PI * i) / 4 / 51, decRad: 0.3 * Math.sin((2 * Math.PI * i) / 4 / 51), sigmaRaCosDecArcsec: 1, sigmaDecArcsec: 1,
    }))
    const outcome = fitOrbit({ kind: 'equatorial', measures })
    if (outcome.ok) expect(outcome.result.warnings.join(' ')).toContain('scatter')
    else expect(outcome.refusal.sentence).toContain('bound to the Earth')
  })
})

describe('odd but honest directions are fitted', () => {
  it.each([
    ['24h and the south pole', (measure: EquatorialMeasure, i: number) => (i === 0 ? { ...measure, raRad: 2 * Math.PI } : i === 1 ? { ...measure, decRad: -Math.PI / 2 } : measure)],
    ['all equal', (measure: EquatorialMeasure) => ({ ...measure, raRad: 1, decRad: 0.2 })],
    ['one on the other side of the sky', (measure: EquatorialMeasure, i: number) => (i === 5 ? { ...measure, raRad: (measure.raRad + Math.PI) % (2 * Math.PI), decRad: -measure.decRad } : measure)],
    ['after the table of leap seconds', (measure: EquatorialMeasure) => ({ ...measure, jdUtc: measure.jdUtc + 36525 })],
    ['within one hour', (measure: EquatorialMeasure, i: number) => ({ ...measure, jdUtc: 2455000 + i / 240 })],
  ] as const)('%s', (_, change) => {
    expectFittedOrRefused(GOOD.map(change))
  })

  it('warns where the table of leap seconds has run out', () => {
    const outcome = fitOrbit({ kind: 'equatorial', measures: GOOD.map((measure) => ({ ...measure, jdUtc: measure.jdUtc + 36525 })) })
    expect(outcome.ok && outcome.result.warnings.join(' ')).toContain('leap second')
  })

  it('drawn at random, over any arc', () => {
    const random = randomStream(17)
    for (let k = 0; k < 16; k++) {
      const [count, days] = [3 + Math.floor(8 * random.uniform()), [0.01, 1, 30, 1000][k % 4]!]
      expectFittedOrRefused(Array.from({ length: count }, (_, i) => ({
        id: `m${i}`, observer: 'Tasque', site: SITE, jdUtc: 2455000 + days * random.uniform(), raRad: 6.28 * random.uniform(), decRad: 3.1 * (random.uniform() - 0.5),
      })))
    }
  })

  it('with every setting', () => {
    ORBIT_CLASSES.forEach((orbitClass, i) => {
      const { measures } = simulatedSightings({ seed: 60 + i, orbitClass, count: 5 + i })
      for (const settings of [{ conicClass: 'parabola' }, { weights: 'equal' }, { forces: 'planets', sigmaScale: 2 }] as const) expectFittedOrRefused(measures, settings)
    })
  })
})
