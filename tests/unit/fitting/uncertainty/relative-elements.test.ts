import { describe, expect, it } from 'vitest'
import { apparentPlace } from '../../../../fitting/conic/ephemeris'
import { keplerPath } from '../../../../fitting/models/relative-kepler'
import type { Quantity } from '../../../../fitting/uncertainty/error-scale'
import { lineElements, stillElements } from '../../../../fitting/uncertainty/line-elements'
import { ELEMENT_NAMES, relativeElements, type RelativeElements } from '../../../../fitting/uncertainty/relative-elements'

const REFERENCE = 1990

const at = (values: number[]): RelativeElements => relativeElements({ values, covariance: null, referenceEpochYr: REFERENCE, lastEpochYr: 2015 })

/** Largest difference of a gradient from central differences, relative to its largest component. */
function gradientError(of: (values: number[]) => Quantity, values: number[]): number {
  const { gradient } = of(values)
  const numeric = values.map((value, j) => {
    const step = 1e-6 * Math.max(1, Math.abs(value))
    const shifted = (by: number) => of(values.map((other, k) => (k === j ? other + by : other))).value
    return (shifted(step) - shifted(-step)) / (2 * step)
  })
  const size = Math.max(...numeric.map(Math.abs))
  return Math.max(...numeric.map((value, j) => Math.abs(value - gradient[j]!))) / size
}

const ORBITS: [string, number[]][] = [
  ['a direct orbit', [Math.log(40), 0.5, -0.3, 0.8, 0.3, -0.2, 0.6]],
  ['a retrograde, eccentric orbit', [Math.log(90), -1.2, 0.9, 0.4, 0.7, 0.6, -0.3]],
  ['an orbit of small e', [Math.log(12), 0.001, 0.002, 0.8, 0.3, -0.2, 0.6]],
]

describe.each(ORBITS)('the elements of %s', (_, values) => {
  it.each([...ELEMENT_NAMES])('have the gradient of %s that central differences give', (name) => {
    expect(gradientError((v) => at(v).quantities[name], values)).toBeLessThan(1e-5)
  })

  it('have the gradients of p, of ω ± Ω and of the next periastron that central differences give', () => {
    for (const key of ['semiLatusRectum', 'sum', 'difference', 'nextPeriastron'] as const) expect(gradientError((v) => at(v)[key], values), key).toBeLessThan(1e-5)
  })

  it('describe the path of the regular parameters', () => {
    const elements = at(values)
    const path = keplerPath(REFERENCE)
    const position = new Float64Array(16)
    path.prepare(values)
    for (const epochYr of [1975, 1990, 2003.7]) {
      path.at(epochYr, position, false)
      const place = apparentPlace({
        periodYr: elements.periodYr, periastronTimeYr: elements.quantities.periastronTime.value, eccentricity: elements.eccentricity,
        semiMajorAxisArcsec: elements.semiMajorAxisArcsec, inclinationRad: elements.inclinationRad, nodeRad: elements.nodeRad, argumentOfPeriastronRad: elements.argumentRad,
      }, epochYr)
      expect(place.northArcsec).toBeCloseTo(position[0]!, 11)
      expect(place.eastArcsec).toBeCloseTo(position[1]!, 11)
    }
  })

  it('put the node in the first half turn and the next periastron after the last measure', () => {
    const elements = at(values)
    expect(elements.nodeRad).toBeGreaterThanOrEqual(0)
    expect(elements.nodeRad).toBeLessThan(Math.PI)
    expect(elements.nextPeriastron.value).toBeGreaterThan(2015)
    expect(elements.nextPeriastron.value).toBeLessThanOrEqual(2015 + elements.periodYr)
  })
})

describe('the passage of periastron that is given', () => {
  it('is the one with the smallest error', () => {
    // Period and phase at the reference epoch with independent errors: the passage nearest the reference epoch is known best.
    const values = ORBITS[0]![1]
    const covariance = values.map((_, i) => values.map((__, j) => (i === j ? 1e-4 : 0)))
    const { quantities, periodYr } = relativeElements({ values, covariance, referenceEpochYr: REFERENCE, lastEpochYr: 2015 })
    expect(Math.abs(quantities.periastronTime.value - REFERENCE)).toBeLessThanOrEqual(periodYr / 2)
  })
})

describe('the elements of straight motion', () => {
  it.each(['closestApproach', 'closestApproachTime', 'closestApproachPositionAngle', 'motion', 'motionDirection'] as const)(
    'have the gradient of %s that central differences give, on both sides of the primary', (name) => {
      for (const values of [[3, -1, 0.01, 0.02], [-2, 0.5, 0.03, -0.01]]) expect(gradientError((v) => lineElements(v, REFERENCE)[name], values)).toBeLessThan(1e-5)
    })

  it('have the gradients of separation and position angle of a still companion', () => {
    for (const name of ['separation', 'positionAngle'] as const) expect(gradientError((v) => stillElements(v)[name], [0.4, -0.9])).toBeLessThan(1e-6)
  })
})
