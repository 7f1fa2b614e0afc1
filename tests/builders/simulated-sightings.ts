import { observerHeliocentric } from '../../fitting/earth'
import { perihelionFromState, stateFromPerihelion, type PerihelionElements } from '../../fitting/models/perihelion'
import { emptyLineOfSight, lineOfSightInto, sunMotion, type Motion } from '../../fitting/models/line-of-sight'
import { randomStream } from '../../fitting/random'
import type { EquatorialMeasure } from '../../fitting/types'

export const ORBIT_CLASSES = ['main belt', 'near-Earth', 'parabolic', 'near-parabolic', 'hyperbolic'] as const
export type OrbitClass = (typeof ORBIT_CLASSES)[number]

export interface SightingOptions {
  seed: number
  orbitClass: OrbitClass
  count?: number
  /** Arc in days: from, to; drawn evenly in the logarithm. */
  arcDays?: readonly [number, number]
  /** Error of each coordinate, arcsec; 0 leaves the measures exact. */
  sigmaArcsec?: number
  /** Motion that the body follows; the Sun alone where left out. */
  motionFrom?: (epochJdTt: number) => Motion
}

export interface SimulatedSightings {
  measures: EquatorialMeasure[]
  truth: PerihelionElements
  /** Heliocentric state at the middle of the arc, and its time. */
  state: Float64Array
  epochJdTt: number
}

const DEG = Math.PI / 180
const ARCSEC = DEG / 3600
/** What can be seen: farther than 40° from the Sun, between 0.02 and 5 au away, and no closer to the Sun than 0.2 au. */
const VISIBLE = { elongationRad: 40 * DEG, nearestAu: 0.02, farthestAu: 5, sunAu: 0.2 }

type Draw = (from: number, to: number) => number

function shapeOf(orbitClass: OrbitClass, draw: Draw): { q: number; e: number; inclinationRad: number } {
  const anyTilt = () => Math.acos(draw(-1, 1))
  if (orbitClass === 'main belt') {
    const e = draw(0.02, 0.3)
    return { q: draw(2.1, 3.4) * (1 - e), e, inclinationRad: draw(0, 25) * DEG }
  }
  if (orbitClass === 'near-Earth') return { q: draw(0.3, 1.25), e: draw(0.1, 0.85), inclinationRad: draw(0, 40) * DEG }
  if (orbitClass === 'parabolic') return { q: draw(0.2, 3), e: 1, inclinationRad: anyTilt() }
  if (orbitClass === 'near-parabolic') return { q: draw(0.2, 3), e: draw(0.97, 1.01), inclinationRad: anyTilt() }
  return { q: draw(0.3, 3), e: draw(1.05, 3), inclinationRad: anyTilt() }
}

function truthOf(orbitClass: OrbitClass, middle: number, draw: Draw): PerihelionElements {
  const { q, e, inclinationRad } = shapeOf(orbitClass, draw)
  const half = e < 0.96 ? 182.6 * Math.pow(q / (1 - e), 1.5) : 200
  return {
    perihelionDistanceAu: q, eccentricity: e, inclinationRad, nodeRad: draw(0, 2 * Math.PI), argumentOfPerihelionRad: draw(0, 2 * Math.PI),
    perihelionTimeJdTt: middle + draw(-half, half),
  }
}

/** Right ascension and declination from a station; null where the body could not be seen. */
function directionAt(motion: Motion, site: EquatorialMeasure['site'], jdUtc: number): { raRad: number; decRad: number } | null {
  const { jdTt, place, sunVelocity } = observerHeliocentric(site, jdUtc)
  const found = emptyLineOfSight()
  if (!lineOfSightInto({ jdTt, observer: Float64Array.from(place), sunVelocity: Float64Array.from(sunVelocity) }, motion, 0.01, found, false)) return null
  const [x, y, z] = found.line as unknown as [number, number, number]
  const elongation = Math.acos(-(x * place[0] + y * place[1] + z * place[2]) / found.distance / Math.hypot(...place))
  const sun = Math.hypot(found.state[0]!, found.state[1]!, found.state[2]!)
  if (elongation < VISIBLE.elongationRad || found.distance < VISIBLE.nearestAu || found.distance > VISIBLE.farthestAu || sun < VISIBLE.sunAu) return null
  return { raRad: Math.atan2(y, x), decRad: Math.asin(z / found.distance) }
}

/**
 * Measures of a body on a true orbit, drawn again until it can be seen at every time.
 * @param options seed, class of orbit, number, arc, error.
 */
export function simulatedSightings(options: SightingOptions): SimulatedSightings {
  const { seed, orbitClass, count = 12, arcDays = [5, 120], sigmaArcsec = 0.5, motionFrom = sunMotion } = options
  const random = randomStream(seed)
  const draw: Draw = (from, to) => from + (to - from) * random.uniform()
  for (;;) {
    const days = arcDays[0] * Math.pow(arcDays[1] / arcDays[0], random.uniform())
    const epochJdTt = 2455000 + draw(0, 3650)
    const truth = truthOf(orbitClass, epochJdTt, draw)
    const state = stateFromPerihelion(truth, epochJdTt)
    const motion = motionFrom(epochJdTt)
    motion.begin(state, false)
    const site = { longitudeEastDeg: draw(0, 360), rhoCosPhi: 0.8, rhoSinPhi: 0.6 }
    const measures: EquatorialMeasure[] = []
    for (let i = 0; i < count; i++) {
      const jdUtc = epochJdTt - days / 2 + days * (i === 0 ? 0 : i === count - 1 ? 1 : random.uniform())
      const seen = directionAt(motion, site, jdUtc)
      if (seen === null) break
      const raRad = seen.raRad + sigmaArcsec * ARCSEC * random.normal() / Math.cos(seen.decRad)
      measures.push({
        id: `m${i}`, observer: `observer ${i % 3}`, site, jdUtc, raRad: (raRad + 2 * Math.PI) % (2 * Math.PI), decRad: seen.decRad + sigmaArcsec * ARCSEC * random.normal(),
        sigmaRaCosDecArcsec: sigmaArcsec || 0.5, sigmaDecArcsec: sigmaArcsec || 0.5,
      })
    }
    if (measures.length === count) return { measures, truth, state, epochJdTt }
  }
}

/** Elements of the true orbit at a date, after the motion it follows. */
export function truthAt({ state, epochJdTt }: SimulatedSightings, jdTt: number, motion: Motion = sunMotion(epochJdTt)): PerihelionElements {
  const moved = new Float64Array(6)
  motion.begin(state, false)
  motion.at(jdTt - motion.epochJdTt, moved)
  return perihelionFromState(moved, jdTt)
}

