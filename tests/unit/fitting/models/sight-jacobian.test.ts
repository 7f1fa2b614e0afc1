import { describe, expect, it } from 'vitest'
import { earthHeliocentric } from '../../../../fitting/earth'
import { planetMotion } from '../../../../fitting/models/planet-motion'
import { parabolaMap, parabolaNear, sightMap, sightOfState } from '../../../../fitting/models/sight-frame'
import { sunMotion } from '../../../../fitting/models/line-of-sight'
import { sightProblem } from '../../../../fitting/models/sight-rows'
import { prepareSightings } from '../../../../fitting/models/sighting'
import { middleReference } from '../../../../fitting/search/settle-sights'
import { centralDifferences } from '../../../builders/central-differences'
import { ORBIT_CLASSES, simulatedSightings } from '../../../builders/simulated-sightings'

/** Largest difference of two Jacobians, column by column, in parts of the column's length. */
function largestDifference(a: Float64Array, b: Float64Array, columns: number): number {
  let largest = 0
  for (let j = 0; j < columns; j++) {
    let [length, apart] = [0, 0]
    for (let i = j; i < a.length; i += columns) {
      length += a[i]! * a[i]!
      apart += (a[i]! - b[i]!) ** 2
    }
    largest = Math.max(largest, Math.sqrt(apart / length))
  }
  return largest
}

describe.each(ORBIT_CLASSES)('rows of directions to a body on a %s orbit', (orbitClass) => {
  const { measures, state, epochJdTt } = simulatedSightings({ seed: 77, orbitClass })
  const { used } = prepareSightings(measures.map((measure, i) => ({ ...measure, correlation: 0.5, sigmaDecArcsec: 1 + 0.1 * i })), {})
  const earth = new Float64Array(6)
  earthHeliocentric(epochJdTt, earth)
  const reference = { ...middleReference(used), jdTt: epochJdTt, earth: Array.from(earth) }
  const values = sightOfState(reference, state)

  it('have the Jacobian that differences show, under the Sun alone', () => {
    const problem = sightProblem(used, sightMap(reference), sunMotion(epochJdTt))
    const [rows, jacobian] = [new Float64Array(problem.rows), new Float64Array(problem.rows * 6)]
    problem.evaluate(values, rows, jacobian)
    expect(largestDifference(jacobian, centralDifferences(problem, values, 1e-4), 6)).toBeLessThan(2e-6)
  })

  it('have the Jacobian that differences show, with the planets', () => {
    const problem = sightProblem(used, sightMap(reference), planetMotion(epochJdTt))
    const [rows, jacobian] = [new Float64Array(problem.rows), new Float64Array(problem.rows * 6)]
    problem.evaluate(values, rows, jacobian)
    expect(largestDifference(jacobian, centralDifferences(problem, values, 1e-5), 6)).toBeLessThan(1e-3)
  })

  it('have the Jacobian that differences show, with a parabola held', () => {
    const near = parabolaNear(reference, state)
    const problem = sightProblem(used, parabolaMap(near.reference), sunMotion(epochJdTt))
    const [rows, jacobian] = [new Float64Array(problem.rows), new Float64Array(problem.rows * 5)]
    problem.evaluate(near.start, rows, jacobian)
    expect(largestDifference(jacobian, centralDifferences(problem, near.start, 1e-4), 5)).toBeLessThan(2e-6)
  })
})
