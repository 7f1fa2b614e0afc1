import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { CampbellElements, OrbitOrientation } from '../../../../fitting/conic'
import { apparentPlace, campbellFromThieleInnes, thieleInnesFromCampbell, withFirstNode, withinTurn } from '../../../../fitting/conic'

const runs = { seed: 9, numRuns: 3000 }
const angle = (max: number) => fc.double({ min: 0, max, noNaN: true, maxExcluded: true })
const orientation: fc.Arbitrary<OrbitOrientation> = fc.record({
  semiMajorAxisArcsec: fc.double({ min: 1e-3, max: 100, noNaN: true }),
  inclinationRad: fc.double({ min: 0.01, max: Math.PI - 0.01, noNaN: true }),
  nodeRad: angle(Math.PI),
  argumentOfPeriastronRad: angle(2 * Math.PI),
})
const orbit: fc.Arbitrary<CampbellElements> = fc.tuple(orientation, fc.record({
  periodYr: fc.double({ min: 0.5, max: 2000, noNaN: true }),
  periastronTimeYr: fc.double({ min: 1600, max: 2100, noNaN: true }),
  eccentricity: fc.double({ min: 0, max: 0.99, noNaN: true }),
})).map(([a, b]) => ({ ...a, ...b }))
const epoch = fc.double({ min: 1700, max: 2100, noNaN: true })

const apart = (a: number, b: number) => Math.abs(Math.atan2(Math.sin(a - b), Math.cos(a - b)))

describe('Thiele-Innes constants', () => {
  it('give the Campbell elements back at every inclination that is not face-on', () => {
    fc.assert(fc.property(orientation, (orbit) => {
      const back = campbellFromThieleInnes(thieleInnesFromCampbell(orbit))
      expect(back.determined).toBe('node-and-argument')
      expect(Math.abs(back.semiMajorAxisArcsec / orbit.semiMajorAxisArcsec - 1)).toBeLessThanOrEqual(1e-14)
      expect(Math.abs(back.inclinationRad - orbit.inclinationRad)).toBeLessThanOrEqual(1e-12)
      // Near Ω = 0 rounding may choose the other node, with ω turned by 180°: compare what both agree on.
      expect(apart(2 * back.nodeRad, 2 * orbit.nodeRad)).toBeLessThanOrEqual(1e-10)
      expect(apart(back.nodeRad + back.argumentOfPeriastronRad, orbit.nodeRad + orbit.argumentOfPeriastronRad)).toBeLessThanOrEqual(1e-10)
      expect(back.nodeRad).toBeGreaterThanOrEqual(0)
      expect(back.nodeRad).toBeLessThan(Math.PI)
    }), runs)
  })

  it('of a face-on orbit determine only the sum, of a reversed one only the difference', () => {
    const faceOn = { semiMajorAxisArcsec: 2, inclinationRad: 0, nodeRad: 0.5, argumentOfPeriastronRad: 1.2 }
    expect(campbellFromThieleInnes(thieleInnesFromCampbell(faceOn))).toMatchObject({ determined: 'sum', nodeRad: 0, argumentOfPeriastronRad: expect.closeTo(1.7, 12) })
    const reversed = { ...faceOn, inclinationRad: Math.PI }
    expect(campbellFromThieleInnes(thieleInnesFromCampbell(reversed))).toMatchObject({ determined: 'difference', nodeRad: 0, argumentOfPeriastronRad: expect.closeTo(0.7, 12) })
  })

  it('describe the same ellipse whichever node is named', () => {
    fc.assert(fc.property(orientation, (orbit) => {
      const one = thieleInnesFromCampbell(orbit)
      const other = thieleInnesFromCampbell({ ...orbit, nodeRad: orbit.nodeRad + Math.PI, argumentOfPeriastronRad: orbit.argumentOfPeriastronRad + Math.PI })
      for (const key of ['a', 'b', 'f', 'g'] as const) expect(Math.abs(one[key] - other[key])).toBeLessThanOrEqual(1e-13 * orbit.semiMajorAxisArcsec)
    }), runs)
  })
})

describe('apparent places', () => {
  it('turn with the node: the sky rotated, every position angle rotates by the same angle and no separation changes', () => {
    fc.assert(fc.property(orbit, epoch, angle(2 * Math.PI), (orbit, epochYr, turn) => {
      const before = apparentPlace(orbit, epochYr)
      const after = apparentPlace({ ...orbit, nodeRad: orbit.nodeRad + turn }, epochYr)
      expect(Math.abs(after.separationArcsec - before.separationArcsec)).toBeLessThanOrEqual(1e-13 * orbit.semiMajorAxisArcsec)
      fc.pre(before.separationArcsec > 1e-3 * orbit.semiMajorAxisArcsec)
      expect(apart(after.positionAngleRad, before.positionAngleRad + turn)).toBeLessThanOrEqual(1e-11)
    }), runs)
  })

  it('scale with the semi-major axis', () => {
    fc.assert(fc.property(orbit, epoch, (orbit, epochYr) => {
      const once = apparentPlace(orbit, epochYr)
      const twice = apparentPlace({ ...orbit, semiMajorAxisArcsec: 2 * orbit.semiMajorAxisArcsec }, epochYr)
      expect(twice.eastArcsec).toBe(2 * once.eastArcsec)
      expect(twice.northArcsec).toBe(2 * once.northArcsec)
    }), runs)
  })

  it('return after a period', () => {
    fc.assert(fc.property(orbit, epoch, (orbit, epochYr) => {
      const now = apparentPlace(orbit, epochYr)
      const later = apparentPlace(orbit, epochYr + orbit.periodYr)
      const tolerance = 1e-10 * orbit.semiMajorAxisArcsec / (1 - orbit.eccentricity)
      expect(Math.hypot(later.eastArcsec - now.eastArcsec, later.northArcsec - now.northArcsec)).toBeLessThanOrEqual(tolerance)
    }), runs)
  })

  it('grow in position angle below i = 90° and fall above', () => {
    fc.assert(fc.property(orbit, epoch, (orbit, epochYr) => {
      fc.pre(Math.abs(orbit.inclinationRad - Math.PI / 2) > 0.05)
      const step = 1e-6 * orbit.periodYr
      const now = apparentPlace(orbit, epochYr)
      const later = apparentPlace(orbit, epochYr + step)
      const turn = now.northArcsec * later.eastArcsec - now.eastArcsec * later.northArcsec
      expect(turn > 0).toBe(orbit.inclinationRad < Math.PI / 2)
    }), { seed: 9, numRuns: 1000 })
  })

  it('are at periastron distance a(1 − e), along ω + Ω, on a face-on orbit at T', () => {
    const place = apparentPlace({ periodYr: 10, periastronTimeYr: 2000, eccentricity: 0.25, semiMajorAxisArcsec: 4, inclinationRad: 0, nodeRad: 0.5, argumentOfPeriastronRad: 0.75 }, 2000)
    expect(place.separationArcsec).toBeCloseTo(3, 14)
    expect(place.positionAngleRad).toBeCloseTo(1.25, 14)
  })

  it.each([[-0.1, 10], [1, 10], [0.5, 0], [0.5, -3], [NaN, 10], [0.5, NaN]])('are NaN for e = %d and P = %d yr', (eccentricity, periodYr) => {
    const place = apparentPlace({ periodYr, periastronTimeYr: 2000, eccentricity, semiMajorAxisArcsec: 1, inclinationRad: 1, nodeRad: 1, argumentOfPeriastronRad: 1 }, 2001)
    expect(place.separationArcsec).toBeNaN()
  })
})

describe('angles', () => {
  it('within a turn are in [0, 2π) and keep their direction', () => {
    fc.assert(fc.property(fc.double({ min: -1000, max: 1000, noNaN: true }), (a) => {
      const within = withinTurn(a)
      expect(within).toBeGreaterThanOrEqual(0)
      expect(within).toBeLessThan(2 * Math.PI)
      expect(apart(within, a)).toBeLessThanOrEqual(1e-12)
    }), runs)
  })

  it('of the second node become those of the first, with the argument turned by 180°', () => {
    expect(withFirstNode(4, 1)).toEqual({ nodeRad: 4 - Math.PI, argumentOfPeriastronRad: expect.closeTo(1 + Math.PI, 14) })
    expect(withFirstNode(2, 7)).toEqual({ nodeRad: 2, argumentOfPeriastronRad: expect.closeTo(7 - 2 * Math.PI, 14) })
    expect(withFirstNode(-1e-20, 1).nodeRad).toBeLessThan(Math.PI)
  })
})
