import { describe, expect, it } from 'vitest'
import { compareFits, fitOrbit, gainByEpoch, predict, stateOfElements, type EquatorialMeasure, type FitOutcome, type FitResult, type FitSettings } from '../../../../fitting'
import { planetMotion } from '../../../../fitting/models/planet-motion'
import { ORBIT_CLASSES, simulatedSightings, truthAt } from '../../../builders/simulated-sightings'

const DEG = Math.PI / 180
const ELEMENTS = ['perihelionDistance', 'eccentricity', 'inclination', 'node', 'argumentOfPerihelion', 'perihelionTime'] as const

function fitted(measures: EquatorialMeasure[], settings: FitSettings = { forces: 'sun' }): FitResult {
  const outcome: FitOutcome = fitOrbit({ kind: 'equatorial', measures, settings })
  if (!outcome.ok) throw new Error(outcome.refusal.sentence)
  return outcome.result
}

/** Elements in the units of a result. */
function published(truth: ReturnType<typeof truthAt>): Record<(typeof ELEMENTS)[number], number> {
  return {
    perihelionDistance: truth.perihelionDistanceAu, eccentricity: truth.eccentricity, inclination: truth.inclinationRad / DEG,
    node: truth.nodeRad / DEG, argumentOfPerihelion: truth.argumentOfPerihelionRad / DEG, perihelionTime: truth.perihelionTimeJdTt,
  }
}

const turn = (name: string, difference: number) => (name === 'node' || name === 'argumentOfPerihelion' ? ((difference + 540) % 360 + 360) % 360 - 180 : difference)

describe.each(ORBIT_CLASSES)('twelve directions to a body on a %s orbit', (orbitClass) => {
  it('without errors give the orbit back', () => {
    for (let seed = 1; seed <= 3; seed++) {
      const simulated = simulatedSightings({ seed, orbitClass, sigmaArcsec: 0, arcDays: [30, 90] })
      const result = fitted(simulated.measures)
      const truth = published(truthAt(simulated, result.epochOfElements!))
      expect(result.statistics.chiSquare, `seed ${seed}`).toBeLessThan(1e-4)
      for (const name of ELEMENTS) expect(Math.abs(turn(name, result.elements[name]!.value - truth[name])), `${name}, seed ${seed}`).toBeLessThan(0.02 * result.elements[name]!.sigma! + 1e-6)
    }
  })

  it('with errors of half an arc second give it within them, whatever the arc', () => {
    for (let seed = 100; seed < 112; seed++) {
      const simulated = simulatedSightings({ seed, orbitClass })
      const result = fitted(simulated.measures)
      const truth = published(truthAt(simulated, result.epochOfElements!))
      const { reducedChiSquare } = result.statistics
      expect(reducedChiSquare!, `seed ${seed}`).toBeLessThan(3)
      const { value, sigma } = result.elements.inclination!
      expect(Math.abs(value - truth.inclination), `seed ${seed}`).toBeLessThan(6 * sigma!)
      expect(result.constants!.largestDrift).toBeLessThan(1e-10)
    }
  })
})

describe('the class of the orbit', () => {
  it('of a parabola is not excluded, and can be held', () => {
    const { measures } = simulatedSightings({ seed: 5, orbitClass: 'parabolic', arcDays: [40, 60] })
    expect(fitted(measures).conic!.parabolaExcluded).toBe(false)
    const held = fitted(measures, { forces: 'sun', conicClass: 'parabola' })
    expect(held.conic).toMatchObject({ class: 'parabola', statement: 'Parabola, held', eccentricity: { value: 1, sigma: null } })
    expect(held.statistics.parameters).toBe(5)
    expect(held.elements.semiMajorAxis).toBeUndefined()
    expect(held.covariance!.names).not.toContain('eccentricity')
    const { specificEnergy } = held.constants!
    expect(Math.abs(specificEnergy.value)).toBeLessThan(1e-18)
  })

  it('of a minor planet excludes a parabola; of a hyperbola says nothing of where it came from', () => {
    expect(fitted(simulatedSightings({ seed: 6, orbitClass: 'main belt', arcDays: [50, 60] }).measures).conic).toMatchObject({ class: 'ellipse', parabolaExcluded: true, probabilityBound: 1 })
    expect(fitted(simulatedSightings({ seed: 6, orbitClass: 'hyperbolic', arcDays: [50, 60] }).measures).conic!.statement).toContain('does not make it interstellar')
  })
})

describe('three directions', () => {
  it('have every exact orbit listed, and none called the orbit', () => {
    const several = Array.from({ length: 12 }, (_, i) => simulatedSightings({ seed: 40 + i, orbitClass: 'near-Earth', count: 3, sigmaArcsec: 0, arcDays: [10, 30] }))
    const results = several.map(({ measures }) => fitted(measures))
    for (const [i, result] of results.entries()) {
      expect(result.stop.reason).toBe('exact')
      expect(result.statistics.degreesOfFreedom).toBe(0)
      const truth = published(truthAt(several[i]!, result.epochOfElements!))
      const orbits = [result.elements, ...result.alternatives.map((alternative) => alternative.elements)]
      expect(Math.min(...orbits.map((elements) => Math.abs(elements.perihelionDistance!.value - truth.perihelionDistance))), `case ${i}`).toBeLessThan(1e-4)
      expect(result.warnings[0]).toContain(result.alternatives.length > 0 ? 'none of them is the orbit' : 'nothing tests it')
    }
    expect(results.filter((result) => result.alternatives.length > 0).length).toBeGreaterThan(3)
  })
})

describe('errors', () => {
  const { measures } = simulatedSightings({ seed: 9, orbitClass: 'near-Earth', arcDays: [20, 25] })

  it('that no measure states are taken from the residuals', () => {
    const result = fitted(measures.map(({ sigmaDecArcsec: _d, sigmaRaCosDecArcsec: _r, ...measure }) => measure))
    expect(result.statistics.errorBasis).toBe('scaled')
    expect(result.statistics.reducedChiSquare).toBeCloseTo(1, 6)
    expect(result.elements.eccentricity!.sigmaFormal).toBeNull()
  })

  it('of the clock act along the motion only', () => {
    const [exact, loose] = [fitted(measures), fitted(measures.map((measure) => ({ ...measure, sigmaTimeS: 60 })))]
    expect(loose.statistics.chiSquare).toBeLessThan(exact.statistics.chiSquare)
    const { observedMinusComputed, normalised } = loose.residuals[0]!
    expect(normalised!).toBeLessThanOrEqual(Math.hypot(observedMinusComputed.alongArcsec!, observedMinusComputed.acrossArcsec!) / 0.5 + 1e-9)
    expect(normalised!).toBeGreaterThanOrEqual(Math.abs(observedMinusComputed.acrossArcsec!) / 0.5 - 1e-9)
  })

  it('of many measures of one observer in one night count as four', () => {
    const first = measures[0]!
    const crowded = [...measures, ...Array.from({ length: 15 }, (_, i) => ({ ...first, id: `again ${i}`, jdUtc: first.jdUtc + 1e-9 * (i + 1) }))]
    const weights = fitted(crowded).residuals.filter((residual) => residual.id === first.id || residual.id.startsWith('again')).map((residual) => residual.weight)
    expect(weights).toHaveLength(16)
    for (const weight of weights) expect(weight).toBeCloseTo(0.25, 12)
  })

  it('of one measure far off name it', () => {
    const spoiled = measures.map((measure, i) => (i === 4 ? { ...measure, decRad: measure.decRad + 0.0005 } : measure))
    const result = fitted(spoiled)
    expect(result.residuals.reduce((a, b) => ((a.normalised ?? 0) > (b.normalised ?? 0) ? a : b)).id).toBe('m4')
  })
})

describe('the planets', () => {
  const simulated = simulatedSightings({ seed: 12, orbitClass: 'main belt', arcDays: [300, 360], count: 30, sigmaArcsec: 0, motionFrom: planetMotion })

  it('are taken into account past 30 days unless it is told otherwise, and then a year holds', () => {
    const result = fitted(simulated.measures, {})
    expect(result.honestArc).toMatchObject({ standing: 'perturbed' })
    expect(Math.hypot(result.statistics.rms.raCosDecArcsec!.value, result.statistics.rms.decArcsec!.value)).toBeLessThan(0.001)
  })

  it('left out are missed, and the result says that it needs them', () => {
    const result = fitted(simulated.measures)
    expect(result.honestArc).toMatchObject({ standing: 'needs-perturbations', honestUntilDays: 60 })
    expect(result.warnings.join(' ')).toContain('needs perturbations')
    expect(result.statistics.rms.raCosDecArcsec!.value).toBeGreaterThan(0.05)
  })
})

describe('predict', () => {
  const { measures } = simulatedSightings({ seed: 21, orbitClass: 'main belt', arcDays: [40, 50] })
  const result = fitted(measures)

  it('stands within its errors at the measures and needs the state alone', () => {
    const again = JSON.parse(JSON.stringify({ kind: result.kind, state: result.state })) as FitResult
    const middle = result.residuals[6]!
    const jdTt = measures.find((measure) => measure.id === middle.id)!.jdUtc + 66.184 / 86400
    const [prediction] = predict(again, [jdTt])
    expect(Math.abs(prediction!.values.decDeg! - middle.computed.decDeg!) * 3600).toBeLessThan(10)
    expect(prediction!.values.distanceAu).toBeCloseTo(middle.computed.distanceAu!, 4)
    expect(prediction!.sigmas.decDeg! * 3600).toBeLessThan(0.5)
    expect(prediction).toEqual(predict(result, [jdTt])[0])
  })

  it('gives rates that are the change of place, and an ellipse as large as the errors', () => {
    const at = result.epochOfElements! + 100
    const [before, now, after] = predict(result, [at - 0.01, at, at + 0.01])
    const minutes = 0.02 * 1440
    expect(now!.values.decRateArcsecPerMin).toBeCloseTo((after!.values.decDeg! - before!.values.decDeg!) * 3600 / minutes, 5)
    expect(now!.values.raCosDecRateArcsecPerMin).toBeCloseTo((after!.values.raDeg! - before!.values.raDeg!) * 3600 * Math.cos(now!.values.decDeg! * DEG) / minutes, 5)
    const { errorMajorArcsec, errorMinorArcsec } = now!.values as Record<'errorMajorArcsec' | 'errorMinorArcsec', number>
    const sigmaAlpha = now!.sigmas.raDeg! * Math.cos(now!.values.decDeg! * DEG) * 3600
    expect(errorMajorArcsec ** 2 + errorMinorArcsec ** 2).toBeCloseTo(sigmaAlpha ** 2 + (now!.sigmas.decDeg! * 3600) ** 2, 6)
    expect(now!.values.phaseAngleDeg).toBeGreaterThan(0)
    expect(now!.values.elongationDeg).toBeLessThanOrEqual(180)
  })
})

describe('known elements', () => {
  it('are predicted from as the fit to their places is', () => {
    const simulated = simulatedSightings({ seed: 51, orbitClass: 'near-parabolic', arcDays: [40, 50], sigmaArcsec: 0 })
    const result = fitted(simulated.measures)
    const at = result.epochOfElements! + 20
    const [known] = predict({ kind: 'equatorial', state: stateOfElements(truthAt(simulated, at), at) }, [at])
    const [fit] = predict(result, [at])
    expect(Math.abs(known!.values.decDeg! - fit!.values.decDeg!) * 3600).toBeLessThan(0.01)
    expect(known!.values.distanceAu).toBeCloseTo(fit!.values.distanceAu!, 5)
    expect(known!.sigmas.decDeg).toBeNull()
  })
})

describe('planning and merging', () => {
  const { measures } = simulatedSightings({ seed: 61, orbitClass: 'main belt', arcDays: [40, 50], count: 24 })
  const sigma = { kind: 'equatorial', sigmaRaCosDecArcsec: 0.5, sigmaDecArcsec: 0.5 } as const

  it('one more night tightens the elements as a refit with it does', () => {
    const [first, added] = [measures.slice(0, 23), measures.slice(23)]
    const before = fitted(first)
    const jdTt = added[0]!.jdUtc + 66.184 / 86400
    const [gain] = gainByEpoch(before, [jdTt], sigma)
    const after = fitted(measures)
    expect(gain!.information).toBeGreaterThan(0)
    for (const name of ['perihelionDistance', 'eccentricity', 'inclination'] as const) {
      expect(gain!.sigmasAfter[name]! / after.elements[name]!.sigmaFormal!, name).toBeCloseTo(1, 1)
      expect(gain!.sigmasAfter[name]!).toBeLessThanOrEqual(before.elements[name]!.sigma!)
    }
  })

  it('batches of one body agree, those with an offset do not', () => {
    const shifted = measures.slice(12).map((measure) => ({ ...measure, decRad: measure.decRad + 5e-5 }))
    const agreement = (a: EquatorialMeasure[], b: EquatorialMeasure[]) => compareFits([fitted(a), fitted(b)], fitted([...a, ...b]))
    expect(agreement(measures.slice(0, 12), measures.slice(12)).probabilityF!).toBeGreaterThan(0.01)
    expect(agreement(measures.slice(0, 12), shifted).probabilityF!).toBeLessThan(0.01)
  })
})

describe('a refit', () => {
  it('from an earlier result finds the same orbit, whichever the form of its parameters', () => {
    const { measures } = simulatedSightings({ seed: 31, orbitClass: 'near-parabolic', arcDays: [30, 60] })
    const first = fitted(measures.slice(0, 10))
    const searched = fitted(measures)
    for (const state of [first.state, fitted(measures, { forces: 'sun', conicClass: 'parabola' }).state]) {
      const outcome = fitOrbit({ kind: 'equatorial', measures, settings: { forces: 'sun' }, start: { state: JSON.parse(JSON.stringify(state)) as typeof state } })
      expect(outcome.ok && outcome.result.statistics.chiSquare).toBeCloseTo(searched.statistics.chiSquare, 6)
    }
  })
})

describe('measures of several oppositions', () => {
  it('are linked without a starting guess, with the planets', () => {
    const orbit = { perihelionDistanceAu: 2.2, eccentricity: 0.12, inclinationRad: 9 * DEG, nodeRad: 2, argumentOfPerihelionRad: 1, perihelionTimeJdTt: 2455300 }
    const epochJdTt = 2455000.5
    const truth = stateOfElements(orbit, epochJdTt, 'planets')
    const times = Array.from({ length: 150 }, (_, i) => epochJdTt - 600 + 8 * i)
    const seen = predict({ kind: 'equatorial', state: truth }, times).filter(({ values }) => values.elongationDeg! > 140)
    const measures = seen.map(({ at, values }, i): EquatorialMeasure => ({
      id: `m${i}`, observer: 'Tasque', site: { longitudeEastDeg: 0, rhoCosPhi: 0, rhoSinPhi: 0 }, jdUtc: at - 66.184 / 86400, raRad: values.raDeg! * DEG, decRad: values.decDeg! * DEG, sigmaRaCosDecArcsec: 0.5, sigmaDecArcsec: 0.5,
    }))
    expect(measures.at(-1)!.jdUtc - measures[0]!.jdUtc).toBeGreaterThan(500)
    const result = fitted(measures, {})
    expect(result.statistics.chiSquare).toBeLessThan(0.01)
    expect(result.statistics.arc.turns!).toBeGreaterThan(0.3)
  })
})
