/** Check V10: star S2 with offset and drift of the reference point. Data: Boehle et al. 2016, ApJ 830, 17, Table 7; solution computed by two code paths of our own. */
import { describe, expect, it } from 'vitest'
import { fitOrbit, predict, type FitResult, type FitSettings, type RelativeMeasure } from '../../fitting'
import { readFixture } from './published'

const MAS = 1e-3

function measuresOfS2(): RelativeMeasure[] {
  return readFixture('checks/measures_s2_boehle2016.csv').map((row, i) => ({
    id: `s2-${i}`, observer: 'Boehle et al. 2016', epochYr: Number(row.epoch),
    position: {
      form: 'rectangular',
      eastArcsec: Number(row.dx_east_mas) * MAS, sigmaEastArcsec: Number(row.sigma_east) * MAS,
      northArcsec: Number(row.dy_north_mas) * MAS, sigmaNorthArcsec: Number(row.sigma_north) * MAS,
    },
  }))
}

function fitted(settings: FitSettings): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures: measuresOfS2(), settings })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

describe('star S2, seven elements with offset and drift of the focus, without a starting guess', () => {
  const result = fitted({ frameOffset: 'offset-and-drift' })
  const EXPECTED: [string, number, number][] = [
    ['period', 15.8344, 6e-5], ['periastronTime', 2002.3012, 6e-5], ['eccentricity', 0.8944, 6e-5], ['semiMajorAxis', 126.59 * MAS, 0.006 * MAS],
    ['inclination', 135.093, 6e-4], ['node', 50.501, 6e-4], ['argumentOfPeriastron', 248.196, 6e-4],
  ]
  it.each(EXPECTED)('gives %s %d within %d', (name, expected, tolerance) => {
    expect(Math.abs(result.elements[name]!.value - expected)).toBeLessThanOrEqual(tolerance)
  })

  it('gives χ² 120.244 with 65 degrees of freedom', () => {
    expect(Math.abs(result.statistics.chiSquare - 120.244)).toBeLessThanOrEqual(6e-4)
    expect(result.statistics.degreesOfFreedom).toBe(65)
  })

  it('gives the standard errors of P, T and e', () => {
    for (const [name, sigma] of [['period', 0.0495], ['periastronTime', 0.0196], ['eccentricity', 0.01114]] as const) {
      expect(result.elements[name]!.sigmaFormal! / sigma).toBeCloseTo(1, 2)
    }
  })

  it('gives the drift of the reference point, and its offset carried to 2004.0', () => {
    const drift = ['frameDriftEast', 'frameDriftNorth'].map((name) => result.elements[name]!)
    const [east, north] = drift.map((element) => element.value / MAS)
    expect([...drift.map((element) => element.unit)]).toEqual(['arcsec/yr', 'arcsec/yr'])
    const published = [1.319, -2.0233, -0.0766, 0.7648]
    const elapsed = 2004 - result.state.referenceEpochYr
    const all = [result.elements.frameOffsetEast!.value / MAS + elapsed * east!, result.elements.frameOffsetNorth!.value / MAS + elapsed * north!, east!, north!]
    all.forEach((value, k) => expect(Math.abs(value - published[k]!)).toBeLessThan(6e-4))
  })

  it('shows computed places with the offset and predicts without it', () => {
    const { epochYr } = measuresOfS2()[0]!
    const computed = result.residuals.find(({ id }) => id === 's2-0')!.computed
    const predicted = predict(result, [epochYr])[0]!.values
    const elapsed = epochYr - result.state.referenceEpochYr
    expect(computed.northArcsec! - predicted.northArcsec!).toBeCloseTo(result.elements.frameOffsetNorth!.value + elapsed * result.elements.frameDriftNorth!.value, 12)
    expect(result.warnings.join(' ')).toContain('offset')
  })

  it('with the offset alone lies between the two', () => {
    const offset = fitted({ frameOffset: 'offset' })
    expect(offset.statistics.parameters).toBe(9)
    expect(offset.statistics.chiSquare).toBeGreaterThan(result.statistics.chiSquare)
    expect(offset.statistics.chiSquare).toBeLessThan(fitted({}).statistics.chiSquare)
  })

  it('goes on from an earlier result to the same solution', () => {
    const outcome = fitOrbit({ kind: 'relative', measures: measuresOfS2(), settings: { frameOffset: 'offset-and-drift' }, start: { state: result.state } })
    expect(outcome.ok && Math.abs(outcome.result.statistics.chiSquare - result.statistics.chiSquare)).toBeLessThan(1e-6)
  })

  it('may be fitted with elements held', () => {
    const held = fitted({ frameOffset: 'offset-and-drift', hold: { period: 15.92 } })
    expect(held.statistics.degreesOfFreedom).toBe(66)
    expect(held.elements.period!.status).toBe('held')
    expect(held.statistics.chiSquare - result.statistics.chiSquare).toBeGreaterThan(1)
    expect(held.statistics.chiSquare - result.statistics.chiSquare).toBeLessThan(6)
  })
})

describe('star S2 with profile intervals asked for', () => {
  it('gives none beside a fitted reference point, and every element is a number', () => {
    const result = fitted({ frameOffset: 'offset-and-drift', errors: 'profile' })
    expect(result.profile).toBeUndefined()
    for (const { value, sigma } of Object.values(result.elements)) expect([value, sigma].every((number) => Number.isFinite(number))).toBe(true)
  })
})
