import { describe, expect, it } from 'vitest'
import { stateAfter, type Vector } from '../../fitting/conic'
import { stateFromElements } from '../../fitting/conic/state'
import { DEG, RAD, asin, atan2 } from '../../fitting/elementary'
import {
  earthHeliocentric, equatorialFromEcliptic, LIGHT_AU_PER_D, observerHeliocentric, type Planet, planetHeliocentric, PLANETS, SUN_GRAVITATION_AU3_PER_D2, sunBarycentric,
} from '../../fitting/earth'
import { cell, checkAgainst, readFixture, turnDeg } from './published'

const GEOCENTRE = { longitudeEastDeg: 0, rhoCosPhi: 0, rhoSinPhi: 0 }

function stateOf(evaluate: (jdTt: number, out: Float64Array) => void, jdTt: number): Float64Array {
  const out = new Float64Array(6)
  evaluate(jdTt, out)
  return out
}

describe('the Earth and the Sun by the series of VSOP2000', () => {
  const jd = 2400000.5 + 53411.52501161
  // A Julian date in one double is rounded, here by 2e-10 d: the places are carried over that time.
  const roundedOffDays = 53411.52501161 - (jd - 2400000.5)
  const componentOf = (evaluate: typeof earthHeliocentric, k: number) => {
    const state = stateOf(evaluate, jd)
    return k < 3 ? state[k]! + roundedOffDays * state[k + 3]! : state[k]!
  }
  const source = 'the test values of the IAU SOFA routine epv00 (ERFA test program)'
  const heliocentric = [-0.7757238809297706, 0.559805224136334, 0.2426998466481687, -0.010918918241473138, -0.01247187268440845, -0.005407569418065039]
  const barycentric = [-0.7714104440491112, 0.5598412061824172, 0.24259962777224525, -0.010918742681168233, -0.012465254617328616, -0.0054047731809662315]
  const names = ['x', 'y', 'z', 'vx', 'vy', 'vz']
  checkAgainst(source, heliocentric.map((expected, k) => (
    { quantity: `heliocentric ${names[k]} of the Earth`, expected, tolerance: 1e-13, computed: () => componentOf(earthHeliocentric, k) }
  )))
  checkAgainst(source, barycentric.map((expected, k) => (
    { quantity: `barycentric ${names[k]} of the Earth`, expected, tolerance: 1e-13, computed: () => componentOf(earthHeliocentric, k) + componentOf(sunBarycentric, k) }
  )))

  it.each(readFixture('earth/earth_and_sun.csv'))('agrees with ERFA 2.0 to 1e-12 au and 1e-14 au/d at JD $jd_tdb', (row) => {
    for (const [body, evaluate] of [['earth', earthHeliocentric], ['sun', sunBarycentric]] as const) {
      const state = stateOf(evaluate, cell(row, 'jd_tdb'))
      for (const [k, column] of ['x_au', 'y_au', 'z_au', 'vx_au_per_d', 'vy_au_per_d', 'vz_au_per_d'].entries()) {
        expect(Math.abs(state[k]! - cell(row, `${body}_${column}`)), `${body}_${column}`).toBeLessThanOrEqual(k < 3 ? 1e-12 : 1e-14)
      }
    }
  })
})

describe('the planets by mean elements', () => {
  it.each(readFixture('earth/planets.csv'))('agree with ERFA 2.0 to 1e-11 au: $planet at JD $jd_tdb', (row) => {
    expect(PLANETS).toContain(row.planet)
    const state = stateOf((jd, out) => planetHeliocentric(row.planet as Planet, jd, out), cell(row, 'jd_tdb'))
    for (const [k, column] of ['x_au', 'y_au', 'z_au'].entries()) expect(Math.abs(state[k]! - cell(row, column)), column).toBeLessThanOrEqual(1e-11)
  })
})

/** Direction and distance of a body seen from a station: d = r(t − τ) − E(t) − V·τ. */
function seenFrom(observer: ReturnType<typeof observerHeliocentric>, placeAt: (jdTt: number) => Vector): { raDeg: number, decDeg: number, distanceAu: number } {
  let lightTime = 0
  for (;;) {
    const r = placeAt(observer.jdTt - lightTime)
    const d = r.map((x, k) => x - observer.place[k]! - observer.sunVelocity[k]! * lightTime)
    const distanceAu = Math.sqrt(d[0]! * d[0]! + d[1]! * d[1]! + d[2]! * d[2]!)
    if (Math.abs(distanceAu / LIGHT_AU_PER_D - lightTime) < 1e-13) return { raDeg: RAD * atan2(d[1]!, d[0]!), decDeg: RAD * asin(d[2]! / distanceAu), distanceAu }
    lightTime = distanceAu / LIGHT_AU_PER_D
  }
}

describe('Ceres on 2000 January 1, 0h UT', () => {
  const start = {
    place: equatorialFromEcliptic([-2.377530298472460, 0.8007772252240262, 0.4628376138999674]),
    velocity: equatorialFromEcliptic([-3.605422185454561e-3, -1.057883338099071e-2, 3.379790360574805e-4]),
  }
  const seen = () => seenFrom(observerHeliocentric(GEOCENTRE, 2451544.5), jdTt => stateAfter(start, SUN_GRAVITATION_AU3_PER_D2, jdTt - 2451544.5).place)
  checkAgainst('an integrated planetary ephemeris, as stored in the test data of the library astroquery', [
    { quantity: 'right ascension (°)', expected: 188.7028, tolerance: 1e-4, computed: () => turnDeg(seen().raDeg, 0) + 360 },
    { quantity: 'declination (°)', expected: 9.09829, tolerance: 1e-4, computed: () => seen().decDeg },
    { quantity: 'distance (au)', expected: 2.2631512101, tolerance: 2e-6, computed: () => seen().distanceAu },
  ])
})

describe('the whole path from elements to an astrometric place', () => {
  const rows = readFixture('earth/astrometric_places.csv')

  it.each(rows)('agrees with astropy 5.2 to 1 mas beyond 0.25 au: $body at JD $jd_utc', (row) => {
    const eccentricity = cell(row, 'eccentricity')
    const atPerihelion = stateFromElements({
      semiLatusRectum: cell(row, 'perihelion_au') * (1 + eccentricity),
      eccentricity,
      inclinationRad: cell(row, 'inclination_deg') * DEG,
      nodeRad: cell(row, 'node_deg') * DEG,
      argumentOfPeriapsisRad: cell(row, 'perihelion_argument_deg') * DEG,
      trueAnomalyRad: 0,
    }, SUN_GRAVITATION_AU3_PER_D2)
    const station = { longitudeEastDeg: cell(row, 'longitude_east_deg'), rhoCosPhi: cell(row, 'rho_cos_phi'), rhoSinPhi: cell(row, 'rho_sin_phi') }
    const seen = seenFrom(observerHeliocentric(station, cell(row, 'jd_utc')), jdTt => (
      equatorialFromEcliptic(stateAfter(atPerihelion, SUN_GRAVITATION_AU3_PER_D2, jdTt - cell(row, 'perihelion_jd_tt')).place)))
    const masPerDeg = 3600e3
    expect(Math.abs(turnDeg(seen.raDeg, cell(row, 'ra_deg'))) * Math.cos(seen.decDeg * DEG) * masPerDeg).toBeLessThanOrEqual(1)
    expect(Math.abs(seen.decDeg - cell(row, 'dec_deg')) * masPerDeg).toBeLessThanOrEqual(1)
    expect(Math.abs(seen.distanceAu - cell(row, 'distance_au'))).toBeLessThanOrEqual(5e-9)
  })

  it('is held at both ends: bodies as near as 0.27 au and as far as 3.9 au', () => {
    const distances = rows.map(row => cell(row, 'distance_au'))
    expect(Math.min(...distances)).toBeLessThan(0.27)
    expect(Math.max(...distances)).toBeGreaterThan(3.9)
  })
})
