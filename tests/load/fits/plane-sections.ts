/** Conics in their plane: noise-bearing distances about conics of e from 0 to 3, without and with times. */
import { fitOrbit, randomStream, type FitStart, type PlaneMeasure } from '../../../fitting'
import { PLANE_MOTION_NAMES } from '../../../fitting/models/plane-motion'
import { planeStateValues, simulatedPlaneMotion } from '../../builders/simulated-plane'
import { median, timed, type Row, type Section } from './table'

const MEASURES = 20

/** Measures of one conic with 1 % errors, well inside the asymptotes; χ² of the truth is the bar. */
function drawConic(seed: number): { measures: PlaneMeasure[]; chiSquare: number } {
  const random = randomStream(seed)
  const [e, phi0] = [3 * random.uniform(), 2 * Math.PI * random.uniform()]
  const reach = e < 1 ? Math.PI : 0.85 * Math.acos(-1 / e)
  let chiSquare = 0
  const measures = Array.from({ length: MEASURES }, (_, i): PlaneMeasure => {
    const nu = reach * (2 * random.uniform() - 1)
    const exact = 1 / (1 + e * Math.cos(nu))
    const error = random.normal()
    chiSquare += error * error
    return { id: `p${i}`, observer: 'simulated', phiRad: phi0 + nu, r: exact * (1 + 0.01 * error), sigmaR: 0.01 * exact }
  })
  return { measures, chiSquare }
}

/** With times: right where χ² is no worse than that of a fit started at the true motion. */
function timedRow(count: number, seed: number): Row {
  const ms: number[] = []
  const missed: number[] = []
  for (let i = 1; i <= count; i++) {
    const { truth, measures } = simulatedPlaneMotion({ seed: seed + i, count: 50, eccentricity: i % 4 === 0 ? [1, 3] : [0, 0.95] })
    const start: FitStart = { state: { model: 'plane', names: [...PLANE_MOTION_NAMES], values: planeStateValues(truth, 2000), covariance: null, referenceEpochYr: 2000 } }
    const [blind, informed] = [timed(() => fitOrbit({ kind: 'plane', measures })), fitOrbit({ kind: 'plane', measures, start })]
    ms.push(blind.ms)
    const [found, best] = [blind.value, informed].map((outcome) => (outcome.ok ? outcome.result.statistics.chiSquare : Infinity))
    if (!(found! <= 1.01 * best!)) missed.push(seed + i)
  }
  return {
    what: `plane with times, either sense, three in four bound over 0.5–3 periods, one in four e 1–3, N = 50, σ 0.5–3 % of r, ${count} cases`, reach: 'at least 200 of 200',
    measured: `${count - missed.length} of ${count}, median ${median(ms).toFixed(1)} ms${missed.length > 0 ? ` (missed seeds ${missed.join(', ')})` : ''}`, met: missed.length === 0,
  }
}

/** Without times: right where the fit is no worse than the true conic. */
export const plane: Section = ({ systems, seed }) => {
  const count = Math.round(systems * 40 / 3)
  const drawn = Array.from({ length: count + 1 }, (_, i) => drawConic(seed + i))
  const fits = drawn.map(({ measures }) => timed(() => fitOrbit({ kind: 'plane', measures }))).slice(1)
  const right = fits.filter(({ value }, i) => value.ok && value.result.statistics.chiSquare <= 1.01 * drawn[i + 1]!.chiSquare).length
  return [
    { what: 'plane without times, e 0–3', reach: 'at least 3,990 of 4,000', measured: `${right} of ${count}, median ${median(fits.map((fit) => fit.ms)).toFixed(2)} ms`, met: right >= count * 0.9975 },
    timedRow(Math.min(200, systems), seed),
  ]
}
