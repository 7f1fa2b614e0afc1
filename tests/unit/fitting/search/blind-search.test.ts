import { describe, expect, it } from 'vitest'
import { fitOrbit, type FitResult, type FitState, type RelativeMeasure } from '../../../../fitting'
import type { CampbellElements } from '../../../../fitting/conic/ephemeris'
import { thieleInnesFromCampbell } from '../../../../fitting/conic/thiele-innes'
import { atanh, cos, log, PI, sin } from '../../../../fitting/elementary'
import { RELATIVE_KEPLER_NAMES, keplerPath } from '../../../../fitting/models/relative-kepler'
import { skyProblem, skyRows } from '../../../../fitting/models/relative-problem'
import { prepareSkyMeasures } from '../../../../fitting/models/sky-measure'
import { polish, startOf } from '../../../../fitting/search/polish'
import { ProjectedOrbit } from '../../../../fitting/search/projected-orbit'
import { coarseGrid, localMinima, scan, scanPeriods } from '../../../../fitting/search/scan'
import { searchPoints } from '../../../../fitting/search/search-points'
import { simulatedSystem, type SystemOptions } from '../../../builders/double-star-systems'

/** The state of a true orbit, for the best χ² known. */
function trueState(truth: CampbellElements, measures: RelativeMeasure[]): FitState {
  const epochs = measures.map((measure) => measure.epochYr)
  const referenceEpochYr = (Math.min(...epochs) + Math.max(...epochs)) / 2
  const varpi = (2 * PI * (truth.periastronTimeYr - referenceEpochYr)) / truth.periodYr
  const { a, b, f, g } = thieleInnesFromCampbell({ ...truth, argumentOfPeriastronRad: truth.argumentOfPeriastronRad - varpi })
  const s = atanh(truth.eccentricity)
  return { model: 'kepler', names: [...RELATIVE_KEPLER_NAMES], values: [log(truth.periodYr), s * cos(varpi), s * sin(varpi), a, b, f, g], covariance: null, referenceEpochYr }
}

function fit(measures: RelativeMeasure[], shortestPeriodYr: number, state?: FitState): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures, settings: { shortestPeriodYr }, start: state && { state } })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

/** Seeds whose blind χ² is more than 1 % above the better of blind and started at the truth. */
function missedSeeds(options: Omit<SystemOptions, 'seed'>, count: number, shortestPart = 6): number[] {
  return Array.from({ length: count }, (_, i) => i + 1).filter((seed) => {
    const { truth, measures } = simulatedSystem({ ...options, seed })
    const epochs = measures.map((measure) => measure.epochYr)
    const shortest = (Math.max(...epochs) - Math.min(...epochs)) / shortestPart
    const blind = fit(measures, shortest).statistics.chiSquare
    const best = Math.min(blind, fit(measures, shortest, trueState(truth, measures)).statistics.chiSquare)
    return blind > 1.01 * best
  })
}

describe('the search without a starting guess', () => {
  it.each(['rectangular', 'polar'] as const)('finds thirty of thirty orbits of any e, inclination and coverage from %s measures', (form) => {
    expect(missedSeeds({ count: 40, form }, 30)).toEqual([])
  }, 60_000)

  it('finds circles', () => {
    expect(missedSeeds({ count: 40, eccentricity: [0, 0] }, 10)).toEqual([])
  }, 60_000)

  it.each([0, 90, 180])('finds orbits seen at i = %d°', (inclinationDeg) => {
    expect(missedSeeds({ count: 40, inclinationRad: (inclinationDeg * PI) / 180 }, 10)).toEqual([])
  }, 60_000)

  it('finds orbits of e = 0.97', () => {
    expect(missedSeeds({ count: 60, eccentricity: [0.97, 0.97], coverage: [0.8, 2] }, 10)).toEqual([])
  }, 60_000)

  it('finds periods of a tenth of the arc with the floor at a sixtieth', () => {
    expect(missedSeeds({ count: 50, coverage: [8, 10] }, 6, 60)).toEqual([])
  }, 60_000)
})

describe('the periods of the scan', () => {
  it('run from twelve spans to the floor, in equal steps of frequency below the span', () => {
    const periods = scanPeriods(100, 10)
    expect(periods).toEqual([...periods].sort((a, b) => b - a))
    expect(periods[0]).toBeGreaterThan(600)
    expect(periods[0]).toBeLessThan(1200)
    expect(periods.at(-1)).toBeGreaterThanOrEqual(10)
    const frequencies = periods.filter((period) => period <= 100).map((period) => 1 / period)
    frequencies.slice(1).forEach((frequency, i) => expect(frequency - frequencies[i]!).toBeCloseTo(0.2 / 100, 12))
  })

  it('hold at least one where the floor is longer than any', () => {
    expect(scanPeriods(1, 50)).toEqual([50])
  })
})

describe('the projected orbit', () => {
  const { measures } = simulatedSystem({ seed: 12, count: 30, form: 'polar', coverage: [0.8, 1.2] })
  const prepared = prepareSkyMeasures(measures, {})
  const points = searchPoints(prepared.used, new Int8Array(prepared.used.length).fill(1))
  const orbit = new ProjectedOrbit(points, 1980)
  const values = Float64Array.of(log(60), 0.4, -0.3)

  it('has the χ² of the full problem at the constants it solved for', () => {
    orbit.evaluate(values, false)
    const { chiSquare, constants } = orbit
    const problem = skyProblem(keplerPath(1980), skyRows(prepared.used))
    const residuals = new Float64Array(problem.rows)
    problem.evaluate(Float64Array.of(values[0]!, values[1]!, values[2]!, constants[0]!, constants[2]!, constants[1]!, constants[3]!), residuals, null)
    expect(residuals.reduce((sum, r) => sum + r * r, 0) / chiSquare).toBeCloseTo(1, 10)
  })

  it('has the gradient that central differences give', () => {
    orbit.evaluate(values, true)
    const gradient = Array.from(orbit.gradient)
    gradient.forEach((half, j) => {
      const at = (step: number) => {
        const shifted = Float64Array.from(values)
        shifted[j] = shifted[j]! + step
        orbit.evaluate(shifted, false)
        return orbit.chiSquare
      }
      expect((at(1e-5) - at(-1e-5)) / 2e-5 / (2 * half)).toBeCloseTo(1, 4)
    })
  })

  it('is lowered by the polish from the best cell of the scan', () => {
    const best = localMinima(scan(points, 1980, coarseGrid(90, 15), () => undefined))[0]!
    const polished = polish(orbit, startOf(best), 40, 1e-9)
    expect(polished.chiSquare).toBeLessThan(best.chiSquare)
    expect(polished.hasSettled).toBe(true)
  })
})
