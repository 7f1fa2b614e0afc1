import { describe, expect, it } from 'vitest'
import { apparentPlace } from '../../../fitting'
import { simulatePair, truePlace } from '../../builders/simulated-measures'

const radians = (degrees: number) => degrees * Math.PI / 180
const pair = { periodYr: 62.4, periastronTimeYr: 2009.3, eccentricity: 0.482, semiMajorAxisArcsec: 0.861, inclinationDeg: 118.3, nodeDeg: 118.9, argumentOfPeriastronDeg: 73.4 }

describe('the simulated sky', () => {
  it('agrees with the engine on where a pair stands, though written apart from it', () => {
    for (let epochYr = 1960; epochYr < 2030; epochYr += 1.7) {
      const ours = truePlace(pair, epochYr)
      const engine = apparentPlace({
        periodYr: pair.periodYr, periastronTimeYr: pair.periastronTimeYr, eccentricity: pair.eccentricity, semiMajorAxisArcsec: pair.semiMajorAxisArcsec,
        inclinationRad: radians(pair.inclinationDeg), nodeRad: radians(pair.nodeDeg), argumentOfPeriastronRad: radians(pair.argumentOfPeriastronDeg),
      }, epochYr)
      expect(ours.rhoArcsec).toBeCloseTo(engine.separationArcsec, 12)
      expect(radians(ours.thetaDeg)).toBeCloseTo(engine.positionAngleRad, 11)
    }
  })

  it('gives the same measures for the same seed and others for another', () => {
    const noise = { sigmaThetaDeg: 1, sigmaRhoArcsec: 0.01, seed: 7 }
    expect(simulatePair(pair, [2000, 2010], noise)).toEqual(simulatePair(pair, [2000, 2010], noise))
    expect(simulatePair(pair, [2000, 2010], { ...noise, seed: 8 })).not.toEqual(simulatePair(pair, [2000, 2010], noise))
  })
})
