import { describe, expect, it } from 'vitest'
import { relativeElements } from '../../../../fitting/uncertainty/relative-elements'
import { relativeArc, relativeConstants } from '../../../../fitting/uncertainty/relative-motion'
import { errorScale, quadraticForm } from '../../../../fitting/uncertainty/error-scale'
import { influenceOf } from '../../../../fitting/uncertainty/influence'
import type { Constants, Element } from '../../../../fitting/types'

const VALUES = [Math.log(40), 0.5, -0.3, 0.8, 0.3, -0.2, 0.6]
const elementsAt = (values: number[]) => relativeElements({ values, covariance: null, referenceEpochYr: 1990, lastEpochYr: 2015 })

/** Covariance of one parameter alone, so that σ is |gradient| in that parameter. */
function onlyParameter(index: number): number[][] {
  return VALUES.map((_, i) => VALUES.map((__, j) => (i === index && j === index ? 1 : 0)))
}

const FORMAL = errorScale('formal', 10, 10)

function constantsAt(values: number[], parameter: number): Constants {
  return relativeConstants(elementsAt(values), { covariance: onlyParameter(parameter), scale: FORMAL }, [1960, 1980, 2000])
}

const PICKS: [string, (constants: Constants) => Element][] = [
  ['μ', (c) => c.gravitationalParameter], ['ε', (c) => c.specificEnergy], ['h', (c) => c.angularMomentum], ['|A|', (c) => c.laplaceRungeLenz.magnitude],
  ['A north', (c) => c.laplaceRungeLenz.components[0]!], ['A east', (c) => c.laplaceRungeLenz.components[1]!], ['A towards the observer', (c) => c.laplaceRungeLenz.components[2]!],
]

describe('the constants of motion of a relative orbit', () => {
  it.each(PICKS)('give %s the error that central differences give, in every parameter', (_, pick) => {
    for (let j = 0; j < 7; j++) {
      const shifted = (by: number) => pick(constantsAt(VALUES.map((value, k) => (k === j ? value + by : value)), j)).value
      const numeric = Math.abs(shifted(1e-6) - shifted(-1e-6)) / 2e-6
      const sigma = pick(constantsAt(VALUES, j)).sigmaFormal!
      expect(Math.abs(sigma - numeric)).toBeLessThan(1e-5 * Math.max(numeric, Math.abs(pick(constantsAt(VALUES, j)).value)))
    }
  })

  it('do not drift along the orbit', () => {
    expect(constantsAt(VALUES, 0).largestDrift).toBeLessThan(1e-12)
  })
})

describe('the arc that measures cover', () => {
  it('is the whole turn once the span reaches a period', () => {
    expect(relativeArc(elementsAt(VALUES), 1960, 2001)).toMatchObject({ trueAnomalyCoveredDeg: 360, positionAngleCoveredDeg: 360 })
  })

  it('sweeps the same angles forward in a direct and in a mirrored, retrograde orbit', () => {
    const mirrored = elementsAt(VALUES.map((value, j) => (j === 4 || j === 6 ? -value : value)))
    const [direct, retrograde] = [relativeArc(elementsAt(VALUES), 1985, 1996), relativeArc(mirrored, 1985, 1996)]
    expect(retrograde.trueAnomalyCoveredDeg).toBeCloseTo(direct.trueAnomalyCoveredDeg!, 9)
    expect(retrograde.positionAngleCoveredDeg).toBeCloseTo(direct.positionAngleCoveredDeg!, 7)
    expect(direct.turns).toBeCloseTo(11 / 40, 12)
  })
})

describe('the scale of errors', () => {
  it('widens by the scatter and by Student’s t where errors are stated', () => {
    const scale = errorScale('formal', 40, 10)
    expect(scale.formal).toBe(1)
    expect(scale.published).toBe(1)
    expect(scale.scaled!).toBeCloseTo(2 * 1.0526, 3)
  })

  it('never makes stated errors smaller', () => {
    expect(errorScale('mixed', 1, 1000).scaled!).toBeGreaterThanOrEqual(1)
  })

  it('has nothing formal where no error is stated, and nothing at all without degrees of freedom', () => {
    expect(errorScale('scaled', 40, 10).formal).toBeNull()
    expect(errorScale('scaled', 0, 0)).toMatchObject({ formal: null, scaled: null, published: null })
  })
})

describe('the influence of one measure', () => {
  it('is that of a straight mean for single rows: leverage 1/n, Cook’s distance r²h/((1 − h)² p s²)', () => {
    const { leverage, cook } = influenceOf({ residuals: [2], gradients: [[1]] }, [[1 / 5]], 1.5)
    expect(leverage).toBeCloseTo(0.2, 12)
    expect(cook).toBeCloseTo((4 * 0.2) / (0.64 * 1.5), 12)
  })

  it('adds up for two rows that share no parameter', () => {
    const covariance = [[0.2, 0], [0, 0.5]]
    const pair = influenceOf({ residuals: [2, -1], gradients: [[1, 0], [0, 1]] }, covariance, 1)
    const first = influenceOf({ residuals: [2], gradients: [[1, 0]] }, covariance, 1)
    const second = influenceOf({ residuals: [-1], gradients: [[0, 1]] }, covariance, 1)
    expect(pair.leverage).toBeCloseTo(first.leverage + second.leverage, 12)
    expect(pair.cook).toBeCloseTo(first.cook! + second.cook!, 12)
  })

  it('has no Cook’s distance where the measure alone fixes a parameter', () => {
    expect(influenceOf({ residuals: [0], gradients: [[1]] }, [[1]], 1)).toEqual({ leverage: 1, cook: null })
  })

  it('rests on the form gᵀCh', () => {
    expect(quadraticForm([[2, 1], [1, 3]], [1, 2], [0, 1])).toBe(7)
  })
})
