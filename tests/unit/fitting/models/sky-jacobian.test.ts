import { describe, expect, it } from 'vitest'
import { atanh, cos, log, PI, sin } from '../../../../fitting/elementary'
import { keplerPath } from '../../../../fitting/models/relative-kepler'
import { linePath, stillPath } from '../../../../fitting/models/relative-line'
import { skyProblem, skyRows } from '../../../../fitting/models/relative-problem'
import { prepareSkyMeasures } from '../../../../fitting/models/sky-measure'
import type { SkyPath } from '../../../../fitting/models/sky-path'
import type { RelativeMeasure } from '../../../../fitting/types'
import { centralDifferences } from '../../../builders/central-differences'

const MEASURES: RelativeMeasure[] = [
  { form: 'polar' as const, thetaRad: 0.7, rhoArcsec: 1.2, sigmaThetaRad: 0.01, sigmaRhoArcsec: 0.02, correlation: 0.4 },
  { form: 'polar' as const, thetaRad: 2.1, rhoArcsec: 0.9, sigmaThetaRad: 0.2, sigmaRhoArcsec: 0.03, correlation: -0.3 },
  { form: 'polar' as const, thetaRad: 3.9, rhoArcsec: 0.8, sigmaThetaRad: 0.02, sigmaRhoArcsec: 0.03, quadrant: 'ambiguous' as const },
  { form: 'polar' as const, thetaRad: 5.1, sigmaThetaRad: 0.03 },
  { form: 'polar' as const, thetaRad: 1.1, sigmaThetaRad: 0.03, quadrant: 'ambiguous' as const },
  { form: 'polar' as const, rhoArcsec: 1.1, sigmaRhoArcsec: 0.05 },
  { form: 'rectangular' as const, eastArcsec: -0.4, northArcsec: 0.8, sigmaEastArcsec: 0.01, sigmaNorthArcsec: 0.03, correlation: 0.6 },
].map((position, i) => ({ id: `m${i}`, observer: 'Tasque', epochYr: 1990 + 7.3 * i, position, weightFactor: 1 + i / 4 }))

function worstDifference(path: SkyPath, values: number[]): number {
  const { used } = prepareSkyMeasures(MEASURES, {})
  const problem = skyProblem(path, skyRows(used))
  const residuals = new Float64Array(problem.rows)
  const jacobian = new Float64Array(problem.rows * problem.parameters)
  expect(problem.evaluate(Float64Array.from(values), residuals, jacobian)).toBe(true)
  const numeric = centralDifferences(problem, values, 1e-6)
  let worst = 0
  for (let j = 0; j < problem.parameters; j++) {
    let size = 0
    for (let i = 0; i < problem.rows; i++) size = Math.max(size, Math.abs(jacobian[i * problem.parameters + j]!))
    for (let i = 0; i < problem.rows; i++) {
      worst = Math.max(worst, Math.abs(jacobian[i * problem.parameters + j]! - numeric[i * problem.parameters + j]!) / size)
    }
  }
  return worst
}

const keplerValues = (e: number, varpi: number) => [log(38), atanh(e) * cos(varpi), atanh(e) * sin(varpi), 0.9, -0.4, 0.3, 0.8]

describe('the analytic Jacobian of rows on the sky agrees with central differences', () => {
  it.each([0, 1e-5, 0.02, 0.3, 0.7, 0.95])('for an orbit of e = %d', (e) => {
    for (const varpi of [0.3, 2, -2.5]) expect(worstDifference(keplerPath(2010), keplerValues(e, varpi))).toBeLessThan(1e-6)
  })

  it('for orbits seen face on, from both sides', () => {
    const [lnP, u, v] = keplerValues(0.4, 1)
    expect(worstDifference(keplerPath(2010), [lnP!, u!, v!, 1, 0, 0, 1])).toBeLessThan(1e-6)
    expect(worstDifference(keplerPath(2010), [lnP!, u!, v!, 1, 0, 0, -1])).toBeLessThan(1e-6)
  })

  it('for a straight line and for a still companion', () => {
    expect(worstDifference(linePath(2010), [0.8, 0.5, -0.02, 0.03])).toBeLessThan(1e-8)
    expect(worstDifference(stillPath(), [0.8, 0.5])).toBeLessThan(1e-8)
  })
})

describe('the path of an orbit', () => {
  it('is not defined beyond e = 0.9999', () => {
    expect(keplerPath(2000).prepare([3, 4, 3.1, 1, 0, 0, 1])).toBe(false)
  })

  it('comes back after one period', () => {
    const path = keplerPath(2000)
    const [first, second] = [new Float64Array(16), new Float64Array(16)]
    path.prepare(keplerValues(0.8, PI / 3))
    path.at(2007, first, false)
    path.at(2045, second, false)
    expect(second[0]).toBeCloseTo(first[0]!, 12)
    expect(second[1]).toBeCloseTo(first[1]!, 12)
  })
})
