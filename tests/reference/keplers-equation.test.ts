import { describe } from 'vitest'
import type { StateVectors } from '../../fitting/conic'
import {
  eccentricAnomalyRad, eccentricFromTrueRad, hyperbolicAnomalyRad, meanFromTrueRad, placeAtTime, solveBarker, stateAfter, stateFromElements, trueFromMeanRad,
} from '../../fitting/conic'
import { checkAgainst } from './published'

const DEG = Math.PI / 180
const K2 = 0.01720209895 ** 2
const EARTH = 398600.4418

describe('Kepler\'s equation of the ellipse', () => {
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., Examples 30.a p. 196 and 30.b p. 199 (e = 0.1, M = 5°)', [
    { quantity: 'E (deg, 6 decimals)', expected: 5.554589, tolerance: 5e-7, computed: () => eccentricAnomalyRad(5 * DEG, 0.1) / DEG },
    { quantity: 'E (deg, 9 decimals)', expected: 5.554589254, tolerance: 5e-10, computed: () => eccentricAnomalyRad(5 * DEG, 0.1) / DEG },
  ])
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., p. 205 (e = 0.99, M = 0.2 rad)', [
    { quantity: 'E (rad)', expected: 1.066997365282, tolerance: 5e-13, computed: () => eccentricAnomalyRad(0.2, 0.99) },
    { quantity: 'E (deg)', expected: 61.13444578, tolerance: 5e-9, computed: () => eccentricAnomalyRad(0.2, 0.99) / DEG },
  ])
  checkAgainst('Vallado 2013, Fundamentals of Astrodynamics and Applications, 4th ed., Example 2-1 (e = 0.4, M = 235.4°)', [
    { quantity: 'E (deg)', expected: 220.5120747675, tolerance: 5e-11, computed: () => eccentricAnomalyRad(235.4 * DEG, 0.4) / DEG },
  ])
  checkAgainst('Curtis 2014, Orbital Mechanics for Engineering Students, 3rd ed., Examples 3.1 and 3.2 (e = 0.37255, M = 3.6029 rad)', [
    { quantity: 'E (rad)', expected: 3.4794, tolerance: 5e-5, computed: () => eccentricAnomalyRad(3.6029, 0.37255) },
    { quantity: 'ν (deg)', expected: 193.2, tolerance: 0.05, computed: () => trueFromMeanRad(3.6029, 0.37255) / DEG },
  ])
})

describe('Kepler\'s equation of the hyperbola', () => {
  checkAgainst('Curtis 2014, Orbital Mechanics for Engineering Students, 3rd ed., Example 3.5 (first from memory)', [
    { quantity: 'H at e = 2.7696, M = 40.69', expected: 3.46309, tolerance: 5e-6, computed: () => hyperbolicAnomalyRad(40.69, 2.7696) },
    { quantity: 'H at e = 2.7696, M = 11.279', expected: 2.2927, tolerance: 5e-5, computed: () => hyperbolicAnomalyRad(11.279, 2.7696) },
    { quantity: 'ν (deg) at e = 2.7696, M = 11.279', expected: 100, tolerance: 0.005, computed: () => trueFromMeanRad(11.279, 2.7696) / DEG },
  ])
  checkAgainst('a general-purpose astrodynamics library\'s test', [
    { quantity: 'ν (deg) at e = 1.1, M = 11.279', expected: 153.51501, tolerance: 5e-5, computed: () => trueFromMeanRad(11.279, 1.1) / DEG },
  ])
})

describe('Barker\'s equation of the parabola', () => {
  const barker = () => solveBarker(2 * Math.sqrt(EARTH / 25512 ** 3) * 53.7874 * 60)
  checkAgainst('Vallado 2013, Fundamentals of Astrodynamics and Applications, 4th ed., inputs of Example 2-2, closed form', [
    { quantity: 'tan(ν/2)', expected: 0.817751, tolerance: 5e-7, standing: 'own', computed: barker },
    { quantity: 'ν (deg)', expected: 78.549, tolerance: 0.2, standing: 'own', computed: () => 2 * Math.atan(barker()) / DEG },
  ])
  const earthParabola = { periapsisDistance: 6600, eccentricity: 1, gravitationalParameter: EARTH }
  checkAgainst('Curtis 2014, Orbital Mechanics for Engineering Students, 3rd ed., problem 3.15', [
    { quantity: 'ν (deg) 0.8897/2 h after perigee', expected: 90, tolerance: 0.009, computed: () => placeAtTime(earthParabola, 0.8897 / 2 * 3600).trueAnomalyRad / DEG },
    { quantity: 'r (km) 36 h after perigee', expected: 304700, tolerance: 30, computed: () => placeAtTime(earthParabola, 36 * 3600).radius },
  ])
  const stonehouse = () => placeAtTime({ periapsisDistance: 1.487469, eccentricity: 1, gravitationalParameter: K2 }, 2451030.5 - 2450917.9358)
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., Example 34.a p. 243 (comet C/1998 H1)', [
    { quantity: 'ν (deg)', expected: 66.78862, tolerance: 5e-6, computed: () => stonehouse().trueAnomalyRad / DEG },
    { quantity: 'r (au)', expected: 2.133911, tolerance: 5e-7, computed: () => stonehouse().radius },
  ])
})

describe('motion on conics near the parabola', () => {
  // Meeus 1998, table p. 247: q (au), e, t (days from perihelion), ν (deg), r (au).
  const rows: [number, number, number, number, number][] = [
    [0.921326, 1, 138.4783, 102.74426, 2.364192],
    [0.1, 0.987, 254.9, 164.50029, 4.063777],
    [0.123456, 0.99997, -30.47, 221.9119 - 360, 0.965053],
    [3.363943, 1.05731, 1237.1, 109.40598, 10.668551],
    [0.5871018, 0.9672746, 20, 52.85331, 0.729116],
    [0.5871018, 0.9672746, 0, 0, 0.5871018],
  ]
  for (const [q, e, t, nu, r] of rows) {
    const place = () => placeAtTime({ periapsisDistance: q, eccentricity: e, gravitationalParameter: K2 }, t)
    checkAgainst(`Meeus 1998, Astronomical Algorithms, 2nd ed., table p. 247 (q = ${q}, e = ${e}, t = ${t} d)`, [
      { quantity: 'ν (deg)', expected: nu, tolerance: 6e-6, computed: () => place().trueAnomalyRad / DEG },
      { quantity: 'r (au)', expected: r, tolerance: 6e-7, computed: () => place().radius },
    ])
  }
})

describe('true anomalies', () => {
  // Schlesinger & Udick 1912: e, M (deg), ν (deg).
  const rows = [[0.05, 10, 11.06], [0.06, 30, 33.67], [0.04, 120, 123.87], [0.14, 65, 80.5], [0.19, 21, 30.94], [0.35, 65, 105.71], [0.48, 180, 180], [0.75, 125, 167.57]] as const
  for (const [e, m, nu] of rows) {
    checkAgainst(`Schlesinger & Udick 1912, Tables for the true anomaly in elliptic orbits, Publ. Allegheny Obs. 2, 155 (e = ${e}, M = ${m}°)`, [
      { quantity: 'ν (deg)', expected: nu, tolerance: 0.0056, computed: () => trueFromMeanRad(m * DEG, e) / DEG },
    ])
  }

  const e = Math.sin((14 + 12 / 60 + 1.87 / 3600) * DEG)
  const v1 = (310 + 55 / 60 + 29.64 / 3600) * DEG
  const v2 = (318 + 30 / 60 + 23.37 / 3600) * DEG
  checkAgainst('Gauss 1809, Theoria motus corporum coelestium, art. 97 (Juno)', [
    { quantity: 'E (deg) at ν = 310.924900°', expected: 320.8709806, tolerance: 1.5e-5, computed: () => eccentricFromTrueRad(v1, e) / DEG + 360 * Number(eccentricFromTrueRad(v1, e) < 0) },
    { quantity: 'E (deg) at ν = 318.506492°', expected: 327.1399028, tolerance: 1.5e-5, computed: () => eccentricFromTrueRad(v2, e) / DEG + 360 * Number(eccentricFromTrueRad(v2, e) < 0) },
  ])
  checkAgainst('Gauss 1809, Theoria motus corporum coelestium, arts. 13 and 76 (Juno; from memory)', [
    { quantity: 'daily motion (arcsec)', expected: 824.7989, tolerance: 0.003, computed: () => (meanFromTrueRad(v2, e) - meanFromTrueRad(v1, e)) / 21.93391 / DEG * 3600 },
  ])
})

describe('motion of a state', () => {
  const before: StateVectors = { place: [1131.34, -2282.343, 6672.423], velocity: [-5.64305, 4.30333, 2.42879] }
  const after = () => stateAfter(before, EARTH, 2400)
  checkAgainst('Vallado 2013, Fundamentals of Astrodynamics and Applications, 4th ed., Example 2-4 (40 min later)', [
    { quantity: 'x (km)', expected: -4219.7527, tolerance: 0.003, computed: () => after().place[0] },
    { quantity: 'y (km)', expected: 4363.0292, tolerance: 0.003, computed: () => after().place[1] },
    { quantity: 'z (km)', expected: -3958.7666, tolerance: 0.003, computed: () => after().place[2] },
    { quantity: 'vx (km/s)', expected: 3.689866, tolerance: 3e-6, computed: () => after().velocity[0] },
    { quantity: 'vy (km/s)', expected: -1.916735, tolerance: 3e-6, computed: () => after().velocity[1] },
    { quantity: 'vz (km/s)', expected: -6.112511, tolerance: 3e-6, computed: () => after().velocity[2] },
  ])

  const a = 17.9400782
  const ellipse = { semiLatusRectum: a * (1 - 0.96727426 ** 2), eccentricity: 0.96727426, inclinationRad: 0, nodeRad: 0, argumentOfPeriapsisRad: 0 }
  const speedAt = (trueAnomalyRad: number) => Math.hypot(...stateFromElements({ ...ellipse, trueAnomalyRad }, 42.1219 ** 2 / 2).velocity)
  checkAgainst('Meeus 1998, Astronomical Algorithms, 2nd ed., Example 33.c p. 238 (comet Halley)', [
    { quantity: 'speed (km/s) at 1 au', expected: 41.53, tolerance: 0.005, computed: () => speedAt(Math.acos((ellipse.semiLatusRectum - 1) / ellipse.eccentricity)) },
    { quantity: 'speed (km/s) at perihelion', expected: 54.52, tolerance: 0.005, computed: () => speedAt(0) },
    { quantity: 'speed (km/s) at aphelion', expected: 0.91, tolerance: 0.005, computed: () => speedAt(Math.PI) },
  ])
})
