/** Relative orbits: how often and how fast they are found, beside SciPy on the same measures. */
import { fitOrbit, type FitOutcome, type FitSettings } from '../../../fitting'
import { keplerPath } from '../../../fitting/models/relative-kepler'
import { prepareSkyMeasures } from '../../../fitting/models/sky-measure'
import { settlePath } from '../../../fitting/search/settle-path'
import { simulatedPair, type PairOptions, type SimulatedPair } from './simulated-pairs'
import { fitByScipy, scipyData, type ScipyAnswer } from './scipy'
import { median, timed, type Row, type Section } from './table'

type Drawn = Omit<PairOptions, 'seed'>
type SettingsOf = (pair: SimulatedPair) => FitSettings

/** Found: χ² within this of the better of the blind fit and a fit started at the true orbit. */
const FOUND_WITHIN = 1.01
/** SciPy's grid takes tens to hundreds of milliseconds a system: so many of the systems suffice for its median. */
const SCIPY_SYSTEMS = 60
const WARM_UP = 20
const USUAL: Drawn = { count: 50, coverage: [0.3, 3], form: 'rectangular' }
const sixth: SettingsOf = (pair) => ({ shortestPeriodYr: pair.spanYr / 6 })

const chiSquareOf = (outcome: FitOutcome) => (outcome.ok ? outcome.result.statistics.chiSquare : Infinity)

interface Found {
  pairs: SimulatedPair[]
  best: number[]
  ms: number[]
  missed: number[]
}

/** Blind fits of a set; the first ones warm the engine up and are left out. */
function findAll(options: Drawn, settingsOf: SettingsOf, systems: number, seed: number): Found {
  const found: Found = { pairs: [], best: [], ms: [], missed: [] }
  for (let i = 1 - WARM_UP; i <= systems; i++) {
    const pair = simulatedPair({ ...options, seed: seed + Math.abs(i) })
    const settings = settingsOf(pair)
    const blind = timed(() => fitOrbit({ kind: 'relative', measures: pair.measures, settings }))
    if (i <= 0) continue
    const informed = chiSquareOf(fitOrbit({ kind: 'relative', measures: pair.measures, settings, start: { state: pair.trueState } }))
    const best = Math.min(informed, chiSquareOf(blind.value))
    found.pairs.push(pair)
    found.best.push(best)
    found.ms.push(blind.ms)
    if (!(chiSquareOf(blind.value) <= FOUND_WITHIN * best)) found.missed.push(seed + i)
  }
  return found
}

const seeds = (missed: number[]) => (missed.length === 0 ? '' : ` (missed seeds ${missed.join(', ')})`)

function besideScipy({ pairs, best, ms }: Found, settingsOf: SettingsOf): { words: string; ratio: number } {
  const some = pairs.slice(0, SCIPY_SYSTEMS)
  const answers = fitByScipy(some.map((pair) => ({ ...scipyData(pair.measures), shortest: settingsOf(pair).shortestPeriodYr ?? 0.5 })))
  const right = answers.filter((answer, i) => answer.chiSquare <= FOUND_WITHIN * best[i]!).length
  const theirs = median(answers.map((answer) => answer.ms))
  const ratio = theirs / median(ms.slice(0, SCIPY_SYSTEMS))
  return { words: `SciPy grid + lm: ${right} of ${some.length} right, median ${theirs.toFixed(1)} ms: ${ratio.toFixed(1)} times ours`, ratio }
}

/** Blind, shortest period a sixth of the span, with SciPy beside it. */
export const blind: Section = ({ systems, seed, hasScipy }) => {
  const found = findAll(USUAL, sixth, systems, seed)
  const right = systems - found.missed.length
  const ours = median(found.ms)
  const rows: Row[] = [{
    what: `relative, blind, ${systems} systems, shortest period span/6`, reach: 'at most 1 of 300 missed; median at N = 50 under 4 ms',
    measured: `${right} of ${systems} right, median ${ours.toFixed(2)} ms of the whole door${seeds(found.missed)}`, met: found.missed.length <= Math.max(1, systems / 300) && ours < 4,
  }]
  if (!hasScipy) return rows
  const { words, ratio } = besideScipy(found, sixth)
  return [...rows, { what: 'the same beside SciPy', reach: 'at least 20 times faster than SciPy\'s grid + lm', measured: words, met: ratio >= 20 }]
}

/** Blind with the default shortest period, and arcs of many periods. */
export const shortPeriods: Section = ({ systems, seed, hasScipy }) => {
  const usual = findAll(USUAL, () => ({}), systems, seed)
  const many = findAll({ ...USUAL, coverage: [3, 40] }, () => ({}), Math.min(60, systems), seed)
  const [manySystems, ours] = [many.ms.length, median([...usual.ms, ...many.ms])]
  const rows: Row[] = [{
    what: 'the same, default shortest period; further systems over 3–40 periods', reach: 'at least 58 of 60; median under 25 ms',
    measured: `${systems - usual.missed.length} of ${systems} and ${manySystems - many.missed.length} of ${manySystems} right, median ${ours.toFixed(1)} ms${seeds([...usual.missed, ...many.missed])}`,
    met: many.missed.length <= 2 * manySystems / 60 && usual.missed.length <= 2 * systems / 60 && ours < 25,
  }]
  if (!hasScipy) return rows
  return [...rows, { what: 'the same beside SciPy', reach: 'no figure asked', measured: besideScipy({ ...usual, pairs: usual.pairs.slice(0, 10) }, () => ({})).words, met: null }]
}

/** The solver alone, as SciPy's is measured. */
function solverMs({ measures, neighbourState }: SimulatedPair): number {
  const { used } = prepareSkyMeasures(measures, {})
  const path = keplerPath(neighbourState.referenceEpochYr)
  return timed(() => settlePath(path, used, neighbourState.values)).ms
}

/** From a neighbouring orbit: SciPy from the same start. */
export const refit: Section = ({ systems, seed, hasScipy }) => {
  const pairs = Array.from({ length: systems }, (_, i) => simulatedPair({ ...USUAL, seed: seed + i + 1 }))
  const fit = (pair: SimulatedPair) => timed(() => fitOrbit({ kind: 'relative', measures: pair.measures, start: { state: pair.neighbourState } }))
  for (const pair of pairs.slice(0, WARM_UP)) fit(pair)
  const fits = pairs.map(fit)
  const [door, solver] = [median(fits.map(({ ms }) => ms)), median(pairs.map(solverMs))]
  const ours = `median ${solver.toFixed(2)} ms the solver, ${door.toFixed(2)} ms the whole door with errors and residuals`
  const wanted = { what: 'relative, refit from a neighbour', reach: 'at least 15 times faster than SciPy least_squares lm from the same start' }
  if (!hasScipy) return [{ ...wanted, measured: ours, met: null }]
  const answers: ScipyAnswer[] = fitByScipy(pairs.map((pair) => ({ ...scipyData(pair.measures), start: pair.neighbourConstants })))
  const theirs = median(answers.map(({ ms }) => ms))
  const best = fits.map(({ value }, i) => Math.min(chiSquareOf(value), answers[i]!.chiSquare))
  const right = (values: number[]) => values.filter((value, i) => value <= FOUND_WITHIN * best[i]!).length
  return [{
    ...wanted, met: theirs / solver >= 15,
    measured: `${ours}, ${right(fits.map(({ value }) => chiSquareOf(value)))} right; SciPy ${theirs.toFixed(2)} ms, ${right(answers.map(({ chiSquare }) => chiSquare))} right of ${systems}; ratio ${(theirs / solver).toFixed(1)} (whole door ${(theirs / door).toFixed(1)})`,
  }]
}

const DEGENERATE: [string, Partial<Drawn>][] = [
  ['e = 0', { eccentricity: [0, 0] }], ['i = 0°', { inclinationRad: 0 }], ['i = 90°', { inclinationRad: Math.PI / 2 }],
  ['i = 180°', { inclinationRad: Math.PI }], ['e = 0.97', { eccentricity: [0.97, 0.97] }],
]

/** Orbits at the edges of the elements. */
export const degenerate: Section = ({ systems, seed }) => {
  const count = Math.min(60, systems)
  const sets = DEGENERATE.map(([name, options]) => ({ name, found: findAll({ ...USUAL, ...options }, sixth, count, seed) }))
  return [{
    what: `degenerate sets, ${count} each`, reach: 'at least 59 of 60 each',
    measured: sets.map(({ name, found }) => `${name}: ${count - found.missed.length}${seeds(found.missed)}`).join(', '),
    met: sets.every(({ found }) => found.missed.length <= Math.max(1, count / 60)),
  }]
}
