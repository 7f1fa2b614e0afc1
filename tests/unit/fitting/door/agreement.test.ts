import { describe, expect, it } from 'vitest'
import { compareFits, fitOrbit, gainByEpoch, randomStream, type FitResult, type FitStart, type RelativeMeasure } from '../../../../fitting'
import { apparentPlace } from '../../../../fitting/conic/ephemeris'
import { simulatedSystem, type SimulatedSystem } from '../../../builders/double-star-systems'

const SYSTEM = simulatedSystem({ seed: 31, count: 48, coverage: [1.3, 1.4], sigma: [0.02, 0.02] })

function fitted(measures: RelativeMeasure[], start?: FitStart): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures, settings: { shortestPeriodYr: 15 }, start })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

/** The campaign again with new errors; stated ones are the true ones divided by `understated`. */
function observed(system: SimulatedSystem, seed: number, understated = 1, offsetArcsec = 0): RelativeMeasure[] {
  const random = randomStream(seed)
  const { truth, sigmaArcsec } = system
  return system.measures.map((measure, i) => {
    const place = apparentPlace(truth, measure.epochYr)
    const own = i % 2 === 0 ? offsetArcsec : 0
    return {
      ...measure,
      position: {
        form: 'rectangular', eastArcsec: place.eastArcsec + sigmaArcsec * random.normal() + own, northArcsec: place.northArcsec + sigmaArcsec * random.normal(),
        sigmaEastArcsec: sigmaArcsec / understated, sigmaNorthArcsec: sigmaArcsec / understated,
      },
    }
  })
}

function agreementOf(measures: RelativeMeasure[], start: FitStart) {
  const parts = [0, 1].map((half) => fitted(measures.filter((_, i) => i % 2 === half), start))
  return compareFits(parts, fitted(measures, start))
}

describe('the test whether batches agree', () => {
  const start = { state: fitted(SYSTEM.measures).state }

  it('has 7 degrees of freedom for two orbits, and a Q that is not negative', () => {
    const agreement = agreementOf(observed(SYSTEM, 1), start)
    expect(agreement.degreesOfFreedom).toBe(7)
    expect(agreement.partDegreesOfFreedom).toBe(96 - 14)
    expect(agreement.q).toBeGreaterThan(0)
    expect(agreement.statement).toContain('agree with one orbit')
  })

  it('raises few false alarms by F, and many by χ² where errors are stated 1.4 times too small', () => {
    const agreements = Array.from({ length: 120 }, (_, i) => agreementOf(observed(SYSTEM, 500 + i, 1.4), start))
    const alarms = (of: (index: number) => number) => agreements.filter((_, i) => of(i) < 0.05).length / agreements.length
    expect(alarms((i) => agreements[i]!.probabilityF!)).toBeLessThan(0.11)
    expect(alarms((i) => agreements[i]!.probabilityChiSquare!)).toBeGreaterThan(0.2)
  }, 60_000)

  it('sees an observer whose places are off by two σ', () => {
    const agreement = agreementOf(observed(SYSTEM, 2, 1, 2 * SYSTEM.sigmaArcsec), start)
    expect(agreement.probabilityF).toBeLessThan(0.01)
    expect(agreement.statement).toContain('do not agree')
  })

  it('gives the same F where errors were estimated as where they were stated alike', () => {
    const stated = observed(SYSTEM, 3)
    const bare = stated.map((measure): RelativeMeasure => (measure.position.form === 'rectangular'
      ? { ...measure, position: { ...measure.position, sigmaEastArcsec: undefined, sigmaNorthArcsec: undefined } }
      : measure))
    const [withErrors, without] = [agreementOf(stated, start), agreementOf(bare, start)]
    expect(without.f! / withErrors.f!).toBeCloseTo(1, 5)
    expect(without.probabilityChiSquare).toBeNull()
  })

  it('throws on one part, or on parts of another model', () => {
    const whole = fitted(SYSTEM.measures, start)
    expect(() => compareFits([whole], whole)).toThrow(RangeError)
    expect(() => compareFits([whole, { ...whole, model: 'line' }], whole)).toThrow(RangeError)
  })
})

describe('the gain of one more measure', () => {
  const result = fitted(SYSTEM.measures)
  const sigma = { kind: 'relative' as const, sigmaThetaRad: 0.01, sigmaRhoArcsec: 0.02 }

  it('foretells the errors that a fit with that measure has', () => {
    const epochYr = 2035
    const [gain] = gainByEpoch(result, [epochYr], sigma)
    const [place] = [apparentPlace(SYSTEM.truth, epochYr)]
    const added: RelativeMeasure = { id: 'next', observer: 'Tasque', epochYr, position: { form: 'polar', thetaRad: place!.positionAngleRad, rhoArcsec: place!.separationArcsec, sigmaThetaRad: 0.01, sigmaRhoArcsec: 0.02 } }
    const after = fitted([...SYSTEM.measures, added], { state: result.state })
    expect(gain!.sigmasAfter.period! / after.elements.period!.sigma!).toBeCloseTo(1, 1)
    expect(gain!.sigmasAfter.period!).toBeLessThan(result.elements.period!.sigma!)
  })

  it('is larger for a better measure, and falls to nothing for a useless one', () => {
    const information = (factor: number) => gainByEpoch(result, [2030], { kind: 'relative', sigmaThetaRad: 0.01 * factor, sigmaRhoArcsec: 0.02 * factor })[0]!.information
    expect(information(0.5)).toBeGreaterThan(information(1))
    expect(information(1e6)).toBeLessThan(1e-6)
    expect(information(1e6)).toBeGreaterThanOrEqual(0)
  })

  it('throws on errors of another kind', () => {
    expect(() => gainByEpoch(result, [2030], { kind: 'plane', sigmaR: 1 })).toThrow(RangeError)
    expect(() => gainByEpoch(result, [NaN], sigma)).toThrow(RangeError)
  })

  it('serves conics in their plane by direction', () => {
    const outcome = fitOrbit({ kind: 'plane', measures: Array.from({ length: 12 }, (_, i) => ({ id: `p${i}`, observer: 'x', phiRad: i / 4, r: (1 / (1 + 0.3 * Math.cos(i / 4))) * (1 + 0.01 * Math.sin(9 * i * i)), sigmaR: 0.01 })) })
    if (!outcome.ok) throw new Error(outcome.refusal.sentence)
    const [near, far] = gainByEpoch(outcome.result, [80, 260], { kind: 'plane', sigmaR: 0.01 })
    expect(far!.information).toBeGreaterThan(near!.information)
    expect(far!.sigmasAfter.eccentricity!).toBeLessThan(outcome.result.elements.eccentricity!.sigma!)
  })
})
