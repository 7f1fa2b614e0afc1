/**
 * Golden requests of the engine and the texts of their results. The same texts must come out of Node and of every browser, and they may
 * only change together with ENGINE_VERSION. Everything here is portable: elementary/ only, no clock, no unseeded draw.
 */
import canonicalize from 'canonicalize'
import { fitOrbit } from '../../fitting/door/fit-orbit'
import { cos } from '../../fitting/elementary'
import { randomStream } from '../../fitting/random'
import type { FitRequest, PlaneMeasure, RelativeMeasure } from '../../fitting/types'
import { simulatedSystem } from './double-star-systems'

const RELATIVE = 120
const PLANE = 80

/** Every third measure loses a coordinate or its quadrant, so that all row forms take part. */
function withMixedForms(measures: RelativeMeasure[], seed: number): RelativeMeasure[] {
  return measures.map((measure, i) => {
    const { position } = measure
    if (position.form !== 'polar' || (i + seed) % 3 !== 0) return measure
    const which = (i + seed) % 4
    if (which === 0) return { ...measure, position: { ...position, rhoArcsec: undefined, sigmaRhoArcsec: undefined } }
    if (which === 1) return { ...measure, position: { ...position, thetaRad: undefined, sigmaThetaRad: undefined } }
    if (which === 2) return { ...measure, position: { ...position, quadrant: 'ambiguous', correlation: 0.3 } }
    return { ...measure, setAside: true, position: { form: 'limit', rhoLimitArcsec: 0.3 } }
  })
}

function relativeRequest(index: number): FitRequest {
  const isPolar = index % 2 === 1
  const { measures } = simulatedSystem({
    seed: 7000 + index, count: 12 + (index % 7) * 5, form: isPolar ? 'polar' : 'rectangular', withoutErrors: index % 5 === 4, coverage: [0.4, 3],
  })
  const span = 6
  return {
    kind: 'relative',
    measures: index % 8 === 3 ? withMixedForms(measures, index) : measures,
    settings: { shortestPeriodYr: span, seed: index, loss: index % 24 === 5 ? 'biweight' : 'squares', model: index % 24 === 7 ? 'line' : 'kepler' },
  }
}

function planeRequest(index: number): FitRequest {
  const random = randomStream(9000 + index)
  const e = 2.5 * random.uniform()
  const phi0 = 6.28 * random.uniform()
  const reach = e < 1 ? 3.14 : 0.8 * (3.14 - 1.4 * Math.min(1, e - 1) - 0.6)
  const measures = Array.from({ length: 6 + (index % 20) }, (_, i): PlaneMeasure => {
    const phiRad = phi0 + reach * (2 * random.uniform() - 1)
    const exact = 1.5 / Math.max(0.05, 1 + e * cos(phiRad - phi0))
    const r = exact * (1 + 0.01 * random.normal())
    const base = { id: `p${i}`, observer: i % 2 === 0 ? 'Tasque' : 'Quellmann', phiRad }
    return index % 4 === 2 ? { ...base, diameterArcmin: 30 / r } : { ...base, r, sigmaR: index % 4 === 1 ? 0.01 * exact : undefined }
  })
  return { kind: 'plane', measures, settings: index % 4 === 2 ? { diameterScaleArcmin: 30, radiusUnit: 'au' } : {} }
}

/**
 * The golden requests.
 * @returns 200 requests, always the same.
 */
export function goldenRequests(): FitRequest[] {
  return [...Array.from({ length: RELATIVE }, (_, i) => relativeRequest(i)), ...Array.from({ length: PLANE }, (_, i) => planeRequest(i))]
}

/**
 * Fits the golden requests.
 * @returns the canonical JSON (RFC 8785) of each outcome, without the engine's version.
 */
export function goldenTexts(): string[] {
  return goldenRequests().map((request) => {
    const outcome = fitOrbit(request)
    return canonicalize(outcome.ok ? { ...outcome.result, engine: { seed: outcome.result.engine.seed } } : outcome)!
  })
}
