import { describe, expect, it } from 'vitest'
import { fitOrbit, predict, type FitRequest, type FitResult, type Progress, type RelativeMeasure } from '../../../../fitting'
import { apparentPlace, type CampbellElements } from '../../../../fitting/conic/ephemeris'
import { randomStream, type RandomStream } from '../../../../fitting/random'
import { simulatedSystem, type SimulatedSystem } from '../../../builders/double-star-systems'

const DEG = Math.PI / 180

const TRUTH: CampbellElements = {
  periodYr: 41.6, periastronTimeYr: 1992.3, eccentricity: 0.42, semiMajorAxisArcsec: 0.9,
  inclinationRad: 58 * DEG, nodeRad: 24 * DEG, argumentOfPeriastronRad: 219 * DEG,
}

function exactMeasures(truth: CampbellElements, form: 'polar' | 'rectangular', count = 24, spanYr = 55): RelativeMeasure[] {
  return Array.from({ length: count }, (_, i) => {
    const epochYr = 1960 + (spanYr * i) / (count - 1)
    const place = apparentPlace(truth, epochYr)
    const base = { id: `m${String(i).padStart(2, '0')}`, observer: i % 2 ? 'Tasque' : 'Brandvik', epochYr }
    return form === 'rectangular'
      ? { ...base, position: { form, eastArcsec: place.eastArcsec, northArcsec: place.northArcsec, sigmaEastArcsec: 0.01, sigmaNorthArcsec: 0.01 } }
      : { ...base, position: { form, thetaRad: place.positionAngleRad, rhoArcsec: place.separationArcsec, sigmaThetaRad: 0.01, sigmaRhoArcsec: 0.01 } }
  })
}

function fitted(measures: RelativeMeasure[], more: Partial<FitRequest> = {}): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures, settings: { shortestPeriodYr: 8 }, ...more } as FitRequest)
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

const value = (result: FitResult, name: string) => result.elements[name]!.value

function expectTruth(result: FitResult, truth: CampbellElements, tolerance: number): void {
  const orbits = (value(result, 'periastronTime') - truth.periastronTimeYr) / truth.periodYr
  expect(Math.abs(value(result, 'period') / truth.periodYr - 1)).toBeLessThan(tolerance)
  expect(Math.abs(orbits - Math.round(orbits))).toBeLessThan(tolerance)
  expect(Math.abs(value(result, 'eccentricity') - truth.eccentricity)).toBeLessThan(tolerance)
  expect(Math.abs(value(result, 'semiMajorAxis') / truth.semiMajorAxisArcsec - 1)).toBeLessThan(tolerance)
  expect(Math.abs(value(result, 'inclination') * DEG - truth.inclinationRad)).toBeLessThan(tolerance)
  expect(Math.abs(value(result, 'node') * DEG - truth.nodeRad)).toBeLessThan(tolerance)
  expect(Math.abs(value(result, 'argumentOfPeriastron') * DEG - truth.argumentOfPeriastronRad)).toBeLessThan(tolerance)
}

describe('a relative orbit from nothing', () => {
  it.each(['polar', 'rectangular'] as const)('comes back from noise-free %s measures to 1e-10', (form) => {
    expectTruth(fitted(exactMeasures(TRUTH, form)), TRUTH, 1e-10)
  })

  it('comes back for a retrograde, very eccentric orbit', () => {
    const truth = { ...TRUTH, eccentricity: 0.93, inclinationRad: 131 * DEG }
    expectTruth(fitted(exactMeasures(truth, 'rectangular', 60)), truth, 1e-9)
  })

  it('turns its node with the sky, and nothing else', () => {
    const { measures } = simulatedSystem({ seed: 5, count: 40, coverage: [1.2, 1.5], sigma: [0.02, 0.02], form: 'polar' })
    const turned = measures.map((measure): RelativeMeasure => (measure.position.form === 'polar' ? { ...measure, position: { ...measure.position, thetaRad: measure.position.thetaRad! + 0.4 } } : measure))
    const [before, after] = [fitted(measures), fitted(turned)]
    const difference = value(after, 'node') - value(before, 'node') - 0.4 / DEG
    expect(Math.abs(difference - 180 * Math.round(difference / 180))).toBeLessThan(1e-6)
    for (const name of ['period', 'eccentricity', 'semiMajorAxis', 'inclination']) expect(value(after, name)).toBeCloseTo(value(before, name), 7)
  })

  it('scales its size, and nothing else, with all separations and their errors', () => {
    const { measures } = simulatedSystem({ seed: 6, count: 40, coverage: [1.2, 1.5] })
    const scaled = measures.map((measure): RelativeMeasure => (measure.position.form === 'rectangular'
      ? { ...measure, position: { ...measure.position, eastArcsec: measure.position.eastArcsec * 3, northArcsec: measure.position.northArcsec * 3, sigmaEastArcsec: measure.position.sigmaEastArcsec! * 3, sigmaNorthArcsec: measure.position.sigmaNorthArcsec! * 3 } }
      : measure))
    const [one, three] = [fitted(measures), fitted(scaled)]
    expect(value(three, 'semiMajorAxis') / value(one, 'semiMajorAxis')).toBeCloseTo(3, 8)
    expect(three.conic!.semiLatusRectum.value / one.conic!.semiLatusRectum.value).toBeCloseTo(3, 8)
    expect(value(three, 'period')).toBeCloseTo(value(one, 'period'), 6)
  })

  it('does not depend on the order of the measures', () => {
    const { measures } = simulatedSystem({ seed: 8, count: 30 })
    expect(JSON.stringify(fitted([...measures].reverse()))).toBe(JSON.stringify(fitted(measures)))
  })

  it('does not change the measures it is given', () => {
    const measures = exactMeasures(TRUTH, 'polar')
    const before = JSON.stringify(measures)
    fitted(measures)
    expect(JSON.stringify(measures)).toBe(before)
  })

  it('finds a short period that a floor of a sixth of the arc would miss', () => {
    const truth = { ...TRUTH, periodYr: 6.5 }
    expectTruth(fitted(exactMeasures(truth, 'rectangular', 90, 61), { settings: {} }), truth, 1e-8)
  })

  it('fits in θ, ρ and in east, north to the same orbit when the errors are the same', () => {
    const options = { seed: 21, count: 60, coverage: [1.5, 1.6], sigma: [0.004, 0.004], eccentricity: [0.3, 0.4] } as const
    const [rectangular, polar] = [fitted(simulatedSystem({ ...options, form: 'rectangular' }).measures), fitted(simulatedSystem({ ...options, form: 'polar' }).measures)]
    for (const name of ['period', 'eccentricity', 'semiMajorAxis', 'inclination']) {
      expect(Math.abs(value(polar, name) - value(rectangular, name))).toBeLessThan(0.2 * rectangular.elements[name]!.sigma!)
    }
  })
})

describe('measures of one coordinate, of ambiguous quadrant, and limits', () => {
  const exact = exactMeasures(TRUTH, 'polar', 40)

  it('take part with the coordinate they have', () => {
    const measures = exact.map((measure, i): RelativeMeasure => {
      if (measure.position.form !== 'polar') return measure
      if (i % 4 === 1) return { ...measure, position: { ...measure.position, rhoArcsec: undefined, sigmaRhoArcsec: undefined } }
      if (i % 4 === 2) return { ...measure, position: { ...measure.position, thetaRad: undefined, sigmaThetaRad: undefined } }
      return measure
    })
    const result = fitted(measures)
    expectTruth(result, TRUTH, 1e-8)
    expect(result.statistics.rows).toBe(60)
    expect(result.residuals[1]!.observedMinusComputed.rhoArcsec).toBeNull()
    expect(result.residuals[2]!.observedMinusComputed.thetaDeg).toBeNull()
  })

  it('enter modulo 180° where the quadrant is ambiguous', () => {
    const measures = exact.map((measure, i): RelativeMeasure => (measure.position.form === 'polar'
      ? { ...measure, position: { ...measure.position, quadrant: 'ambiguous', thetaRad: measure.position.thetaRad! + (i % 3 === 0 ? Math.PI : 0) } }
      : measure))
    const result = fitted(measures)
    expect(result.statistics.chiSquare).toBeLessThan(1e-12)
    expect(value(result, 'period')).toBeCloseTo(TRUTH.periodYr, 6)
    expect(Math.abs(result.residuals[0]!.observedMinusComputed.thetaDeg!)).toBeLessThan(1e-6)
  })

  it('show a limit with the computed place, without fitting it', () => {
    const result = fitted([...exact, { id: 'zz', observer: 'Orrowin', epochYr: 1990, position: { form: 'limit', rhoLimitArcsec: 0.2 } }])
    const limit = result.residuals.find((residual) => residual.id === 'zz')!
    expect(limit.status).toBe('not-fitted')
    expect(limit.rows).toEqual([])
    expect(limit.computed.rhoArcsec).toBeCloseTo(apparentPlace(TRUTH, 1990).separationArcsec, 8)
    expect(result.warnings.join(' ')).toContain('a limit')
  })

  it('report what is set aside, and fit without it', () => {
    const spoiled = exact.map((measure, i): RelativeMeasure => (i === 7 && measure.position.form === 'polar'
      ? { ...measure, setAside: true, position: { ...measure.position, thetaRad: measure.position.thetaRad! + 1 } }
      : measure))
    const result = fitted(spoiled)
    expectTruth(result, TRUTH, 1e-9)
    expect(result.residuals[7]).toMatchObject({ status: 'set-aside', weight: 0, leverage: null })
    expect(result.residuals[7]!.observedMinusComputed.thetaDeg).toBeCloseTo(1 / DEG, 6)
    expect(result.statistics.used).toBe(39)
  })
})

describe('errors of a relative orbit', () => {
  const system = simulatedSystem({ seed: 31, count: 50, coverage: [1.3, 1.4], sigma: [0.02, 0.02] })

  it('are formal where every error is stated, with the scaled ones beside them', () => {
    const result = fitted(system.measures)
    const { sigma, sigmaFormal, sigmaScaled } = result.elements.period!
    expect(result.statistics.errorBasis).toBe('formal')
    expect(sigma).toBe(sigmaFormal)
    expect(sigmaScaled).toBeGreaterThanOrEqual(sigmaFormal!)
  })

  it('come from the residuals where none is stated', () => {
    const bare = simulatedSystem({ seed: 31, count: 50, coverage: [1.3, 1.4], sigma: [0.02, 0.02], withoutErrors: true })
    const result = fitted(bare.measures)
    const stated = fitted(system.measures)
    expect(result.statistics.errorBasis).toBe('scaled')
    expect(result.elements.period!.sigmaFormal).toBeNull()
    expect(result.statistics.reducedChiSquare).toBeCloseTo(1, 6)
    expect(value(result, 'period')).toBeCloseTo(value(stated, 'period'), 6)
    expect(result.elements.period!.sigma! / stated.elements.period!.sigma!).toBeGreaterThan(0.7)
    expect(result.elements.period!.sigma! / stated.elements.period!.sigma!).toBeLessThan(1.4)
  })

  it('take the median stated error where some are missing, and say so', () => {
    const mixed = system.measures.map((measure, i): RelativeMeasure => (i % 5 === 0 && measure.position.form === 'rectangular'
      ? { ...measure, position: { ...measure.position, sigmaEastArcsec: undefined } }
      : measure))
    const result = fitted(mixed)
    expect(result.statistics.errorBasis).toBe('mixed')
    expect(result.warnings.join(' ')).toContain('the median of the stated errors')
    expect(value(result, 'period')).toBeCloseTo(value(fitted(system.measures), 'period'), 8)
  })

  it('put the leverages to the number of parameters in sum', () => {
    const result = fitted(system.measures)
    expect(result.residuals.reduce((sum, residual) => sum + residual.leverage!, 0)).toBeCloseTo(7, 6)
    expect(result.residuals.every((residual) => residual.cook! >= 0)).toBe(true)
  })

  it('give Cook’s distance as the shift of the solution without that measure', () => {
    const result = fitted(system.measures)
    const largest = result.residuals.reduce((a, b) => (a.cook! > b.cook! ? a : b))
    const without = fitted(system.measures.map((measure) => (measure.id === largest.id ? { ...measure, setAside: true } : measure)), { start: { state: result.state } })
    const shift = without.state.values.map((after, j) => after - result.state.values[j]!)
    const inverse = invert(result.state.covariance!)
    const distance = shift.reduce((sum, a, i) => sum + shift.reduce((inner, b, j) => inner + a * inverse[i]![j]! * b, 0), 0) / 7 / result.statistics.reducedChiSquare!
    expect(distance / largest.cook!).toBeGreaterThan(0.8)
    expect(distance / largest.cook!).toBeLessThan(1.25)
  })

  it('agree with the scatter of forty repeated campaigns', () => {
    const first = fitted(system.measures)
    const random = randomStream(4)
    const results = Array.from({ length: 40 }, () => fitted(observedAgain(system, random), { start: { state: first.state } }))
    const periods = results.map((result) => value(result, 'period'))
    const mean = periods.reduce((a, b) => a + b) / periods.length
    const scatter = Math.sqrt(periods.reduce((sum, p) => sum + (p - mean) ** 2, 0) / (periods.length - 1))
    const sigma = results.reduce((sum, result) => sum + result.elements.period!.sigma!, 0) / results.length
    expect(scatter / sigma).toBeGreaterThan(0.7)
    expect(scatter / sigma).toBeLessThan(1.35)
  })
})

describe('what a result says about the motion', () => {
  it('keeps ε, h and the Laplace–Runge–Lenz vector, which obey A² = μ² + 2εh²', () => {
    const { constants } = fitted(exactMeasures(TRUTH, 'rectangular'))
    const { gravitationalParameter: mu, specificEnergy, angularMomentum, laplaceRungeLenz, largestDrift } = constants!
    expect(largestDrift).toBeLessThan(1e-12)
    expect(laplaceRungeLenz.magnitude.value ** 2).toBeCloseTo(mu.value ** 2 + 2 * specificEnergy.value * angularMomentum.value ** 2, 15)
    const length = Math.hypot(...laplaceRungeLenz.components.map((component) => component.value))
    expect(length / laplaceRungeLenz.magnitude.value).toBeCloseTo(1, 12)
    expect(laplaceRungeLenz.magnitude.value / mu.value).toBeCloseTo(TRUTH.eccentricity, 9)
  })

  it('carries measures back onto r = p / (1 + e cos ν) in the plane of the orbit', () => {
    const result = fitted(exactMeasures(TRUTH, 'polar'))
    for (const residual of result.residuals) {
      const { trueAnomalyDeg, radius } = residual.inOrbitPlane!
      const expected = result.conic!.semiLatusRectum.value / (1 + result.conic!.eccentricity.value * Math.cos(trueAnomalyDeg * DEG))
      expect(radius / expected).toBeCloseTo(1, 8)
    }
  })

  it('does not carry measures back where the orbit is seen on edge, and says why', () => {
    const truth = { ...TRUTH, inclinationRad: 89 * DEG }
    const result = fitted(exactMeasures(truth, 'rectangular', 40))
    expect(result.residuals.every((residual) => residual.inOrbitPlane === null)).toBe(true)
    expect(result.warnings.join(' ')).toContain('edge on')
  })

  it.each([0, 180])('gives only the combination of ω and Ω that i = %d° determines, in words', (inclinationDeg) => {
    const truth = { ...TRUTH, inclinationRad: inclinationDeg * DEG }
    const result = fitted(exactMeasures(truth, 'rectangular', 40))
    expect(value(result, 'inclination')).toBeCloseTo(inclinationDeg, 4)
    expect(result.warnings.join(' ')).toContain(inclinationDeg === 0 ? 'only ω + Ω = 243.00°' : 'only ω − Ω = 195.00°')
  })

  it('gives a circle with ω = 0 and T at the node', () => {
    const truth = { ...TRUTH, eccentricity: 0 }
    const result = fitted(exactMeasures(truth, 'rectangular', 40))
    expect(result.conic!.class).toBe('circle')
    expect(value(result, 'argumentOfPeriastron')).toBe(0)
    const [atNode] = predict(result, [value(result, 'periastronTime')])
    expect(atNode!.values.thetaDeg).toBeCloseTo(24, 6)
    expect(atNode!.values.rhoArcsec).toBeCloseTo(0.9, 8)
  })

  it('lists another orbit that fits as well', () => {
    // Six measures, evenly spaced: a period of one spacing more or less gives the same phases.
    const truth = { ...TRUTH, periodYr: 9 }
    const measures = exactMeasures(truth, 'rectangular', 7, 42).map((measure, i): RelativeMeasure => (measure.position.form === 'rectangular'
      ? { ...measure, position: { ...measure.position, eastArcsec: measure.position.eastArcsec + 0.01 * Math.sin(9 * i * i), northArcsec: measure.position.northArcsec + 0.01 * Math.cos(7 * i * i) } }
      : measure))
    const result = fitted(measures)
    expect(result.alternatives.length).toBeGreaterThan(0)
    expect(result.alternatives.every((alternative) => alternative.deltaChiSquare < 9)).toBe(true)
    expect(result.warnings[0]).toMatch(/other orbit|Another orbit/)
  })
})

describe('progress and prediction', () => {
  it('reports stages in order and a fraction that never falls and ends at 1', () => {
    const reports: Progress[] = []
    fitOrbit({ kind: 'relative', measures: exactMeasures(TRUTH, 'polar') }, (progress) => reports.push({ ...progress }))
    const fractions = reports.map((progress) => progress.fraction)
    expect(fractions).toEqual([...fractions].sort((a, b) => a - b))
    expect(fractions.at(-1)).toBe(1)
    expect([...new Set(reports.map((progress) => progress.stage))]).toEqual(['reading', 'searching', 'polishing', 'judging'])
  })

  it('predicts the true place with errors that shrink inside the arc', () => {
    const result = fitted(exactMeasures(TRUTH, 'polar'))
    const [inside, far] = predict(result, [1990, 2080])
    const place = apparentPlace(TRUTH, 2080)
    expect(far!.values.rhoArcsec).toBeCloseTo(place.separationArcsec, 8)
    expect(far!.values.thetaDeg).toBeCloseTo(place.positionAngleRad / DEG, 6)
    expect(far!.sigmas.eastArcsec).toBeGreaterThan(inside!.sigmas.eastArcsec!)
    expect(Math.abs(far!.correlation!)).toBeLessThanOrEqual(1)
  })

  it('refits from an earlier state to the same orbit', () => {
    const { measures } = simulatedSystem({ seed: 77, count: 40, coverage: [0.9, 1.2] })
    const first = fitted(measures)
    const again = fitted(measures, { start: { state: first.state } })
    expect(value(again, 'period')).toBeCloseTo(value(first, 'period'), 7)
    expect(again.statistics.chiSquare).toBeCloseTo(first.statistics.chiSquare, 8)
  })
})

/** The same campaign with new errors. */
function observedAgain(system: SimulatedSystem, random: RandomStream): RelativeMeasure[] {
  const { truth, sigmaArcsec } = system
  return system.measures.map((measure) => {
    const place = apparentPlace(truth, measure.epochYr)
    return {
      ...measure,
      position: {
        form: 'rectangular', sigmaEastArcsec: sigmaArcsec, sigmaNorthArcsec: sigmaArcsec,
        eastArcsec: place.eastArcsec + sigmaArcsec * random.normal(), northArcsec: place.northArcsec + sigmaArcsec * random.normal(),
      },
    }
  })
}

/** Inverse by Gauss–Jordan with pivoting, for the test of Cook's distance. */
function invert(matrix: number[][]): number[][] {
  const n = matrix.length
  const work = matrix.map((row, i) => [...row, ...Array.from({ length: n }, (_, j) => (i === j ? 1 : 0))])
  for (let column = 0; column < n; column++) {
    const pivot = work.slice(column).reduce((best, row, k) => (Math.abs(row[column]!) > Math.abs(work[best]![column]!) ? k + column : best), column)
    ;[work[column], work[pivot]] = [work[pivot]!, work[column]!]
    const divisor = work[column]![column]!
    work[column] = work[column]!.map((entry) => entry / divisor)
    for (let row = 0; row < n; row++) {
      if (row === column) continue
      const factor = work[row]![column]!
      work[row] = work[row]!.map((entry, k) => entry - factor * work[column]![k]!)
    }
  }
  return work.map((row) => row.slice(n))
}
