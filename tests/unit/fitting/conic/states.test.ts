import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { SpatialElements } from '../../../../fitting/conic'
import {
  constantsFromConic, constantsFromState, dot, elementsFromState, largestDrift, lengthOf, placeAtTime, solveKeplerInto, stateAfter, stateFromEccentric, stateFromElements,
} from '../../../../fitting/conic'

const runs = { seed: 21, numRuns: 2000 }
const turn = fc.double({ min: 0, max: 2 * Math.PI, noNaN: true })
const conic: fc.Arbitrary<SpatialElements> = fc.record({
  semiLatusRectum: fc.double({ min: 0.1, max: 30, noNaN: true }),
  eccentricity: fc.oneof(fc.double({ min: 0.01, max: 0.99, noNaN: true }), fc.constant(1), fc.double({ min: 1.001, max: 4, noNaN: true })),
  inclinationRad: fc.double({ min: 0.05, max: Math.PI - 0.05, noNaN: true }),
  nodeRad: turn,
  argumentOfPeriapsisRad: turn,
  trueAnomalyRad: fc.double({ min: -1.7, max: 1.7, noNaN: true }),
})
const MU = 2.5
const apart = (a: number, b: number) => Math.abs(Math.atan2(Math.sin(a - b), Math.cos(a - b)))

describe('states', () => {
  it('give their elements back on every conic', () => {
    fc.assert(fc.property(conic, (elements) => {
      const back = elementsFromState(stateFromElements(elements, MU), MU)
      expect(Math.abs(back.semiLatusRectum / elements.semiLatusRectum - 1)).toBeLessThanOrEqual(1e-13)
      expect(Math.abs(back.eccentricity - elements.eccentricity)).toBeLessThanOrEqual(1e-13)
      expect(Math.abs(back.inclinationRad - elements.inclinationRad)).toBeLessThanOrEqual(1e-13)
      expect(apart(back.nodeRad, elements.nodeRad)).toBeLessThanOrEqual(1e-12)
      expect(apart(back.argumentOfPeriapsisRad, elements.argumentOfPeriapsisRad)).toBeLessThanOrEqual(1e-11)
      expect(apart(back.trueAnomalyRad, elements.trueAnomalyRad)).toBeLessThanOrEqual(1e-11)
    }), runs)
  })

  it('there and back in time is the same state', () => {
    fc.assert(fc.property(conic, fc.double({ min: -3, max: 3, noNaN: true }), (elements, elapsed) => {
      const state = stateFromElements(elements, MU)
      const back = stateAfter(stateAfter(state, MU, elapsed), MU, -elapsed)
      const scale = lengthOf(state.place)
      for (const axis of [0, 1, 2] as const) expect(Math.abs(back.place[axis] - state.place[axis])).toBeLessThanOrEqual(1e-9 * scale)
    }), runs)
  })

  it('of a circle in the plane of the frame have node and periapsis at 0', () => {
    const elements = elementsFromState({ place: [0, 2, 0], velocity: [-Math.sqrt(MU / 2), 0, 0] }, MU)
    expect(elements).toMatchObject({ inclinationRad: 0, nodeRad: 0, argumentOfPeriapsisRad: 0, trueAnomalyRad: expect.closeTo(Math.PI / 2, 12) })
  })
})

describe('constants of motion', () => {
  it('from the conic and from any state on it are the same', () => {
    fc.assert(fc.property(conic, (elements) => {
      const fromConic = constantsFromConic(elements, MU)
      const fromState = constantsFromState(stateFromElements(elements, MU), MU)
      expect(Math.abs(fromConic.specificEnergy - fromState.specificEnergy)).toBeLessThanOrEqual(1e-13 * MU / elements.semiLatusRectum * (1 + elements.eccentricity) ** 2)
      for (const axis of [0, 1, 2] as const) {
        expect(Math.abs(fromConic.angularMomentum[axis] - fromState.angularMomentum[axis])).toBeLessThanOrEqual(1e-13 * lengthOf(fromConic.angularMomentum))
        expect(Math.abs(fromConic.laplaceRungeLenz[axis] - fromState.laplaceRungeLenz[axis])).toBeLessThanOrEqual(3e-13 * MU * (1 + elements.eccentricity))
      }
    }), runs)
  })

  it('obey A·h = 0 and A² = μ² + 2εh²', () => {
    fc.assert(fc.property(conic, (elements) => {
      const { specificEnergy, angularMomentum, laplaceRungeLenz } = constantsFromState(stateFromElements(elements, MU), MU)
      const h2 = dot(angularMomentum, angularMomentum)
      expect(Math.abs(dot(laplaceRungeLenz, angularMomentum))).toBeLessThanOrEqual(1e-12 * MU * Math.sqrt(h2) * (1 + elements.eccentricity))
      expect(Math.abs(dot(laplaceRungeLenz, laplaceRungeLenz) - MU * MU - 2 * specificEnergy * h2)).toBeLessThanOrEqual(1e-11 * MU * MU * (1 + elements.eccentricity) ** 2)
    }), runs)
  })

  it('drift by rounding only along an ellipse stepped by Kepler\'s equation', () => {
    const anomaly = new Float64Array(3)
    for (const eccentricity of [0, 0.3, 0.9, 0.999]) {
      const states = Array.from({ length: 200 }, (_, n) => {
        solveKeplerInto(0.031 * n, eccentricity, anomaly)
        return stateFromEccentric({ semiMajorAxis: 3, eccentricity, gravitationalParameter: MU }, anomaly[1]!, anomaly[2]!)
      })
      expect(largestDrift(states, MU)).toBeLessThanOrEqual(1e-12)
    }
  })

  it('show a drift where the states do not belong to one conic', () => {
    const ellipse = { semiMajorAxis: 3, eccentricity: 0.3, gravitationalParameter: MU }
    const first = stateFromEccentric(ellipse, 0, 1)
    const other = stateFromEccentric({ ...ellipse, semiMajorAxis: 3.003 }, 1, 0)
    expect(largestDrift([first, other], MU)).toBeGreaterThan(1e-4)
    expect(largestDrift([first], MU)).toBe(0)
    expect(largestDrift([], MU)).toBe(0)
  })

  it('hold along a hyperbola followed in time', () => {
    const e = 1.8
    const states = [-4, -1, 0, 0.5, 3, 20].map((t) => {
      const place = placeAtTime({ periapsisDistance: 1, eccentricity: e, gravitationalParameter: MU }, t)
      return stateFromElements({ semiLatusRectum: 1 + e, eccentricity: e, inclinationRad: 0.4, nodeRad: 1, argumentOfPeriapsisRad: 2, trueAnomalyRad: place.trueAnomalyRad }, MU)
    })
    expect(largestDrift(states, MU)).toBeLessThanOrEqual(1e-12)
  })
})
