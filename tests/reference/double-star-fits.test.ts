/**
 * Fits of published double-star and stellar measures.
 * Data: Boehle et al. 2016, ApJ 830, 17, Table 7 (star S2, 38 epochs, east and north with errors).
 * The seven-element solution and its errors come from two independent least-squares programs on the same data (computed for this
 * check, not published); Thiele–Innes errors are unscaled.
 */
import { describe, expect, it } from 'vitest'
import { fitOrbit, predict, type FitResult, type RelativeMeasure } from '../../fitting'
import { cell, readFixture } from './published'

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

describe('places of the Fourth Catalog of Orbits (Worley & Heintz 1983, Publ. USNO 24/7), twenty years apart by one, fitted without a starting guess', () => {
  const rows = readFixture('orbits_cat4.csv')
  const orbits = [...new Set(rows.map((row) => row.seq))].map((seq) => rows.filter((row) => row.seq === seq)).filter(([first]) => cell(first!, 'P_yr') <= 40)

  it.each(orbits.map((places) => ({ name: places[0]!.name!, places })))('give the published orbit of $name back, and not one of its aliases', ({ places }) => {
    // θ is printed to 0.01° and ρ to 0.001″: errors of rounding, 1/√12 of the last digit.
    const measures = places.filter((place) => cell(place, 'rho_arcsec') > 0).map((place, i): RelativeMeasure => ({
      id: `p${i}`, observer: 'catalogue', epochYr: cell(place, 'epoch'),
      position: { form: 'polar', thetaRad: (cell(place, 'theta_deg') * Math.PI) / 180, rhoArcsec: cell(place, 'rho_arcsec'), sigmaThetaRad: 5e-5, sigmaRhoArcsec: 0.00029 },
    }))
    const outcome = fitOrbit({ kind: 'relative', measures })
    if (!outcome.ok) throw new Error(outcome.refusal.sentence)
    const { elements, alternatives } = outcome.result
    const published = places[0]!
    const within = (name: string, column: string, least: number) => expect(Math.abs(elements[name]!.value - cell(published, column)), name).toBeLessThan(least + 4 * elements[name]!.sigmaScaled!)
    within('period', 'P_yr', 0)
    within('eccentricity', 'e', 0)
    within('semiMajorAxis', 'a_arcsec', 0)
    within('inclination', 'i_deg', 0)
    const node = elements.node!.value - cell(published, 'node_deg')
    expect(Math.abs(node - 180 * Math.round(node / 180))).toBeLessThan(4 * elements.node!.sigmaScaled!)
    expect(alternatives.every((alternative) => alternative.elements.period!.value < elements.period!.value)).toBe(true)
    expect(outcome.result.warnings.join(' ')).toContain('measures at equal intervals')
  })
})
