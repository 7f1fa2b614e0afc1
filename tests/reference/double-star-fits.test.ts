/**
 * Fits of published double-star and stellar measures.
 * Data: Boehle et al. 2016, ApJ 830, 17, Table 7 (star S2, 38 epochs, east and north with errors).
 * The seven-element solution and its errors come from two independent least-squares programs on the same data (computed for this
 * check, not published); Thiele–Innes errors are unscaled.
 */
import { describe, expect, it } from 'vitest'
import { fitOrbit, predict, type FitResult, type RelativeMeasure } from '../../fitting'
import { readFixture } from './published'

const MAS = 1 / 1000

function measuresOfS2(): RelativeMeasure[] {
  return readFixture('checks/measures_s2_boehle2016.csv').map((row, i) => ({
    id: `s2-${i}`,
    observer: 'Boehle et al. 2016',
    epochYr: Number(row.epoch),
    position: {
      form: 'rectangular',
      eastArcsec: Number(row.dx_east_mas) * MAS, sigmaEastArcsec: Number(row.sigma_east) * MAS,
      northArcsec: Number(row.dy_north_mas) * MAS, sigmaNorthArcsec: Number(row.sigma_north) * MAS,
    },
  }))
}

function fitted(): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures: measuresOfS2() })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

describe('star S2, 38 epochs, seven elements in east and north, without a starting guess', () => {
  const result = fitted()
  const EXPECTED: [string, number, number][] = [
    ['period', 16.2825, 6e-5], ['periastronTime', 2002.2809, 6e-5], ['eccentricity', 0.8732, 6e-5], ['semiMajorAxis', 120.08 * MAS, 0.006 * MAS],
    ['inclination', 138.299, 6e-4], ['node', 42.894, 6e-4], ['argumentOfPeriastron', 240.819, 6e-4],
  ]
  it.each(EXPECTED)('gives %s %d within %d', (name, expected, tolerance) => {
    expect(Math.abs(result.elements[name]!.value - expected)).toBeLessThanOrEqual(tolerance)
  })

  it('gives χ² 309.378 with 69 degrees of freedom', () => {
    expect(Math.abs(result.statistics.chiSquare - 309.378)).toBeLessThanOrEqual(6e-4)
    expect(result.statistics.degreesOfFreedom).toBe(69)
  })

  it('gives the unscaled standard errors of P, T and e', () => {
    expect(result.elements.period!.sigmaFormal).toBeCloseTo(0.0214, 4)
    expect(result.elements.periastronTime!.sigmaFormal).toBeCloseTo(0.0156, 4)
    expect(result.elements.eccentricity!.sigmaFormal).toBeCloseTo(0.0015, 5)
  })

  it('gives the Thiele–Innes constants as east and north of the unit orbit', () => {
    const { period, periastronTime, eccentricity } = result.elements
    const [atPeriastron] = predict(result, [periastronTime!.value])
    const scale = 1 - eccentricity!.value
    expect(atPeriastron!.values.northArcsec! / scale / MAS).toBeCloseTo(-96.1712, 2)
    expect(atPeriastron!.values.eastArcsec! / scale / MAS).toBeCloseTo(17.4951, 2)
    expect(period!.value).toBeGreaterThan(16)
  })

  it('says that the scatter is larger than the stated errors', () => {
    expect(result.statistics.reducedChiSquare).toBeCloseTo(309.378 / 69, 4)
    expect(result.warnings.join(' ')).toContain('2.1 times what the stated errors say')
  })

  it('keeps ε, h and the Laplace–Runge–Lenz vector along the orbit', () => {
    expect(result.constants!.largestDrift).toBeLessThan(1e-12)
    const { specificEnergy, angularMomentum, laplaceRungeLenz, gravitationalParameter } = result.constants!
    const left = laplaceRungeLenz.magnitude.value ** 2
    const right = gravitationalParameter.value ** 2 + 2 * specificEnergy.value * angularMomentum.value ** 2
    expect(Math.abs(left / right - 1)).toBeLessThan(1e-12)
  })
})
