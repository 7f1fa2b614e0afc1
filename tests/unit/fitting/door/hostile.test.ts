import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fitOrbit, KINDS, LARGEST_MEASURES, predict, type FitOutcome, type FitRequest, type PlaneMeasure, type RelativeMeasure } from '../../../../fitting'
import { simulatedSystem } from '../../../builders/double-star-systems'

const polar = (id: string, epochYr: number, thetaRad: number, rhoArcsec: number): RelativeMeasure =>
  ({ id, observer: 'Tasque', epochYr, position: { form: 'polar', thetaRad, rhoArcsec, sigmaThetaRad: 0.01, sigmaRhoArcsec: 0.01 } })
const plane = (id: string, phiRad: number, r: number): PlaneMeasure => ({ id, observer: 'Tasque', phiRad, r })

const GOOD = simulatedSystem({ seed: 3, count: 20, coverage: [0.9, 1] }).measures
const SETTINGS = { shortestPeriodYr: 10 }

function refusalOf(request: unknown): string {
  const outcome = fitOrbit(request as FitRequest)
  if (outcome.ok) throw new Error('this request should be refused')
  expect(outcome.refusal.sentence.length).toBeGreaterThan(10)
  expect(outcome.refusal.remedy.length).toBeGreaterThan(10)
  return outcome.refusal.code
}

const withFirst = (change: Record<string, unknown>, position: Record<string, unknown> = {}) => ({
  kind: 'relative', settings: SETTINGS,
  measures: [{ ...GOOD[0], ...change, position: { ...GOOD[0]!.position, ...position } }, ...GOOD.slice(1)],
})

/** Every number in a result is finite; null stands where there is none. */
function expectFinite(value: unknown, path = 'result'): void {
  if (typeof value === 'number') expect(Number.isFinite(value), path).toBe(true)
  else if (value !== null && typeof value === 'object') for (const [key, inner] of Object.entries(value)) expectFinite(inner, `${path}.${key}`)
}

describe('requests that no orbit can be fitted to are refused with a reason and a remedy', () => {
  it.each([
    ['no-measures', { kind: 'relative', measures: [] }],
    ['no-measures', { kind: 'relative' }],
    ['too-few-measures', { kind: 'relative', measures: [polar('a', 2000, 1, 1), polar('b', 2010, 2, 1)] }],
    ['one-epoch', { kind: 'relative', measures: Array.from({ length: 9 }, (_, i) => polar(`m${i}`, 2000, 1 + 0.01 * i, 1)) }],
    ['too-few-measures', { kind: 'relative', measures: Array.from({ length: 9 }, (_, i) => polar(`m${i}`, 2000 + (i % 2), 1, 1)) }],
    ['too-few-measures', { kind: 'relative', measures: GOOD.map((measure) => ({ ...measure, setAside: true })) }],
    ['too-few-measures', { kind: 'relative', measures: GOOD.map((measure, i) => ({ ...measure, position: { form: 'polar', thetaRad: i / 10 } })) }],
    ['too-few-measures', { kind: 'relative', measures: GOOD.map((measure, i) => ({ ...measure, position: { form: 'polar', rhoArcsec: 1 + i / 10 } })) }],
    ['duplicate-id', { kind: 'relative', measures: [...GOOD, GOOD[0]] }],
    ['value-out-of-range', { kind: 'equatorial', measures: [{ id: 'a', observer: 'x' }] }],
    ['kind-not-available', { kind: 'something', measures: GOOD }],
    ['too-few-measures', { kind: 'plane', measures: [plane('a', 1, 1), plane('b', 2, 1)] }],
    ['one-direction', { kind: 'plane', measures: [plane('a', 1, 1), plane('b', 1, 1.1), plane('c', 1 + 2 * Math.PI, 0.9)] }],
    ['too-few-measures', { kind: 'plane', measures: [plane('a', 1, 1), plane('b', 1, 1.1), plane('c', 2, 0.9)] }],
    ['setting-out-of-range', { kind: 'plane', measures: [plane('a', 1, 1), plane('b', 2, 1), { id: 'c', observer: 'x', phiRad: 3, diameterArcmin: 31 }] }],
  ])('%s (case %#)', (code, request) => {
    expect(refusalOf(request)).toBe(code)
  })

  it('more measures than the stated cap, without looking at each', () => {
    expect(refusalOf({ kind: 'relative', measures: new Array(1_000_000).fill(GOOD[0]) })).toBe('too-many-measures')
    expect(LARGEST_MEASURES).toBe(20_000)
  })
})

describe('values that are no measures are refused by name of the measure', () => {
  it.each([
    ['an epoch that is not a number', { epochYr: NaN }, {}],
    ['an epoch before 1600', { epochYr: 1599 }, {}],
    ['an epoch after 2500', { epochYr: 2501 }, {}],
    ['a place at infinity', {}, { eastArcsec: Infinity }],
    ['a σ of zero', {}, { sigmaEastArcsec: 0 }],
    ['a negative σ', {}, { sigmaNorthArcsec: -1 }],
    ['a correlation of 1', {}, { correlation: 1 }],
    ['a correlation below −1', {}, { correlation: -1.2 }],
    ['a weight of zero', { weightFactor: 0 }, {}],
    ['half a night', { nights: 0.5 }, {}],
    ['text for a number', {}, { northArcsec: '1' }],
    ['a form that is not known', {}, { form: 'spherical' }],
  ])('%s', (_, change, position) => {
    const request = withFirst(change, position)
    expect(refusalOf(request)).toBe('value-out-of-range')
    const outcome = fitOrbit(request as unknown as FitRequest)
    expect(outcome.ok ? '' : outcome.refusal.sentence).toContain(GOOD[0]!.id)
  })
})

describe('settings are served or refused, never ignored', () => {
  it.each([
    ['setting-out-of-range', { hold: { period: -40 } }],
    ['setting-out-of-range', { frameOffset: 'some' }],
    ['setting-not-available', { frameOffset: 'offset', model: 'line' }],
    ['setting-not-available', { loss: 'huber', model: 'line' }],
    ['setting-not-available', { conicClass: 'parabola' }],
    ['setting-not-available', { forces: 'planets' }],
    ['setting-not-available', { normalPoints: true, loss: 'biweight' }],
    ['setting-not-available', { normalPoints: true, model: 'line' }],
    ['setting-out-of-range', { thetaEquinox: 1500 }],
    ['setting-out-of-range', { targetPosition: { rightAscensionRad: 1, declinationRad: 2 } }],
    ['setting-out-of-range', { targetPosition: 'north' }],
    ['setting-not-available', { diameterScaleArcmin: 30 }],
    ['setting-not-available', { invented: 1 }],
    ['setting-out-of-range', { loss: 'cubes' }],
    ['setting-out-of-range', { shortestPeriodYr: 0 }],
    ['setting-out-of-range', { shortestPeriodYr: NaN }],
    ['setting-out-of-range', { sigmaScale: -1 }],
    ['setting-out-of-range', { seed: Infinity }],
  ])('%s for %j', (code, settings) => {
    expect(refusalOf({ kind: 'relative', measures: GOOD, settings })).toBe(code)
  })

  it('takes the defaults when they are spelled out', () => {
    const settings = { loss: 'squares', conicClass: 'any', forces: 'sun', normalPoints: false, thetaEquinox: 2000, weights: 'stated', model: 'kepler', ...SETTINGS } as const
    const [spelled, left] = [fitOrbit({ kind: 'relative', measures: GOOD, settings }), fitOrbit({ kind: 'relative', measures: GOOD, settings: SETTINGS })]
    expect(JSON.stringify(spelled)).toBe(JSON.stringify(left))
  })

  it('refuses a start of another kind, or with impossible values', () => {
    const state = { model: 'kepler', names: ['lnPeriod', 'u', 'v', 'A1', 'B1', 'F1', 'G1'], values: [3, 9, 0, 1, 0, 0, 1], covariance: null, referenceEpochYr: 2000 }
    expect(refusalOf({ kind: 'relative', measures: GOOD, start: { state } })).toBe('setting-out-of-range')
    expect(refusalOf({ kind: 'plane', measures: [plane('a', 1, 1), plane('b', 2, 1), plane('c', 3, 1)], start: { state } })).toBe('setting-out-of-range')
  })
})

describe('odd but honest data are fitted', () => {
  it('one measure 10⁶ σ off, which is named', () => {
    const spoiled = GOOD.map((measure, i): RelativeMeasure => (i === 4 && measure.position.form === 'rectangular'
      ? { ...measure, position: { ...measure.position, eastArcsec: measure.position.eastArcsec + 1e6 * measure.position.sigmaEastArcsec! } }
      : measure))
    const outcome = fitOrbit({ kind: 'relative', measures: spoiled, settings: SETTINGS })
    expect(outcome.ok).toBe(true)
    if (outcome.ok) expectFinite(outcome.result)
  })

  it('all places equal', () => {
    const outcome = fitOrbit({ kind: 'relative', measures: Array.from({ length: 8 }, (_, i) => polar(`m${i}`, 2000 + i, 1, 1)), settings: { shortestPeriodYr: 2 } })
    if (outcome.ok) expectFinite(outcome.result)
    else expect(outcome.refusal.code).toBe('no-orbit-found')
  })

  it('a large epoch range, and two epochs a minute apart', () => {
    const measures = [1600, 1700, 1800, 1900, 2000, 2000.000002, 2100, 2500].map((epochYr, i) => polar(`m${i}`, epochYr, i / 3, 1 + i / 10))
    const outcome = fitOrbit({ kind: 'relative', measures, settings: { shortestPeriodYr: 100 } })
    expect(outcome.ok).toBe(true)
    if (outcome.ok) expectFinite(outcome.result)
  })
})

describe('predict', () => {
  it('throws on an epoch that is not a number, a programmer’s error', () => {
    const outcome = fitOrbit({ kind: 'plane', measures: [plane('a', 0, 1), plane('b', 2, 1), plane('c', 4, 1.1)] })
    if (!outcome.ok) throw new Error(outcome.refusal.sentence)
    expect(() => predict(outcome.result, [NaN])).toThrow(RangeError)
  })
})

describe('any request', () => {
  const number = fc.oneof(fc.double(), fc.constantFrom(0, -1, 1, NaN, Infinity, 1e-300, 1e300, 2000), fc.double({ min: 0, max: 10 }))
  const epoch = fc.oneof(number, fc.double({ min: 1600, max: 2500, noNaN: true }))
  const position = fc.oneof(
    fc.record({ form: fc.constant('polar'), thetaRad: fc.double({ min: -7, max: 7 }), rhoArcsec: fc.double({ min: 0.01, max: 9 }), sigmaThetaRad: fc.option(fc.double({ min: 1e-4, max: 2 }), { nil: undefined }), quadrant: fc.constantFrom('stated', 'ambiguous', undefined) }),
    fc.record({ form: fc.constant('rectangular'), eastArcsec: fc.double({ min: -9, max: 9 }), northArcsec: fc.double({ min: -9, max: 9 }), sigmaEastArcsec: fc.option(number, { nil: undefined }), correlation: fc.option(number, { nil: undefined }) }),
    fc.record({ form: fc.constant('limit'), rhoLimitArcsec: number }),
  )
  const relative = fc.record({ id: fc.string(), observer: fc.string(), epochYr: epoch, position, weightFactor: fc.option(number, { nil: undefined }), setAside: fc.option(fc.boolean(), { nil: undefined }) })
  const disc = fc.record({ id: fc.string(), observer: fc.string(), phiRad: fc.double({ min: -7, max: 7 }), r: fc.option(fc.double({ min: 1e-3, max: 1e3 }), { nil: undefined }), diameterArcmin: fc.option(number, { nil: undefined }), sigmaR: fc.option(number, { nil: undefined }) })

  function expectOutcome(outcome: FitOutcome): void {
    if (outcome.ok) expectFinite(outcome.result)
    else expect(outcome.refusal.sentence).not.toBe('')
  }

  it('is fitted or refused, and never throws or gives a number that is none', () => {
    fc.assert(fc.property(fc.constantFrom(...KINDS), fc.array(fc.oneof(relative, disc), { maxLength: 14 }), (kind, measures) => {
      expectOutcome(fitOrbit({ kind, measures, settings: kind === 'relative' ? { shortestPeriodYr: 50 } : {} } as unknown as FitRequest))
    }), { seed: 20, numRuns: 300 })
  })

  it('with honest values scattered at random is fitted or refused likewise', () => {
    const honest = fc.record({ epochYr: fc.double({ min: 1900, max: 2020, noNaN: true }), x: fc.double({ min: -2, max: 2, noNaN: true }), y: fc.double({ min: -2, max: 2, noNaN: true }) })
    fc.assert(fc.property(fc.array(honest, { minLength: 5, maxLength: 12 }), (points) => {
      const measures = points.map(({ epochYr, x, y }, i): RelativeMeasure => ({ id: `m${i}`, observer: 'Tasque', epochYr, position: { form: 'rectangular', eastArcsec: x, northArcsec: y } }))
      expectOutcome(fitOrbit({ kind: 'relative', measures, settings: { shortestPeriodYr: 40 } }))
    }), { seed: 21, numRuns: 60 })
  })
})
