import { apparentPlace, randomStream, type CampbellElements, type FitState, type RelativeMeasure } from '../../fitting'

/** A true orbit, its measures with normal errors, and the true state to refit from. */
export interface SimulatedPair {
  measures: RelativeMeasure[]
  spanYr: number
  /** The state of the true orbit, for the best χ² known. */
  trueState: FitState
}

export interface PairOptions {
  seed: number
  count: number
  /** Arc in periods: from, to. */
  coverage: readonly [number, number]
  form: 'polar' | 'rectangular'
}

const between = (range: readonly [number, number], part: number) => range[0] + (range[1] - range[0]) * part

/** Regular parameters of a true orbit: (ln P, u, v, A₁, B₁, F₁, G₁), the constants turned back by the direction of periastron. */
function stateOf(truth: CampbellElements, referenceEpochYr: number): FitState {
  const { periodYr, periastronTimeYr, eccentricity, semiMajorAxisArcsec: a, inclinationRad, nodeRad, argumentOfPeriastronRad } = truth
  const varpi = (2 * Math.PI * (periastronTimeYr - referenceEpochYr)) / periodYr
  const s = Math.atanh(eccentricity)
  const turned = argumentOfPeriastronRad - varpi
  const [cw, sw, cn, sn, ci] = [Math.cos(turned), Math.sin(turned), Math.cos(nodeRad), Math.sin(nodeRad), Math.cos(inclinationRad)]
  return {
    model: 'kepler', names: ['lnPeriod', 'u', 'v', 'A1', 'B1', 'F1', 'G1'], covariance: null, referenceEpochYr,
    values: [
      Math.log(periodYr), s * Math.cos(varpi), s * Math.sin(varpi),
      a * (cw * cn - sw * sn * ci), a * (cw * sn + sw * cn * ci), a * (-sw * cn - cw * sn * ci), a * (-sw * sn + cw * cn * ci),
    ],
  }
}

/**
 * Draws a pair: e from 0 to 0.95, any inclination, σ 0.5 to 5 % of a.
 * @param options seed, number of measures, arc in periods, form of the measures.
 */
export function simulatedPair(options: PairOptions): SimulatedPair {
  const random = randomStream(options.seed)
  const periodYr = 20 + 80 * random.uniform()
  const truth: CampbellElements = {
    periodYr, eccentricity: 0.95 * random.uniform(), semiMajorAxisArcsec: 1, inclinationRad: Math.acos(2 * random.uniform() - 1),
    nodeRad: Math.PI * random.uniform(), argumentOfPeriastronRad: 2 * Math.PI * random.uniform(), periastronTimeYr: 1950 + periodYr * random.uniform(),
  }
  const arcYr = Math.min(880, periodYr * between(options.coverage, random.uniform()))
  const sigma = between([0.005, 0.05], random.uniform())
  const measures = Array.from({ length: options.count }, (_, i): RelativeMeasure => {
    const epochYr = 1610 + arcYr * random.uniform()
    const place = apparentPlace(truth, epochYr)
    const [northArcsec, eastArcsec] = [place.northArcsec + sigma * random.normal(), place.eastArcsec + sigma * random.normal()]
    const base = { id: `m${i}`, observer: 'simulated', epochYr }
    if (options.form === 'rectangular') return { ...base, position: { form: 'rectangular', eastArcsec, northArcsec, sigmaEastArcsec: sigma, sigmaNorthArcsec: sigma } }
    const position = { thetaRad: Math.atan2(eastArcsec, northArcsec), rhoArcsec: Math.hypot(northArcsec, eastArcsec) }
    return { ...base, position: { form: 'polar', ...position, sigmaRhoArcsec: sigma, sigmaThetaRad: sigma / Math.max(place.separationArcsec, sigma) } }
  })
  const epochs = measures.map((measure) => measure.epochYr)
  const [first, last] = [Math.min(...epochs), Math.max(...epochs)]
  return { measures, spanYr: last - first, trueState: stateOf(truth, (first + last) / 2) }
}
