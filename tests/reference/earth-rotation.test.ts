import { describe, expect, it } from 'vitest'
import { asin, atan2, cos, DEG, hypot, RAD, sin } from '../../fitting/elementary'
import {
  AU_KM, earthOrientation, earthRotationAngleRad, eclipticFromEquatorial, greenwichMeanSiderealRad, parallaxPlace, stationOfDateInto, stationVector,
} from '../../fitting/earth'
import { ttFromUtc } from '../../fitting/time'
import { cell, checkAgainst, readFixture, turnDeg } from './published'

const hoursDeg = (hours: number, minutes: number, seconds: number) => 15 * (hours + minutes / 60 + seconds / 3600)

describe('sidereal time at Greenwich', () => {
  const meanDeg = (jdUt: number) => RAD * greenwichMeanSiderealRad(jdUt, ttFromUtc(jdUt))
  // These follow the expressions of IAU 1980 and 1982, from which those of IAU 2006 differ by 0.05″ in 1987 and 0.002″ in 2006.
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., Examples 12.a and 12.b', [
    { quantity: 'mean sidereal time (°) on 1987 April 10, 0h UT', expected: 197.693195, tolerance: 1.6e-5, computed: () => meanDeg(2446895.5) },
    { quantity: 'mean sidereal time (°) on 1987 April 10, 19h 21m UT', expected: 128.7378733333, tolerance: 1.6e-5, computed: () => meanDeg(2446895.5 + (19 * 60 + 21) / 1440) },
    { quantity: 'apparent sidereal time (°) on 1987 April 10, 0h UT', expected: hoursDeg(13, 10, 46.1351), tolerance: 1.6e-5, computed: () => RAD * earthOrientation(2446895.5, ttFromUtc(2446895.5)).siderealRad },
  ])
  checkAgainst('the test value of the IAU SOFA routine gmst82', [
    { quantity: 'mean sidereal time (°) at MJD 53736.0', expected: 100.5068229881, tolerance: 1e-6, computed: () => meanDeg(2453736.5) },
  ])
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., Example 40.a', [
    { quantity: 'apparent sidereal time (°) on 2003 August 28, 3h 17m UT', expected: hoursDeg(1, 40, 45), tolerance: 0.5 * 15 / 3600, computed: () => RAD * earthOrientation(2452879.5 + 197 / 1440, ttFromUtc(2452879.5 + 197 / 1440)).siderealRad },
  ])
})

describe('the rotation of the Earth', () => {
  it.each(readFixture('earth/earth_rotation.csv'))('agrees with ERFA 2.0 (IAU 2006/2000A) to 2 mas and a station to 0.1 m at JD $jd_ut1', (row) => {
    const jdUt1 = cell(row, 'jd_ut1')
    const jdTt = jdUt1 + cell(row, 'tt_minus_ut1_s') / 86400
    // A Julian date in one double is rounded to 40 µs, by which the Earth turns 0.6 mas.
    expect(Math.abs(turnDeg(RAD * earthRotationAngleRad(jdUt1), cell(row, 'rotation_angle_deg')))).toBeLessThanOrEqual(0.001 / 3600)
    expect(Math.abs(turnDeg(RAD * greenwichMeanSiderealRad(jdUt1, jdTt), cell(row, 'mean_sidereal_deg')))).toBeLessThanOrEqual(0.001 / 3600)
    expect(Math.abs(turnDeg(RAD * earthOrientation(jdUt1, jdTt).siderealRad, cell(row, 'apparent_sidereal_deg')))).toBeLessThanOrEqual(0.002 / 3600)
    const place = { longitudeEastDeg: cell(row, 'longitude_east_deg'), latitudeDeg: cell(row, 'latitude_deg'), heightM: cell(row, 'height_m') }
    const vector = new Float64Array(3)
    stationVector(place, jdUt1, jdTt, vector)
    for (const [k, column] of ['station_x_au', 'station_y_au', 'station_z_au'].entries()) {
      expect(Math.abs(vector[k]! - cell(row, column)) * AU_KM * 1000, column).toBeLessThanOrEqual(0.1)
    }
  })
})

describe('the station of Palomar', () => {
  const palomar = parallaxPlace(
    { longitudeEastDeg: -hoursDeg(7, 47, 27), latitudeDeg: 33 + 21 / 60 + 22 / 3600, heightM: 1706 },
    { equatorialRadiusM: 6378140, flattening: 1 / 298.257 },
  )
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., Example 11.a', [
    { quantity: 'ρ sin φ′', expected: 0.546861, tolerance: 6e-7, computed: () => palomar.rhoSinPhi },
    { quantity: 'ρ cos φ′', expected: 0.836339, tolerance: 6e-7, computed: () => palomar.rhoCosPhi },
  ])

  /** Mars on 2003 August 28, from the Earth's centre and from Palomar. */
  const mars = { raDeg: 339.530208, decDeg: -15.771083, distanceAu: 0.37276 }
  const topocentric = () => {
    const station = new Float64Array(3)
    stationOfDateInto(palomar, { siderealRad: hoursDeg(1, 40, 45) * DEG }, station)
    const level = mars.distanceAu * cos(mars.decDeg * DEG)
    const x = level * cos(mars.raDeg * DEG) - station[0]!
    const y = level * sin(mars.raDeg * DEG) - station[1]!
    const z = mars.distanceAu * sin(mars.decDeg * DEG) - station[2]!
    return { raDeg: RAD * atan2(y, x), decDeg: RAD * atan2(z, hypot(x, y)), distanceAu: Math.sqrt(x * x + y * y + z * z) }
  }
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., Example 40.a', [
    { quantity: 'the equatorial horizontal parallax (″) of Mars', expected: 23.592, tolerance: 6e-4, computed: () => RAD * 3600 * asin(6378.137 / AU_KM / mars.distanceAu) },
    { quantity: 'the parallax in right ascension (s)', expected: 1.29, tolerance: 0.006, computed: () => turnDeg(topocentric().raDeg, mars.raDeg) * 240 },
    { quantity: 'the topocentric declination (°)', expected: -15.775, tolerance: 2e-5, computed: () => topocentric().decDeg },
  ])
})

describe('the ecliptic', () => {
  const [x, y, z] = (() => {
    const ra = hoursDeg(7, 45, 18.946) * DEG
    const dec = (28 + 1 / 60 + 34.26 / 3600) * DEG
    return eclipticFromEquatorial([cos(dec) * cos(ra), cos(dec) * sin(ra), sin(dec)], 23.4392911 * DEG)
  })()
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., Example 13.a', [
    { quantity: 'the longitude (°) of Pollux', expected: 113.21563, tolerance: 6e-6, computed: () => RAD * atan2(y, x) },
    { quantity: 'the latitude (°) of Pollux', expected: 6.68417, tolerance: 6e-6, computed: () => RAD * asin(z) },
  ])
})
