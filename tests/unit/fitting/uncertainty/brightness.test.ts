import { describe, expect, it } from 'vitest'
import { absoluteMagnitude } from '../../../../fitting/uncertainty/brightness'

const near = { magnitude: 10, band: 'V', distanceAu: 1, sunDistanceAu: 1, phaseRad: 0 }

describe('absolute magnitude', () => {
  it('is the magnitude at 1 au from Sun and Earth, fully lit', () => {
    expect(absoluteMagnitude([near], 0.1)).toMatchObject({ name: 'absoluteMagnitude', element: { value: 10, sigma: null, unit: 'mag V' } })
  })

  it('loses 5 magnitudes for ten times the distance from the Earth, and as many from the Sun', () => {
    expect(absoluteMagnitude([{ ...near, distanceAu: 10, sunDistanceAu: 10 }], 0.1)!.element.value).toBeCloseTo(0, 12)
    expect(absoluteMagnitude([{ ...near, distanceAu: 10, sunDistanceAu: 10 }], 0.99)!.element.value).toBeCloseTo(-5, 12)
  })

  it('takes the phase off for minor planets only', () => {
    const [asteroid, comet] = [0.1, 1].map((e) => absoluteMagnitude([{ ...near, phaseRad: (20 * Math.PI) / 180 }], e)!.element.value) as [number, number]
    const t = Math.tan((10 * Math.PI) / 180)
    expect(asteroid).toBeCloseTo(10 + 2.5 * Math.log10(0.85 * Math.exp(-3.33 * t ** 0.63) + 0.15 * Math.exp(-1.87 * t ** 1.22)), 12)
    expect(comet).toBe(10)
  })

  it('is the mean of the usual band, with its error', () => {
    const result = absoluteMagnitude([near, { ...near, magnitude: 10.2 }, { ...near, magnitude: 3, band: 'R' }], 0.1)!
    expect(result.element.value).toBeCloseTo(10.1, 12)
    expect(result.element.sigma).toBeCloseTo(0.1, 12)
  })

  it('is not there without magnitudes', () => {
    expect(absoluteMagnitude([], 0.1)).toBeNull()
  })
})
