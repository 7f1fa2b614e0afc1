import { describe, expect, it } from 'vitest'
import { exp } from '../../../../fitting/elementary'
import { constrainedPath } from '../../../../fitting/models/constrained-path'
import { framedPath } from '../../../../fitting/models/framed-path'
import { heldOrbit, type Held } from '../../../../fitting/models/held-orbit'
import { keplerPath } from '../../../../fitting/models/relative-kepler'
import type { SkyPath } from '../../../../fitting/models/sky-path'
import { relativeElements } from '../../../../fitting/uncertainty/relative-elements'

const REFERENCE = 1990
const REGULAR = [3.4, 0.5, -0.3, 0.9, 0.4, -0.5, 0.6]

const CASES: Held[] = [
  { period: 31 }, { eccentricity: 0.4 }, { eccentricity: 0 }, { periastronTime: 1984 }, { inclination: 60 }, { inclination: 0 }, { inclination: 180 }, { inclination: 90 },
  { node: 40 }, { argumentOfPeriastron: 130 }, { node: 250, argumentOfPeriastron: 10 }, { semiMajorAxis: 1.3 }, { semiMajorAxis: 1.3, inclination: 90, node: 3 },
  { eccentricity: 0.3, periastronTime: 1999, argumentOfPeriastron: 77 }, { period: 20, periastronTime: 1999, eccentricity: 0.7 }, { inclination: 0, node: 15 },
  { eccentricity: 0, inclination: 90 }, { periastronTime: 2003, argumentOfPeriastron: 20, inclination: 140 },
]

function expectPartials(path: SkyPath, y: Float64Array): void {
  const p = path.parameters
  const [out, low, high] = [0, 1, 2].map(() => new Float64Array(2 + 2 * p)) as [Float64Array, Float64Array, Float64Array]
  for (const epoch of [1975, 1989.3, 2004]) {
    expect(path.prepare(y)).toBe(true)
    path.at(epoch, out, true)
    for (let j = 0; j < p; j++) {
      const step = 1e-6 * Math.max(1, Math.abs(y[j]!))
      for (const [sign, into] of [[1, high], [-1, low]] as const) {
        const moved = Float64Array.from(y)
        moved[j] = moved[j]! + sign * step
        expect(path.prepare(moved)).toBe(true)
        path.at(epoch, into, false)
      }
      expect(out[2 + j]).toBeCloseTo((high[0]! - low[0]!) / (2 * step), 6)
      expect(out[2 + p + j]).toBeCloseTo((high[1]! - low[1]!) / (2 * step), 6)
    }
  }
}

describe.each(CASES)('an orbit with %j held', (held) => {
  const orbit = heldOrbit(held, REFERENCE)
  const starts = orbit.starts(REGULAR)

  it('has one parameter fewer for every element held, two for a circle, and one more at i = 0 or 180°', () => {
    const isFlat = held.node === undefined && held.argumentOfPeriastron === undefined && (held.inclination === 0 || held.inclination === 180)
    expect(orbit.free).toBe(7 - Object.keys(held).length - (held.eccentricity === 0 && held.periastronTime === undefined ? 1 : 0) - (isFlat ? 1 : 0))
  })

  it('gives the derivatives of its places', () => {
    for (const start of starts) expectPartials(constrainedPath(keplerPath(REFERENCE), orbit), start)
  })

  it('has the held elements wherever the free parameters are', () => {
    for (const start of starts) {
      const y = start.map((value, j) => value + 0.05 * (j % 3))
      const values = new Float64Array(7)
      expect(orbit.expand(y, values, null)).toBe(true)
      const { quantities, periodYr } = relativeElements({ values, covariance: null, referenceEpochYr: REFERENCE, lastEpochYr: 2010 })
      if (held.period !== undefined) expect(exp(values[0]!)).toBeCloseTo(held.period, 10)
      for (const name of ['eccentricity', 'semiMajorAxis', 'inclination'] as const) if (held[name] !== undefined) expect(quantities[name].value).toBeCloseTo(held[name], 9)
      if (held.periastronTime !== undefined) expect(Math.cos(2 * Math.PI * (quantities.periastronTime.value - held.periastronTime) / periodYr)).toBeCloseTo(1, 9)
      const angle = 2 * Math.PI / 180
      if (held.inclination !== 0) for (const name of ['node', 'argumentOfPeriastron'] as const) if (held[name] !== undefined) expect(Math.cos(angle * (quantities[name].value - held[name]))).toBeCloseTo(1, 9)
    }
  })
})

describe('a path with a frame', () => {
  it.each(['offset', 'offset-and-drift'] as const)('%s gives the derivatives of its places', (frame) => {
    const path = framedPath(keplerPath(REFERENCE), frame, REFERENCE)
    expectPartials(path, Float64Array.from([...REGULAR, 0.1, -0.2, 0.01, 0.02].slice(0, path.parameters)))
  })

  it('without an offset is the path itself', () => {
    const path = keplerPath(REFERENCE)
    expect(framedPath(path, 'none', REFERENCE)).toBe(path)
  })
})
