/** Comets and minor planets: orbits from nothing, refits, and motion with the planets beside SciPy's integration. */
import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { fitOrbit, type FitOutcome, type FitState } from '../../../fitting'
import { earthHeliocentric, planetHeliocentric, PLANETS, SUN_GRAVITATION_AU3_PER_D2 } from '../../../fitting/earth'
import { planetMotion } from '../../../fitting/models/planet-motion'
import { PLANET_GRAVITATION } from '../../../fitting/models/planet-table'
import { EQUATORIAL_NAMES, sightOfState } from '../../../fitting/models/sight-frame'
import { ORBIT_CLASSES, simulatedSightings, type SimulatedSightings } from '../../builders/simulated-sightings'
import { median, notServed, timed, type Row, type Section } from './table'

const RIGHT_WITHIN = 1.01
const SIGHTINGS = 12
const REFITS = 40
const ARCSEC = Math.PI / 180 / 3600
const YEAR_DAYS = 365.25
const EPOCH_JD_TT = 2455000.5

/** The true orbit as a state to refit from: what a blind fit is measured against. */
function trueState({ state, epochJdTt }: SimulatedSightings): FitState {
  const earth = new Float64Array(6)
  earthHeliocentric(epochJdTt, earth)
  const line = [0, 1, 2].map((k) => state[k]! - earth[k]!)
  const distance = Math.hypot(...line)
  const reference = { jdTt: epochJdTt, earth: Array.from(earth), direction: line.map((part) => part / distance) as [number, number, number] }
  return { model: 'sight', names: [...EQUATORIAL_NAMES], values: Array.from(sightOfState(reference, state)), covariance: null, referenceEpochYr: 0, reference, forces: 'sun' }
}

const chiSquareOf = (outcome: FitOutcome) => (outcome.ok ? outcome.result.statistics.chiSquare : Infinity)

function blindRow(systems: number, seed: number): Row {
  const count = Math.max(1, Math.round(systems / ORBIT_CLASSES.length)) * ORBIT_CLASSES.length
  const ms: number[] = []
  const missed: number[] = []
  for (let i = 0; i <= count; i++) {
    const drawn = simulatedSightings({ seed: seed + i, orbitClass: ORBIT_CLASSES[i % ORBIT_CLASSES.length]!, count: SIGHTINGS })
    const request = { kind: 'equatorial', measures: drawn.measures, settings: { forces: 'sun' } } as const
    const blind = timed(() => fitOrbit(request))
    if (i === 0) continue
    ms.push(blind.ms)
    const best = Math.min(chiSquareOf(blind.value), chiSquareOf(fitOrbit({ ...request, start: { state: trueState(drawn) } })))
    if (!(chiSquareOf(blind.value) <= RIGHT_WITHIN * best)) missed.push(seed + i)
  }
  const right = count - missed.length
  return {
    what: `equatorial, blind, 12 measures of 0.5″ over 5–120 d, five classes, ${count} cases`, reach: 'at least 1,490 of 1,500 right',
    measured: `${right} of ${count}${missed.length > 0 ? ` (missed seeds ${missed.join(', ')})` : ''}, median ${median(ms).toFixed(0)} ms`, met: right >= count * 1490 / 1500,
  }
}

/** Median time of a refit from the fit's own state, ms. */
function refitMs(options: { count: number; seed: number; forces: 'sun' | 'planets'; arcDays: readonly [number, number] }): number {
  const ms: number[] = []
  for (let i = 0; i <= options.count; i++) {
    const { measures } = simulatedSightings({ seed: options.seed + i, orbitClass: 'main belt', count: 50, arcDays: options.arcDays, ...(options.forces === 'planets' ? { motionFrom: planetMotion } : {}) })
    const request = { kind: 'equatorial', measures, settings: { forces: options.forces } } as const
    const first = fitOrbit(request)
    if (!first.ok) continue
    const again = timed(() => fitOrbit({ ...request, start: { state: first.result.state } }))
    if (i > 0) ms.push(again.ms)
  }
  return median(ms)
}

/** Orbits about the Sun from nothing, and again from their own state. */
export const equatorial: Section = ({ systems, seed }) => {
  const ms = refitMs({ count: Math.min(REFITS, systems), seed, forces: 'sun', arcDays: [5, 120] })
  return [
    blindRow(systems, seed),
    { what: 'equatorial, refit at N = 50, the Sun only', reach: 'under 2 ms', measured: `median ${ms.toFixed(2)} ms of the whole door (errors, residuals, influence with it)`, met: ms < 2 },
  ]
}

/** Places of the planets every quarter of a day, for a spline. */
function planetRows(): number[][] {
  const state = new Float64Array(6)
  return Array.from({ length: 4 * 770 + 1 }, (_, i) => {
    const day = -385 + i / 4
    return [day, ...PLANETS.flatMap((planet) => {
      planetHeliocentric(planet, EPOCH_JD_TT + day, state)
      return Array.from(state.subarray(0, 3))
    })]
  })
}

interface Body {
  state: number[]
  days: number
}

function movedByScipy(bodies: readonly Body[]): number[][] {
  const folder = mkdtempSync(join(tmpdir(), 'bench-planets-'))
  try {
    const file = join(folder, 'request.json')
    writeFileSync(file, JSON.stringify({ mu: SUN_GRAVITATION_AU3_PER_D2, gravitation: Array.from(PLANET_GRAVITATION), planets: planetRows(), bodies }))
    const { status, stdout, stderr } = spawnSync('/usr/bin/python3', [join(dirname(process.argv[1]!), 'fits/scipy_planets.py'), file], { encoding: 'utf8', maxBuffer: 1 << 26 })
    if (status !== 0) throw new Error(`The Python script of the benchmark failed: ${stderr}`)
    return JSON.parse(stdout) as number[][]
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

/** Largest angle, seen from the Sun, between our motion over a year and SciPy's. */
function yearRow(seed: number): Row {
  const bodies = Array.from({ length: 40 }, (_, i): Body => ({
    state: Array.from(simulatedSightings({ seed: seed + i, orbitClass: ORBIT_CLASSES[i % ORBIT_CLASSES.length]! }).state), days: i % 2 === 0 ? YEAR_DAYS : -YEAR_DAYS,
  }))
  const expected = movedByScipy(bodies)
  const found = new Float64Array(6)
  const arcsec = bodies.map(({ state, days }, i) => {
    const motion = planetMotion(EPOCH_JD_TT)
    motion.begin(Float64Array.from(state), false)
    motion.at(days, found)
    const there = expected[i]!
    return Math.hypot(found[0]! - there[0]!, found[1]! - there[1]!, found[2]! - there[2]!) / Math.hypot(there[0]!, there[1]!, there[2]!) / ARCSEC
  })
  const largest = Math.max(...arcsec)
  return { what: 'a year with the planets against SciPy’s DOP853 at 1e-13, 40 bodies', reach: 'held to 0.01″', measured: `largest ${largest.toExponential(1)}″, median ${median(arcsec).toExponential(1)}″ seen from the Sun`, met: largest < 0.01 }
}

/** A year with the planets, refitted and held against SciPy. */
export const planets: Section = ({ systems, seed, hasScipy }) => {
  const ms = refitMs({ count: Math.min(10, systems), seed, forces: 'planets', arcDays: [300, 365] })
  return [
    { what: 'equatorial with the planets, refit at N = 50 over 300–365 d', reach: 'under 100 ms', measured: `median ${ms.toFixed(0)} ms of the whole door`, met: ms < 100 },
    hasScipy ? yearRow(seed) : notServed('a year with the planets against a tight integration in SciPy', 'held to 0.01″', 'SciPy is not installed'),
  ]
}
