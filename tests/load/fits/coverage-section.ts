/** Do the published intervals hold the true elements as often as they say? */
import { fitOrbit, type FitResult, type ProfileInterval } from '../../../fitting'
import { simulatedPair, type PairOptions, type SimulatedPair } from './simulated-pairs'
import { percent, type Options, type Row, type Section } from './table'

const SETS: [string, Omit<PairOptions, 'seed'>][] = [
  ['well-covered, 1–3 periods', { count: 50, coverage: [1, 3], form: 'rectangular', eccentricity: [0.1, 0.9] }],
  ['poor arcs, 0.4–0.7 periods', { count: 50, coverage: [0.4, 0.7], form: 'rectangular', eccentricity: [0.1, 0.9] }],
]
const NAMES = ['period', 'eccentricity', 'semiMajorAxis'] as const

interface Tally {
  linear68: number
  linear95: number
  profile68: number
  profile95: number
  of: number
}

function trueValue({ truth }: SimulatedPair, name: (typeof NAMES)[number]): number {
  return { period: truth.periodYr, eccentricity: truth.eccentricity, semiMajorAxis: truth.semiMajorAxisArcsec }[name]
}

const holds = (value: number, low: number | null, high: number | null) => (low === null || value >= low) && (high === null || value <= high)

function count(tally: Tally, pair: SimulatedPair, { elements }: FitResult, profile: Record<string, ProfileInterval>): void {
  for (const name of NAMES) {
    const [{ value, sigma }, interval, truth] = [elements[name]!, profile[name], trueValue(pair, name)]
    if (sigma === null || interval === undefined) continue
    tally.of++
    if (Math.abs(value - truth) <= sigma) tally.linear68++
    if (Math.abs(value - truth) <= 1.96 * sigma) tally.linear95++
    if (holds(truth, interval.low68, interval.high68)) tally.profile68++
    if (holds(truth, interval.low95, interval.high95)) tally.profile95++
  }
}

function rowOf(name: string, drawn: Omit<PairOptions, 'seed'>, { systems, seed }: Options): Row {
  const tally: Tally = { linear68: 0, linear95: 0, profile68: 0, profile95: 0, of: 0 }
  const fits = Math.min(200, systems)
  for (let i = 1; i <= fits; i++) {
    const pair = simulatedPair({ ...drawn, seed: seed + i })
    const outcome = fitOrbit({ kind: 'relative', measures: pair.measures, settings: { errors: 'profile' }, start: { state: pair.trueState } })
    if (outcome.ok && outcome.result.profile) count(tally, pair, outcome.result, outcome.result.profile)
  }
  const { of } = tally
  return {
    what: `coverage of P, e, a by profile intervals, ${name}, ${fits} systems`, reach: '68 ± 3 %, 95 ± 2 %',
    measured: `profile ${percent(tally.profile68, of)} and ${percent(tally.profile95, of)}; linearised ${percent(tally.linear68, of)} and ${percent(tally.linear95, of)} of ${of}`,
    met: Math.abs(tally.profile68 / of - 0.6827) <= 0.03 && Math.abs(tally.profile95 / of - 0.95) <= 0.02,
  }
}

/** Both sets. */
export const coverage: Section = (options) => SETS.map(([name, drawn]) => rowOf(name, drawn, options))
