/** Conics in their plane: noise-bearing distances about conics of e from 0 to 3, without and with times. */
import { fitOrbit, randomStream, type PlaneMeasure } from '../../../fitting'
import { median, notServed, timed, type Section } from './table'

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

/** Without times: right where the fit is no worse than the true conic. */
export const plane: Section = ({ systems, seed }) => {
  const count = Math.round(systems * 40 / 3)
  const drawn = Array.from({ length: count + 1 }, (_, i) => drawConic(seed + i))
  const fits = drawn.map(({ measures }) => timed(() => fitOrbit({ kind: 'plane', measures }))).slice(1)
  const right = fits.filter(({ value }, i) => value.ok && value.result.statistics.chiSquare <= 1.01 * drawn[i + 1]!.chiSquare).length
  return [
    { what: 'plane without times, e 0–3', reach: 'at least 3,990 of 4,000', measured: `${right} of ${count}, median ${median(fits.map((fit) => fit.ms)).toFixed(2)} ms`, met: right >= count * 0.9975 },
    notServed('plane with times', 'at least 200 of 200'),
  ]
}
