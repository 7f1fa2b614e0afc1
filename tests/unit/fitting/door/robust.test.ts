import { describe, expect, it } from 'vitest'
import { fitOrbit, randomStream, type FitResult, type RelativeMeasure } from '../../../../fitting'
import { apparentPlace } from '../../../../fitting/conic/ephemeris'
import { biweight, robustScale, trimmedSum } from '../../../../fitting/solve/biweight'
import { simulatedSystem, type SimulatedSystem } from '../../../builders/double-star-systems'

interface Spoiled {
  measures: RelativeMeasure[]
  turned: string[]
  outliers: string[]
}

/** One in ten turned by 180°, one in ten moved by 10 to 30 σ. */
function spoil({ measures, sigmaArcsec }: SimulatedSystem, seed: number): Spoiled {
  const random = randomStream(seed)
  const spoiled: Spoiled = { measures: [], turned: [], outliers: [] }
  for (const measure of measures) {
    const draw = random.uniform()
    const { position } = measure
    if (position.form !== 'polar' || draw >= 0.2) spoiled.measures.push(measure)
    else if (draw < 0.1) {
      spoiled.turned.push(measure.id)
      spoiled.measures.push({ ...measure, position: { ...position, thetaRad: position.thetaRad! + Math.PI } })
    } else {
      spoiled.outliers.push(measure.id)
      spoiled.measures.push({ ...measure, position: { ...position, rhoArcsec: position.rhoArcsec! + sigmaArcsec * (10 + 20 * random.uniform()) } })
    }
  }
  return spoiled
}

function fitted(measures: RelativeMeasure[], loss: 'squares' | 'biweight', seed = 1): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures, settings: { loss, seed, shortestPeriodYr: 18 } })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

/** Root mean square distance of a fit from the true places at the measured epochs, in σ. */
function errorInSigma(result: FitResult, system: SimulatedSystem): number {
  const squares = result.residuals.map((residual) => {
    const place = apparentPlace(system.truth, system.measures.find((measure) => measure.id === residual.id)!.epochYr)
    return (residual.computed.eastArcsec! - place.eastArcsec) ** 2 + (residual.computed.northArcsec! - place.northArcsec) ** 2
  })
  return Math.sqrt(squares.reduce((a, b) => a + b) / squares.length) / system.sigmaArcsec
}

describe('a fit with biweights', () => {
  const systems = [3, 4, 5, 6].map((seed) => simulatedSystem({ seed, count: 50, form: 'polar', coverage: [0.8, 1.5], sigma: [0.01, 0.02] }))

  it('stays near the true orbit with a tenth of the quadrants changed and a tenth of the measures far off, where least squares does not', () => {
    for (const [i, system] of systems.slice(0, 2).entries()) {
      const { measures } = spoil(system, 40 + i)
      expect(errorInSigma(fitted(measures, 'biweight'), system)).toBeLessThan(1.2)
      expect(errorInSigma(fitted(measures, 'squares'), system)).toBeGreaterThan(2)
    }
  }, 60_000)

  it('proposes each change of quadrant and each set-aside, with the reason, and does neither', () => {
    const system = systems[0]!
    const { measures, turned, outliers } = spoil(system, 40)
    const result = fitted(measures, 'biweight')
    const proposed = (action: string) => result.proposals.filter((proposal) => proposal.action === action).map((proposal) => proposal.measureId).sort()
    expect(proposed('change-quadrant')).toEqual(turned.sort())
    expect(proposed('set-aside')).toEqual(outliers.sort())
    expect(result.proposals[0]!.reason).toContain('typical scatter')
    expect(result.residuals.every((residual) => residual.status === 'used' && residual.weight > 0)).toBe(true)
    expect(result.statistics.used).toBe(50)
  }, 60_000)

  it('weighs what it proposes next to nothing, and the rest nearly fully', () => {
    const { measures, turned, outliers } = spoil(systems[1]!, 41)
    const result = fitted(measures, 'biweight')
    const weightOf = (id: string) => result.residuals.find((residual) => residual.id === id)!.weight
    for (const id of [...turned, ...outliers]) expect(weightOf(id)).toBeLessThan(1e-3)
    const others = measures.map((measure) => measure.id).filter((id) => !turned.includes(id) && !outliers.includes(id)).map(weightOf)
    expect(others.reduce((a, b) => a + b) / others.length).toBeGreaterThan(0.7)
  }, 60_000)

  it('hardly differs from least squares on clean measures, and proposes nothing', () => {
    const system = systems[2]!
    const [robust, plain] = [fitted(system.measures, 'biweight'), fitted(system.measures, 'squares')]
    expect(robust.proposals).toEqual([])
    expect(Math.abs(robust.elements.period!.value - plain.elements.period!.value)).toBeLessThan(plain.elements.period!.sigma!)
    expect(robust.elements.period!.sigma! / plain.elements.period!.sigma!).toBeGreaterThan(0.8)
    expect(robust.elements.period!.sigma! / plain.elements.period!.sigma!).toBeLessThan(1.4)
  }, 60_000)

  it('gives the same bytes for the same seed', () => {
    const { measures } = spoil(systems[3]!, 43)
    expect(JSON.stringify(fitted(measures, 'biweight', 7))).toBe(JSON.stringify(fitted(measures, 'biweight', 7)))
  }, 60_000)

  it('is refused for straight motion and for plane measures', () => {
    for (const request of [
      { kind: 'relative' as const, measures: systems[0]!.measures, settings: { loss: 'biweight' as const, model: 'line' as const } },
      { kind: 'plane' as const, measures: [1, 2, 3, 4].map((phiRad) => ({ id: `p${phiRad}`, observer: 'x', phiRad, r: 1 })), settings: { loss: 'biweight' as const } },
    ]) expect(fitOrbit(request)).toMatchObject({ ok: false, refusal: { code: 'setting-not-available' } })
  })
})

describe('the biweight', () => {
  it('falls from 1 to its floor at six scales, and never to 0', () => {
    expect(biweight(0, 1)).toBe(1)
    expect(biweight(3, 1)).toBeCloseTo(0.5625, 12)
    expect(biweight(6, 1)).toBe(1e-8)
    expect(biweight(1e9, 1)).toBe(1e-8)
    expect(biweight(0, 0)).toBe(1)
  })

  it('has scales of 1 for normal errors of the stated size', () => {
    const random = randomStream(2)
    const pairs = Array.from({ length: 20_001 }, () => Math.hypot(random.normal(), random.normal()))
    const singles = Array.from({ length: 20_001 }, () => Math.abs(random.normal()))
    expect(robustScale(pairs, () => true).pair).toBeCloseTo(1, 1)
    expect(robustScale(singles, () => false).single).toBeCloseTo(1, 1)
    expect(robustScale(pairs, () => true).single).toBe(robustScale(pairs, () => true).pair)
  })

  it('ranks by the smallest three quarters of the squares', () => {
    expect(trimmedSum([1, 2, 3, 1000])).toBe(14)
  })
})
