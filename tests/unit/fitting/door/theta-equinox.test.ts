import { describe, expect, it } from 'vitest'
import { fitOrbit, turnToJ2000Rad, type FitResult, type FitSettings, type RelativeMeasure } from '../../../../fitting'
import { simulatedSystem } from '../../../builders/double-star-systems'

const DEG = Math.PI / 180
const PLACE = { rightAscensionRad: 78 * DEG, declinationRad: 62 * DEG }

function outcomeOf(measures: RelativeMeasure[], settings: FitSettings = {}) {
  return fitOrbit({ kind: 'relative', measures, settings: { shortestPeriodYr: 18, ...settings } })
}

function fitted(measures: RelativeMeasure[], settings: FitSettings = {}): FitResult {
  const outcome = outcomeOf(measures, settings)
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

/** Measures at J2000, as an observer would have given them whose north is that of date. */
function ofDate(measures: readonly RelativeMeasure[]): RelativeMeasure[] {
  return measures.map((measure): RelativeMeasure => {
    const { position, epochYr } = measure
    const turn = -turnToJ2000Rad(PLACE, epochYr)
    if (position.form === 'polar') return { ...measure, thetaEquinoxYr: epochYr, position: { ...position, thetaRad: position.thetaRad! + turn } }
    if (position.form !== 'rectangular') return measure
    const { northArcsec: n, eastArcsec: e } = position
    return { ...measure, thetaEquinoxYr: epochYr, position: { ...position, northArcsec: n * Math.cos(turn) - e * Math.sin(turn), eastArcsec: n * Math.sin(turn) + e * Math.cos(turn) } }
  })
}

describe('position angles at one equinox', () => {
  it.each(['polar', 'rectangular'] as const)('turn %s measures of date to J2000, and the orbit is that of J2000', (form) => {
    const { measures } = simulatedSystem({ seed: 71, count: 40, form, coverage: [0.8, 1.5], sigma: [0.005, 0.01] })
    const [plain, turned] = [fitted(measures), fitted(ofDate(measures), { thetaEquinox: 2000, targetPosition: PLACE })]
    for (const [name, { value }] of Object.entries(plain.elements)) expect(turned.elements[name]!.value / value).toBeCloseTo(1, 7)
    expect(turned.statistics.chiSquare).toBeCloseTo(plain.statistics.chiSquare, 5)
    expect(turned.nodeEquinox).toBe(2000)
    expect(turned.warnings.join(' ')).toMatch(/\d+ position angles were turned to the equinox 2000.0/)
  })

  it('turn the node alone when another equinox is asked for', () => {
    const { measures } = simulatedSystem({ seed: 72, count: 40, form: 'polar', coverage: [0.8, 1.5], sigma: [0.005, 0.01], inclinationRad: 1 })
    const atJ2000 = measures.map((measure): RelativeMeasure => ({ ...measure, thetaEquinoxYr: 2000 }))
    const [plain, turned] = [fitted(atJ2000), fitted(atJ2000, { thetaEquinox: 1900, targetPosition: PLACE })]
    const expected = plain.elements.node!.value - turnToJ2000Rad(PLACE, 1900) / DEG
    expect(Math.cos(2 * DEG * (turned.elements.node!.value - expected))).toBeCloseTo(1, 12)
    expect(Math.abs(turnToJ2000Rad(PLACE, 1900) / DEG)).toBeGreaterThan(0.5)
    for (const name of ['period', 'eccentricity', 'inclination', 'semiMajorAxis']) expect(turned.elements[name]!.value).toBeCloseTo(plain.elements[name]!.value, 7)
    expect(turned.nodeEquinox).toBe(1900)
  })

  it('turn covariances with their places: the χ² of unequal, correlated errors stays', () => {
    const { measures } = simulatedSystem({ seed: 73, count: 40, coverage: [0.8, 1.5], sigma: [0.005, 0.01] })
    const unequal = measures.map((measure): RelativeMeasure => (measure.position.form === 'rectangular'
      ? { ...measure, thetaEquinoxYr: 2000, position: { ...measure.position, sigmaNorthArcsec: 0.02, sigmaEastArcsec: 0.05, correlation: 0.6 } } : measure))
    const near = { rightAscensionRad: 1, declinationRad: 89.9 * DEG }
    const turned = fitted(unequal, { thetaEquinox: 1800, targetPosition: near })
    expect(Math.abs(turnToJ2000Rad(near, 1800))).toBeGreaterThan(0.5)
    expect(turned.statistics.chiSquare).toBeCloseTo(fitted(unequal).statistics.chiSquare, 5)
  })

  it('are refused in words where the place of the pair is missing, and taken as they stand where no equinox is named, which is said', () => {
    const { measures } = simulatedSystem({ seed: 74, count: 40, form: 'polar', coverage: [0.8, 1.5] })
    const refused = outcomeOf(ofDate(measures), { thetaEquinox: 2000 })
    expect(refused.ok ? '' : refused.refusal.sentence).toContain('the place of the pair on the sky is not known')
    const standing = fitted(ofDate(measures))
    expect(standing.warnings.join(' ')).toContain('were taken as they stand')
  })

  it('that name no equinox are taken to be of the one asked for, which is said', () => {
    const { measures } = simulatedSystem({ seed: 75, count: 40, form: 'polar', coverage: [0.8, 1.5] })
    const result = fitted(measures, { thetaEquinox: 1950, targetPosition: PLACE })
    expect(result.elements.node!.value).toBe(fitted(measures).elements.node!.value)
    expect(result.warnings.join(' ')).toContain('40 measures do not say')
  })

  it('out of range are refused by measure', () => {
    const { measures } = simulatedSystem({ seed: 76, count: 20, form: 'polar' })
    const outcome = outcomeOf(measures.map((measure, i) => ({ ...measure, thetaEquinoxYr: i === 3 ? NaN : 2000 })))
    expect(outcome.ok ? '' : outcome.refusal.sentence).toContain(measures[3]!.id)
  })
})
