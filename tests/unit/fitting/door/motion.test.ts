import { describe, expect, it } from 'vitest'
import { fitOrbit, predict, randomStream, type FitResult, type RelativeMeasure } from '../../../../fitting'
import { prepareSkyMeasures } from '../../../../fitting/models/sky-measure'
import { straightnessOf } from '../../../../fitting/uncertainty/straightness'
import { simulatedSystem } from '../../../builders/double-star-systems'

const SIGMA = 0.03

interface Motion {
  x0: number
  y0: number
  xDot: number
  yDot: number
}

function straight(motion: Motion, seed: number, count = 24, noise = 1): RelativeMeasure[] {
  const random = randomStream(seed)
  return Array.from({ length: count }, (_, i) => {
    const epochYr = 1900 + 120 * random.uniform()
    const elapsed = epochYr - 1950
    const northArcsec = motion.x0 + motion.xDot * elapsed + noise * SIGMA * random.normal()
    const eastArcsec = motion.y0 + motion.yDot * elapsed + noise * SIGMA * random.normal()
    return { id: `m${i}`, observer: 'Orrowin', epochYr, position: { form: 'rectangular', northArcsec, eastArcsec, sigmaNorthArcsec: SIGMA, sigmaEastArcsec: SIGMA } }
  })
}

function fitted(measures: RelativeMeasure[], model: 'line' | 'still' | 'kepler'): FitResult {
  const outcome = fitOrbit({ kind: 'relative', measures, settings: { model, shortestPeriodYr: 30 } })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

describe('straight motion', () => {
  it('gives closest approach, its time and direction, and the motion', () => {
    // Passes 3″ north of the primary in 1980, due east.
    const result = fitted(straight({ x0: 3, y0: -0.6, xDot: 0, yDot: 0.02 }, 1, 20, 0), 'line')
    expect(result.elements.closestApproach!.value).toBeCloseTo(3, 9)
    expect(result.elements.closestApproachTime!.value).toBeCloseTo(1980, 7)
    expect(result.elements.closestApproachPositionAngle!.value % 360).toBeCloseTo(0, 7)
    expect(result.elements.motion!.value).toBeCloseTo(0.02, 10)
    expect(result.elements.motionDirection!.value).toBeCloseTo(90, 7)
    expect(result.conic).toBeNull()
    expect(result.statistics.parameters).toBe(4)
  })

  it('has errors that agree with the scatter of repeated campaigns', () => {
    const results = Array.from({ length: 60 }, (_, i) => {
      const bare = straight({ x0: 2, y0: 1, xDot: 0.01, yDot: -0.02 }, 9, 24, 0)
      const random = randomStream(100 + i)
      return fitted(bare.map((measure): RelativeMeasure => (measure.position.form === 'rectangular'
        ? { ...measure, position: { ...measure.position, northArcsec: measure.position.northArcsec + SIGMA * random.normal(), eastArcsec: measure.position.eastArcsec + SIGMA * random.normal() } }
        : measure)), 'line')
    })
    for (const name of ['closestApproach', 'closestApproachTime', 'motion', 'motionDirection']) {
      const values = results.map((result) => result.elements[name]!.value)
      const mean = values.reduce((a, b) => a + b) / values.length
      const scatter = Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1))
      expect(scatter / results[0]!.elements[name]!.sigma!, name).toBeGreaterThan(0.72)
      expect(scatter / results[0]!.elements[name]!.sigma!, name).toBeLessThan(1.3)
    }
  })

  it('predicts along the line', () => {
    const result = fitted(straight({ x0: 3, y0: 0, xDot: 0, yDot: 0.02 }, 1, 20, 0), 'line')
    const [later] = predict(result, [2050])
    expect(later!.values.eastArcsec).toBeCloseTo(2, 9)
    expect(later!.values.northArcsec).toBeCloseTo(3, 9)
  })
})

describe('a companion that does not move', () => {
  it('gives separation and position angle', () => {
    const result = fitted(straight({ x0: 3, y0: 4, xDot: 0, yDot: 0 }, 2, 20, 0), 'still')
    expect(result.elements.separation!.value).toBeCloseTo(5, 9)
    expect(result.elements.positionAngle!.value).toBeCloseTo((Math.atan2(4, 3) * 180) / Math.PI, 7)
  })
})

describe('the test of straight motion', () => {
  it('gives 3 to 7 % false alarms at a nominal 5 % on 500 straight pairs', () => {
    let alarms = 0
    for (let i = 0; i < 500; i++) {
      const random = randomStream(300 + i)
      const measures = straight({ x0: 3 * random.normal(), y0: 3 * random.normal(), xDot: 0.01 * random.normal(), yDot: 0.01 * random.normal() }, 4000 + i, 12 + random.below(30))
      if (straightnessOf(prepareSkyMeasures(measures, {}), 1960)!.probability < 0.05) alarms++
    }
    expect(alarms / 500).toBeGreaterThanOrEqual(0.03)
    expect(alarms / 500).toBeLessThanOrEqual(0.07)
  }, 60_000)

  it('sees the curvature of a fifth of an orbit', () => {
    for (let seed = 1; seed <= 5; seed++) {
      const { measures } = simulatedSystem({ seed, count: 40, coverage: [0.2, 0.2], eccentricity: [0, 0.3], inclinationRad: 0.5, sigma: [0.005, 0.005] })
      expect(straightnessOf(prepareSkyMeasures(measures, {}), 1980)!.probability).toBeLessThan(1e-4)
    }
  })

  it('warns that an orbit fitted to straight motion is none', () => {
    const result = fitted(straight({ x0: 2, y0: 1, xDot: 0.01, yDot: -0.02 }, 9), 'kepler')
    expect(result.warnings.join(' ')).toContain('The motion so far is straight')
  })
})
