import { apparentPlace, randomStream, type CampbellElements, type FitState, type RelativeMeasure } from '../../../fitting'

/** A true orbit, its measures with normal errors, and the true state to refit from. */
export interface SimulatedPair {
  measures: RelativeMeasure[]
  spanYr: number
  truth: CampbellElements
  /** The state of the true orbit, for the best χ² known. */
  trueState: FitState
  /** The state of a neighbouring orbit, each element a little off, and the same in (ln P, e, T, A, B, F, G). */
  neighbourState: FitState
  neighbourConstants: number[]
}

export interface PairOptions {
  seed: number
  count: number
  /** Arc in periods: from, to. */
  coverage: readonly [number, number]
  form: 'polar' | 'rectangular'
  /** From, to; 0 to 0.95 where left out. */
  eccentricity?: readonly [number, number]
  /** Any where left out. */
  inclinationRad?: number
  /** σ as a part of a: from, to; 0.005 to 0.05 where left out. */
  sigma?: readonly [number, number]
  /** Parts of the measures that are thrown 10 to 30 σ off, and that are turned by 180°. */
  outliers?: number
  changedQuadrants?: number
}

/** The first draws of neighbouring seeds are alike; these are passed over. */
const FIRST_DRAWS = 8

const between = (range: readonly [number, number], part: number) => range[0] + (range[1] - range[0]) * part

/** A, B, F, G of an orbit, arcsec. */
function thieleInnes({ semiMajorAxisArcsec: a, inclinationRad, nodeRad }: CampbellElements, argumentRad: number): [number, number, number, number] {
  const [cw, sw, cn, sn, ci] = [Math.cos(argumentRad), Math.sin(argumentRad), Math.cos(nodeRad), Math.sin(nodeRad), Math.cos(inclinationRad)]
  return [a * (cw * cn - sw * sn * ci), a * (cw * sn + sw * cn * ci), a * (-sw * cn - cw * sn * ci), a * (-sw * sn + cw * cn * ci)]
}

/** Regular parameters of a true orbit: (ln P, u, v, A₁, B₁, F₁, G₁), the constants turned back by the direction of periastron. */
function stateOf(truth: CampbellElements, referenceEpochYr: number): FitState {
  const { periodYr, periastronTimeYr, eccentricity, argumentOfPeriastronRad } = truth
  const varpi = (2 * Math.PI * (periastronTimeYr - referenceEpochYr)) / periodYr
  const s = Math.atanh(eccentricity)
  return {
    model: 'kepler', names: ['lnPeriod', 'u', 'v', 'A1', 'B1', 'F1', 'G1'], covariance: null, referenceEpochYr,
    values: [Math.log(periodYr), s * Math.cos(varpi), s * Math.sin(varpi), ...thieleInnes(truth, argumentOfPeriastronRad - varpi)],
  }
}

/** A start for a refit: what an earlier fit to fewer measures might have given. */
function neighbourOf(truth: CampbellElements): CampbellElements {
  return {
    ...truth, periodYr: truth.periodYr * 1.01, eccentricity: truth.eccentricity * 0.98, semiMajorAxisArcsec: truth.semiMajorAxisArcsec * 1.02,
    periastronTimeYr: truth.periastronTimeYr + 0.005 * truth.periodYr, nodeRad: truth.nodeRad + 0.02, argumentOfPeriastronRad: truth.argumentOfPeriastronRad - 0.02,
  }
}

function drawTruth(options: PairOptions, uniform: () => number): CampbellElements {
  const periodYr = 20 + 80 * uniform()
  const eccentricity = between(options.eccentricity ?? [0, 0.95], uniform())
  const anyInclination = Math.acos(2 * uniform() - 1)
  return {
    periodYr, eccentricity, semiMajorAxisArcsec: 1, inclinationRad: options.inclinationRad ?? anyInclination,
    nodeRad: Math.PI * uniform(), argumentOfPeriastronRad: 2 * Math.PI * uniform(), periastronTimeYr: 1950 + periodYr * uniform(),
  }
}

/**
 * Draws a pair: e from 0 to 0.95, any inclination, σ 0.5 to 5 % of a, unless the options say otherwise.
 * @param options seed, number of measures, arc in periods, form of the measures.
 */
export function simulatedPair(options: PairOptions): SimulatedPair {
  const random = randomStream(options.seed)
  for (let i = 0; i < FIRST_DRAWS; i++) random.uniform()
  const truth = drawTruth(options, random.uniform)
  const arcYr = Math.min(880, truth.periodYr * between(options.coverage, random.uniform()))
  const sigma = between(options.sigma ?? [0.005, 0.05], random.uniform())
  const measures = Array.from({ length: options.count }, (_, i): RelativeMeasure => {
    const epochYr = 1610 + arcYr * random.uniform()
    const place = apparentPlace(truth, epochYr)
    const [outlying, turned] = options.outliers || options.changedQuadrants ? [random.uniform(), random.uniform()] : [1, 1]
    const off = outlying < (options.outliers ?? 0) ? (10 + 20 * random.uniform()) * sigma : 0
    const towards = off > 0 ? 2 * Math.PI * random.uniform() : 0
    const sign = turned < (options.changedQuadrants ?? 0) ? -1 : 1
    const northArcsec = sign * (place.northArcsec + sigma * random.normal() + off * Math.cos(towards))
    const eastArcsec = sign * (place.eastArcsec + sigma * random.normal() + off * Math.sin(towards))
    const base = { id: `m${i}`, observer: 'simulated', epochYr }
    if (options.form === 'rectangular') return { ...base, position: { form: 'rectangular', eastArcsec, northArcsec, sigmaEastArcsec: sigma, sigmaNorthArcsec: sigma } }
    const position = { thetaRad: Math.atan2(eastArcsec, northArcsec), rhoArcsec: Math.hypot(northArcsec, eastArcsec) }
    return { ...base, position: { form: 'polar', ...position, sigmaRhoArcsec: sigma, sigmaThetaRad: sigma / Math.max(place.separationArcsec, sigma) } }
  })
  const epochs = measures.map((measure) => measure.epochYr)
  const [first, last] = [Math.min(...epochs), Math.max(...epochs)]
  const middle = (first + last) / 2
  const neighbour = neighbourOf(truth)
  return {
    measures, spanYr: last - first, truth, trueState: stateOf(truth, middle), neighbourState: stateOf(neighbour, middle),
    neighbourConstants: [Math.log(neighbour.periodYr), neighbour.eccentricity, neighbour.periastronTimeYr, ...thieleInnes(neighbour, neighbour.argumentOfPeriastronRad)],
  }
}
