import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { AU_KM, earthOrientation, parallaxPlace, stationVector, toIcrsAxes } from '../../../../fitting/earth'

const runs = { seed: 32, numRuns: 300 }
const jdArbitrary = fc.double({ min: 2415020.5, max: 2488070.5, noNaN: true })
const places = fc.record({
  longitudeEastDeg: fc.double({ min: -180, max: 360, noNaN: true }),
  latitudeDeg: fc.double({ min: -90, max: 90, noNaN: true }),
  heightM: fc.double({ min: -400, max: 6000, noNaN: true }),
})

function vectorOf(place: Parameters<typeof stationVector>[0], jdUtc: number): Float64Array {
  const out = new Float64Array(3)
  stationVector(place, jdUtc, jdUtc + 69.184 / 86400, out)
  return out
}

const lengthKm = (vector: Float64Array) => Math.hypot(vector[0]!, vector[1]!, vector[2]!) * AU_KM

describe('a station', () => {
  it('lies between the polar and the equatorial radius and its height from the centre', () => {
    fc.assert(fc.property(places, jdArbitrary, (place, jd) => {
      const length = lengthKm(vectorOf(place, jd))
      expect(length).toBeGreaterThan(6356.75 + place.heightM / 1000 - 0.01)
      expect(length).toBeLessThan(6378.14 + place.heightM / 1000 + 0.01)
    }), runs)
  })

  it('is the same by its geodetic place and by its parallax constants', () => {
    fc.assert(fc.property(places, jdArbitrary, (place, jd) => {
      expect([...vectorOf(parallaxPlace(place), jd)]).toEqual([...vectorOf(place, jd)])
    }), runs)
  })

  it('at the equator and at the pole is one equatorial and one polar radius from the centre', () => {
    expect(parallaxPlace({ longitudeEastDeg: 0, latitudeDeg: 0, heightM: 0 })).toMatchObject({ rhoCosPhi: 1, rhoSinPhi: 0 })
    const pole = parallaxPlace({ longitudeEastDeg: 0, latitudeDeg: -90, heightM: 0 })
    expect(pole.rhoCosPhi).toBeCloseTo(0, 14)
    expect(pole.rhoSinPhi * 6378.137).toBeCloseTo(-6356.752314, 6)
  })

  it('comes back after a sidereal day but for precession and nutation, and is opposite after half of one', () => {
    const place = { longitudeEastDeg: 12.3, rhoCosPhi: 1, rhoSinPhi: 0 }
    const siderealDay = 0.99726956633
    fc.assert(fc.property(jdArbitrary, (jd) => {
      const start = vectorOf(place, jd)
      const after = vectorOf(place, jd + siderealDay)
      const half = vectorOf(place, jd + siderealDay / 2)
      expect(Math.hypot(...[0, 1, 2].map(k => after[k]! - start[k]!)) * AU_KM).toBeLessThan(0.03)
      expect(Math.hypot(...[0, 1, 2].map(k => half[k]! + start[k]!)) * AU_KM).toBeLessThan(0.03)
    }), runs)
  })

  it('of parallax constants 0 is the centre of the Earth', () => {
    expect(lengthKm(vectorOf({ longitudeEastDeg: 0, rhoCosPhi: 0, rhoSinPhi: 0 }, 2451545))).toBe(0)
  })
})

describe('the pole of the Earth on the axes of the ICRS', () => {
  const pole = (jdTt: number) => {
    const vector = Float64Array.from([0, 0, 1])
    toIcrsAxes(earthOrientation(jdTt, jdTt), vector)
    return vector
  }

  it('nutates by 10″ about the pole of J2000 in 2000 and lies 2004″ a century from it, towards the equinox', () => {
    expect(Math.hypot(pole(2451545)[0]!, pole(2451545)[1]!) * 206265).toBeLessThan(15)
    const ahead = pole(2451545 + 36525)
    expect(ahead[0]! * 206265).toBeGreaterThan(2004 - 15)
    expect(ahead[0]! * 206265).toBeLessThan(2004 + 15)
    expect(Math.abs(ahead[1]!) * 206265).toBeLessThan(35)
  })

  it('keeps the lengths of vectors and the angles between them', () => {
    fc.assert(fc.property(jdArbitrary, (jd) => {
      const orientation = earthOrientation(jd, jd)
      const turned = [[1, 0, 0], [0, 1, 0], [0, 0, 1]].map((axis) => {
        const vector = Float64Array.from(axis)
        toIcrsAxes(orientation, vector)
        return vector
      })
      for (let i = 0; i < 3; i++) {
        for (let j = 0; j < 3; j++) {
          const product = [0, 1, 2].reduce((sum, k) => sum + turned[i]![k]! * turned[j]![k]!, 0)
          expect(Math.abs(product - (i === j ? 1 : 0))).toBeLessThan(1e-15)
        }
      }
    }), runs)
  })
})
