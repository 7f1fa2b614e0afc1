import { describe, expect, it } from 'vitest'
import type { StateVectors } from '../../fitting/conic'
import { constantsFromState, elementsFromState, lengthOf, meanFromTrueRad, meanMotion, stateFromElements } from '../../fitting/conic'
import { checkAgainst } from './published'

const DEG = Math.PI / 180

/** A state's elements and constants, with the axis and period of a bound orbit. */
function reduce(state: StateVectors, gravitationalParameter: number) {
  const elements = elementsFromState(state, gravitationalParameter)
  const constants = constantsFromState(state, gravitationalParameter)
  const semiMajorAxis = -gravitationalParameter / (2 * constants.specificEnergy)
  return { ...elements, ...constants, semiMajorAxis, h: lengthOf(constants.angularMomentum), eVector: constants.laplaceRungeLenz.map(a => a / gravitationalParameter) }
}

/** e² = 1 + 2εh²/μ². */
function eccentricityMismatch(state: StateVectors, gravitationalParameter: number): number {
  const { specificEnergy, h, eccentricity } = reduce(state, gravitationalParameter)
  return Math.abs(eccentricity ** 2 - (1 + 2 * specificEnergy * h ** 2 / gravitationalParameter ** 2))
}

describe('a state of a satellite', () => {
  const state: StateVectors = { place: [-6045, -3490, 2500], velocity: [-3.457, 6.618, 2.533] }
  const mu = 398600
  const of = () => reduce(state, mu)
  checkAgainst('Curtis 2014, Orbital Mechanics for Engineering Students, 3rd ed., Example 4.3 (results from memory)', [
    { quantity: 'h (km²/s)', expected: 58310, tolerance: 6, computed: () => of().h },
    { quantity: 'i (deg)', expected: 153.2, tolerance: 0.06, computed: () => of().inclinationRad / DEG },
    { quantity: 'Ω (deg)', expected: 255.3, tolerance: 0.06, computed: () => of().nodeRad / DEG },
    { quantity: 'e', expected: 0.1712, tolerance: 6e-5, computed: () => of().eccentricity },
    { quantity: 'ω (deg)', expected: 20.07, tolerance: 0.006, computed: () => of().argumentOfPeriapsisRad / DEG },
    { quantity: 'ν (deg)', expected: 28.45, tolerance: 0.006, computed: () => of().trueAnomalyRad / DEG },
    { quantity: 'a (km)', expected: 8788, tolerance: 1, computed: () => of().semiMajorAxis },
    { quantity: 'period (h)', expected: 2.278, tolerance: 6e-4, computed: () => 2 * Math.PI / Math.sqrt(mu / of().semiMajorAxis ** 3) / 3600 },
    { quantity: 'ε (km²/s²)', expected: -22.6783, tolerance: 0.002, standing: 'own', computed: () => of().specificEnergy },
  ])
  it('keeps e² = 1 + 2εh²/μ²', () => {
    expect(eccentricityMismatch(state, mu)).toBeLessThan(1e-14)
  })
})

describe('a state on a long ellipse', () => {
  const state: StateVectors = { place: [6524.834, 6862.875, 6448.296], velocity: [4.901327, 5.533756, -1.976341] }
  const mu = 398600.4418
  const of = () => reduce(state, mu)
  checkAgainst('Vallado 2013, Fundamentals of Astrodynamics and Applications, 4th ed., Example 2-5 (e-vector from memory)', [
    { quantity: 'p (km)', expected: 11067.79, tolerance: 0.01, computed: () => of().semiLatusRectum },
    { quantity: 'a (km)', expected: 36127.343, tolerance: 0.1, computed: () => of().semiMajorAxis },
    { quantity: 'e', expected: 0.832853, tolerance: 1e-6, computed: () => of().eccentricity },
    { quantity: 'i (deg)', expected: 87.87, tolerance: 0.001, computed: () => of().inclinationRad / DEG },
    { quantity: 'Ω (deg)', expected: 227.898, tolerance: 0.001, computed: () => of().nodeRad / DEG },
    { quantity: 'ω (deg)', expected: 53.38, tolerance: 0.006, computed: () => of().argumentOfPeriapsisRad / DEG },
    { quantity: 'ν (deg)', expected: 92.335, tolerance: 6e-4, computed: () => of().trueAnomalyRad / DEG },
    { quantity: 'ε (km²/s²)', expected: -5.516604, tolerance: 2e-5, computed: () => of().specificEnergy },
    { quantity: 'e-vector, x', expected: -0.3146, tolerance: 6e-5, computed: () => of().eVector[0]! },
    { quantity: 'e-vector, y', expected: -0.38523, tolerance: 6e-6, computed: () => of().eVector[1]! },
    { quantity: 'e-vector, z', expected: 0.66804, tolerance: 6e-6, computed: () => of().eVector[2]! },
  ])
  it('keeps e² = 1 + 2εh²/μ²', () => {
    expect(eccentricityMismatch(state, mu)).toBeLessThan(1e-14)
  })

  const back = () => stateFromElements({ semiLatusRectum: 11067.79, eccentricity: 0.83285, inclinationRad: 87.87 * DEG, nodeRad: 227.89 * DEG, argumentOfPeriapsisRad: 53.38 * DEG, trueAnomalyRad: 92.335 * DEG }, mu)
  checkAgainst('Vallado 2013, Fundamentals of Astrodynamics and Applications, 4th ed., Example 2-6 (results from memory)', [
    { quantity: 'x (km)', expected: 6525.344, tolerance: 0.06, computed: () => back().place[0] },
    { quantity: 'y (km)', expected: 6861.535, tolerance: 0.06, computed: () => back().place[1] },
    { quantity: 'z (km)', expected: 6449.125, tolerance: 0.06, computed: () => back().place[2] },
    { quantity: 'vx (km/s)', expected: 4.902276, tolerance: 6e-5, computed: () => back().velocity[0] },
    { quantity: 'vy (km/s)', expected: 5.533124, tolerance: 6e-5, computed: () => back().velocity[1] },
    { quantity: 'vz (km/s)', expected: -1.975709, tolerance: 6e-5, computed: () => back().velocity[2] },
  ])
})

describe('(1) Ceres at JD 2458849.5 TDB', () => {
  const mu = 0.295912208284120e-3
  const obliquity = 84381.448 / 3600 * DEG
  const toEcliptic = ([x, y, z]: readonly [number, number, number]) =>
    [x, Math.cos(obliquity) * y + Math.sin(obliquity) * z, -Math.sin(obliquity) * y + Math.cos(obliquity) * z] as const
  const state: StateVectors = {
    place: toEcliptic([1.007608869613381, -2.390064275223502, -1.332124522752402]),
    velocity: toEcliptic([9.201724467227128e-3, 3.370381135398406e-3, -2.850337057661093e-4]),
  }
  const of = () => reduce(state, mu)
  const q = () => of().semiLatusRectum / (1 + of().eccentricity)
  checkAgainst('JPL, orbit solution no. 48 of (1) Ceres, 2021 April 13', [
    { quantity: 'e', expected: 0.07687465013145, tolerance: 3e-9, computed: () => of().eccentricity },
    { quantity: 'a (au)', expected: 2.769289292143, tolerance: 2e-8, computed: () => of().semiMajorAxis },
    { quantity: 'q (au)', expected: 2.556401146697, tolerance: 2e-8, computed: q },
    { quantity: 'i (deg)', expected: 10.59127767086, tolerance: 1e-8, computed: () => of().inclinationRad / DEG },
    { quantity: 'Ω (deg)', expected: 80.30119019175, tolerance: 1e-8, computed: () => of().nodeRad / DEG },
    { quantity: 'ω (deg)', expected: 73.80896808746, tolerance: 5e-6, computed: () => of().argumentOfPeriapsisRad / DEG },
    { quantity: 'M (deg)', expected: 130.3159688201, tolerance: 5e-6, computed: () => meanFromTrueRad(of().trueAnomalyRad, of().eccentricity) / DEG },
    { quantity: 'h (au²/d)', expected: 0.028541613, tolerance: 1e-9, computed: () => of().h },
    { quantity: 'n (deg/d)', expected: 0.213870839, tolerance: 1e-8, computed: () => meanMotion({ periapsisDistance: q(), eccentricity: of().eccentricity, gravitationalParameter: mu }) / DEG },
  ])
})
