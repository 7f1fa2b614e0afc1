/**
 * Prints how often and how fast orbits are found without a starting guess: npm run bench:fit [systems] [seed]
 * Each system is fitted blind and once more from its true orbit; it counts as found where χ² ≤ 1.01 × the better of the two. The first
 * fit of each set warms the engine up and is left out of the times. Times are processor time of this process, which other work on the
 * machine disturbs less than the clock.
 */
import { performance } from 'node:perf_hooks'
import { fitOrbit, type FitSettings } from '../fitting'
import { simulatedPair, type PairOptions, type SimulatedPair } from './bench/simulated-pairs'

interface Set {
  name: string
  options: Omit<PairOptions, 'seed'>
  settings: (pair: SimulatedPair) => FitSettings
}

const FOUND_WITHIN = 1.01
const sixth = (pair: SimulatedPair): FitSettings => ({ shortestPeriodYr: pair.spanYr / 6 })

const SETS: Set[] = [
  { name: 'east, north; shortest period a sixth of the arc', options: { count: 50, coverage: [0.3, 3], form: 'rectangular' }, settings: sixth },
  { name: 'θ, ρ; shortest period a sixth of the arc', options: { count: 50, coverage: [0.3, 3], form: 'polar' }, settings: sixth },
  { name: 'east, north; default shortest period', options: { count: 50, coverage: [0.3, 3], form: 'rectangular' }, settings: () => ({}) },
  { name: 'east, north; default shortest period, 3 to 10 periods', options: { count: 50, coverage: [3, 10], form: 'rectangular' }, settings: () => ({}) },
]

const [systems = 100, firstSeed = 1] = process.argv.slice(2).map(Number)

/** Processor time of a piece of work, ms. */
function timed<T>(work: () => T): { value: T; cpuMs: number; wallMs: number } {
  const cpu = process.cpuUsage()
  const wall = performance.now()
  const value = work()
  const used = process.cpuUsage(cpu)
  return { value, cpuMs: (used.user + used.system) / 1000, wallMs: performance.now() - wall }
}

function quantile(values: readonly number[], part: number): number {
  return [...values].sort((a, b) => a - b)[Math.min(values.length - 1, Math.floor(values.length * part))]!
}

function chiSquareOf(outcome: ReturnType<typeof fitOrbit>): number {
  return outcome.ok ? outcome.result.statistics.chiSquare : Infinity
}

interface Tally {
  found: number
  cpu: number[]
  wall: number[]
  refit: number[]
  missed: number[]
}

function run(set: Set): Tally {
  const tally: Tally = { found: 0, cpu: [], wall: [], refit: [], missed: [] }
  for (let i = 0; i <= systems; i++) {
    const seed = firstSeed + i
    const pair = simulatedPair({ ...set.options, seed })
    const settings = set.settings(pair)
    const blind = timed(() => fitOrbit({ kind: 'relative', measures: pair.measures, settings }))
    const refit = timed(() => fitOrbit({ kind: 'relative', measures: pair.measures, settings, start: { state: pair.trueState } }))
    if (i === 0) continue
    tally.cpu.push(blind.cpuMs)
    tally.wall.push(blind.wallMs)
    tally.refit.push(refit.cpuMs)
    const isFound = chiSquareOf(blind.value) <= FOUND_WITHIN * Math.min(chiSquareOf(blind.value), chiSquareOf(refit.value))
    if (isFound) tally.found++
    else tally.missed.push(seed)
  }
  return tally
}

console.log(`${systems} systems of 50 measures a set, seeds ${firstSeed + 1} to ${firstSeed + systems}; e 0–0.95, any inclination, σ 0.5–5 % of a`)
for (const set of SETS) {
  const { found, cpu, wall, refit, missed } = run(set)
  console.log(`\n${set.name}`)
  console.log(`  found      ${found} of ${systems}${missed.length > 0 ? ` (missed seeds ${missed.join(', ')})` : ''}`)
  console.log(`  blind      median ${quantile(cpu, 0.5).toFixed(2)} ms, 90 % ${quantile(cpu, 0.9).toFixed(2)} ms of processor time; clock median ${quantile(wall, 0.5).toFixed(2)} ms`)
  console.log(`  refit      median ${quantile(refit, 0.5).toFixed(2)} ms, 90 % ${quantile(refit, 0.9).toFixed(2)} ms of processor time`)
}
