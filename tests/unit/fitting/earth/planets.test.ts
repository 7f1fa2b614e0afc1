import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { earthHeliocentric, eclipticFromEquatorial, equatorialFromEcliptic, type Planet, planetHeliocentric, PLANETS, sunBarycentric, SUN_OVER_PLANET_MASS } from '../../../../fitting/earth'

const runs = { seed: 33, numRuns: 200 }

/** Smallest and largest distance from the Sun, au, and the greatest height above the ecliptic, degrees. */
const BOUNDS: Record<Planet, readonly [number, number, number]> = {
  'mercury': [0.307, 0.468, 7.1],
  'venus': [0.718, 0.729, 3.5],
  'earth-moon': [0.983, 1.017, 0.1],
  'mars': [1.381, 1.667, 1.9],
  'jupiter': [4.94, 5.46, 1.4],
  'saturn': [8.99, 10.12, 2.6],
  'uranus': [18.2, 20.2, 0.9],
  'neptune': [29.7, 30.5, 1.9],
}

function stateOf(planet: Planet, jdTt: number): Float64Array {
  const out = new Float64Array(6)
  planetHeliocentric(planet, jdTt, out)
  return out
}

describe('the planets as perturbers', () => {
  it.each(PLANETS)('keep to their distances and near the ecliptic: %s', (planet) => {
    const [nearest, farthest, heightDeg] = BOUNDS[planet]
    fc.assert(fc.property(fc.double({ min: 2305447.5, max: 2634166.5, noNaN: true }), (jd) => {
      const [x = NaN, y = NaN, z = NaN] = stateOf(planet, jd)
      const distance = Math.hypot(x, y, z)
      const height = Math.asin(eclipticFromEquatorial([x, y, z])[2] / distance) * 180 / Math.PI
      expect(distance).toBeGreaterThan(nearest)
      expect(distance).toBeLessThan(farthest)
      expect(Math.abs(height)).toBeLessThan(heightDeg)
    }), runs)
  })

  it.each(PLANETS)('move as their velocity says within a hundredth of it: %s', (planet) => {
    const step = 1 / 64
    fc.assert(fc.property(fc.integer({ min: 2415021, max: 2488070 }), (jd) => {
      const before = stateOf(planet, jd - step)
      const after = stateOf(planet, jd + step)
      const velocity = stateOf(planet, jd).slice(3)
      const off = Math.hypot(...[0, 1, 2].map(k => (after[k]! - before[k]!) / (2 * step) - velocity[k]!))
      expect(off).toBeLessThan(0.01 * Math.hypot(velocity[0]!, velocity[1]!, velocity[2]!))
    }), runs)
  })

  it('have with their masses the barycentre that the Sun turns about in the other theory, within 300 km', () => {
    fc.assert(fc.property(fc.double({ min: 2415020.5, max: 2488070.5, noNaN: true }), (jd) => {
      const sun = new Float64Array(6)
      sunBarycentric(jd, sun)
      const total = 1 + PLANETS.reduce((sum, planet) => sum + 1 / SUN_OVER_PLANET_MASS[planet], 0)
      const off = [0, 1, 2].map(k => sun[k]! + PLANETS.reduce((sum, planet) => sum + stateOf(planet, jd)[k]! / SUN_OVER_PLANET_MASS[planet], 0) / total)
      expect(Math.hypot(...off)).toBeLessThan(2e-6)
    }), runs)
  })

  it('have Earth and Moon together within 11,000 km of the Earth of the other theory, 4,700 of which are the Moon\'s', () => {
    fc.assert(fc.property(fc.double({ min: 2415020.5, max: 2488070.5, noNaN: true }), (jd) => {
      const earth = new Float64Array(6)
      earthHeliocentric(jd, earth)
      const both = stateOf('earth-moon', jd)
      const offKm = Math.hypot(...[0, 1, 2].map(k => earth[k]! - both[k]!)) * 149597870.7
      expect(offKm).toBeLessThan(11000)
    }), runs)
  })
})

describe('equator and ecliptic', () => {
  it('lead into each other and back', () => {
    const number = fc.double({ min: -5, max: 5, noNaN: true })
    fc.assert(fc.property(number, number, number, (x, y, z) => {
      const back = equatorialFromEcliptic(eclipticFromEquatorial([x, y, z]))
      for (const [k, value] of [x, y, z].entries()) expect(Math.abs(back[k]! - value)).toBeLessThan(1e-14)
    }), runs)
  })

  it('put the pole of the ecliptic south of the equator\'s towards 18h of right ascension', () => {
    const [x, y, z] = equatorialFromEcliptic([0, 0, 1])
    expect(x).toBe(0)
    expect(y).toBeLessThan(-0.39)
    expect(z).toBeCloseTo(0.91748, 5)
  })
})
