/**
 * The line of sight to a moving body.
 *
 * Symbols: R the observer's heliocentric place, V the Sun's velocity about the barycentre, τ light-time, c speed of light,
 *   d = r(t − τ) − R − Vτ,  cτ = |d|
 * because the light left the body where it was about the barycentre at t − τ, while R is counted from the Sun at t.
 *
 * The motion is taken at one light-time guessed from the reference and carried over the rest δ by r − vδ − ½μδ²r/r³; what that leaves out
 * is below 1e-12 au for every body that is not grazing the Sun.
 *
 * Source: Explanatory Supplement to the Astronomical Almanac (1992), 3.31.
 */
import { moveInto } from '../conic/universal'
import { LIGHT_AU_PER_D, SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth/constants'

/** Who looks where from, and when. */
export interface Onlooker {
  /** JD of TT. */
  jdTt: number
  /** Heliocentric observer, au, and the Sun's barycentric velocity, au/d; ICRS axes. */
  observer: Float64Array
  sunVelocity: Float64Array
}

/** A way of moving from the state at the epoch to another time. */
export interface Motion {
  /** JD of TT of the epoch. */
  epochJdTt: number
  /** Takes the state at the epoch; false where it cannot be moved. */
  begin(state: Float64Array, withPartials: boolean): boolean
  /** State so many days after the epoch (a Julian date would round them) and, where asked, its 36 derivatives by the state at the epoch. */
  at(days: number, out: Float64Array, partials?: Float64Array): boolean
}

/**
 * Motion about the Sun alone.
 * @param epochJdTt JD of TT of the state.
 * @returns the motion along a conic.
 * Source: Battin 1999, Mathematics and Methods of Astrodynamics, 4.5.
 */
export function sunMotion(epochJdTt: number): Motion {
  const start = new Float64Array(6)
  return {
    epochJdTt,
    begin(state) {
      start.set(state)
      return true
    },
    at: (days, out, partials) => moveInto(start, MU, days, out, partials),
  }
}

const moved = new Float64Array(6)
const moves = new Float64Array(36)

/** What `lineOfSightInto` finds. */
export interface LineOfSight {
  /** d, au, from the observer. */
  line: Float64Array
  distance: number
  lightTimeDays: number
  /** Heliocentric state when the light left. */
  state: Float64Array
  /** Row-major 3 × 6 derivatives of d by the state at the epoch. */
  partials: Float64Array
}

/**
 * Room for one line of sight.
 * @returns zeros.
 */
export function emptyLineOfSight(): LineOfSight {
  return { line: new Float64Array(3), distance: 0, lightTimeDays: 0, state: new Float64Array(6), partials: new Float64Array(18) }
}

/** Light-time and what is left of it after the guess: c(τ₀ + δ) = |d₀ − (v + V)δ + ½aδ²|, by Newton's method. */
function restOfLightTime(sight: Omit<Onlooker, 'jdTt'>, guess: number, pull: number): number {
  const { observer: o, sunVelocity: s } = sight
  let rest = 0
  for (let i = 0; i < 4; i++) {
    let squared = 0
    let change = 0
    for (let k = 0; k < 3; k++) {
      const d = moved[k]! * (1 - 0.5 * pull * rest * rest) - moved[k + 3]! * rest - o[k]! - s[k]! * (guess + rest)
      squared += d * d
      change -= d * (moved[k + 3]! + s[k]! + pull * rest * moved[k]!)
    }
    const length = Math.sqrt(squared)
    const next = rest - (length - LIGHT_AU_PER_D * (guess + rest)) / (change / length - LIGHT_AU_PER_D)
    if (Math.abs(next - rest) <= 1e-15) return next
    rest = next
  }
  return rest
}

/**
 * The line of sight to a moving body, light-time taken off.
 * @param sight time, observer and the Sun's velocity.
 * @param motion that has begun.
 * @param guessDays light-time to begin with, d.
 * @param out takes the line of sight.
 * @param withPartials whether out.partials is filled too.
 * @returns false where the motion cannot be followed.
 * Source: Explanatory Supplement to the Astronomical Almanac (1992), 3.31.
 */
export function lineOfSightInto(sight: Onlooker, motion: Motion, guessDays: number, out: LineOfSight, withPartials: boolean): boolean {
  if (!motion.at(sight.jdTt - motion.epochJdTt - guessDays, moved, withPartials ? moves : undefined)) return false
  const r = Math.sqrt(moved[0]! * moved[0]! + moved[1]! * moved[1]! + moved[2]! * moved[2]!)
  const pull = MU / (r * r * r)
  const rest = restOfLightTime(sight, guessDays, pull)
  const tau = guessDays + rest
  let squared = 0
  for (let k = 0; k < 3; k++) {
    out.state[k] = moved[k]! * (1 - 0.5 * pull * rest * rest) - moved[k + 3]! * rest
    out.state[k + 3] = moved[k + 3]! + pull * rest * moved[k]!
    out.line[k] = out.state[k]! - sight.observer[k]! - sight.sunVelocity[k]! * tau
    squared += out.line[k]! * out.line[k]!
  }
  out.distance = Math.sqrt(squared)
  out.lightTimeDays = tau
  if (!(out.distance > 0 && out.distance < Infinity)) return false
  if (withPartials) partialsOfLine(sight, rest, out)
  return true
}

/**
 * Rate of the line of sight, with the light-time's own change.
 * @param sunVelocity of the Sun about the barycentre, au/d.
 * @param found the line of sight.
 * @param earthVelocity of the observer, taken to go with the Earth's centre, au/d.
 * @returns ḋ = v − Ė − τ̇(v + V), au/d, with cτ̇ = d̂·ḋ.
 * Source: the derivative of the equation in the head of this file.
 */
export function lineRate(sunVelocity: ArrayLike<number>, { line, distance, state }: LineOfSight, earthVelocity: ArrayLike<number>): [number, number, number] {
  let closing = LIGHT_AU_PER_D
  let opening = 0
  for (let k = 0; k < 3; k++) {
    closing += line[k]! / distance * (state[k + 3]! + sunVelocity[k]!)
    opening += line[k]! / distance * (state[k + 3]! - earthVelocity[k]!)
  }
  const slowing = opening / closing
  const rate = (k: number) => state[k + 3]! - earthVelocity[k]! - slowing * (state[k + 3]! + sunVelocity[k]!)
  return [rate(0), rate(1), rate(2)]
}

/** dd = Φ dx − (v + V) dτ with c dτ = d̂·dd. */
function partialsOfLine(sight: Pick<Onlooker, 'sunVelocity'>, rest: number, out: LineOfSight): void {
  const { line, distance, partials, state } = out
  const { sunVelocity: s } = sight
  let closing = LIGHT_AU_PER_D
  for (let k = 0; k < 3; k++) closing += line[k]! / distance * (state[k + 3]! + s[k]!)
  for (let j = 0; j < 6; j++) {
    let along = 0
    for (let k = 0; k < 3; k++) {
      partials[6 * k + j] = moves[6 * k + j]! - rest * moves[6 * k + j + 18]!
      along += line[k]! / distance * partials[6 * k + j]!
    }
    for (let k = 0; k < 3; k++) partials[6 * k + j] = partials[6 * k + j]! - (state[k + 3]! + s[k]!) * along / closing
  }
}

/**
 * Light-time as if the body had stood still since the epoch.
 * @param sight observer.
 * @param state at the epoch.
 * @returns light-time, d.
 */
export function roughLightTime({ observer: o }: Pick<Onlooker, 'observer'>, state: ArrayLike<number>): number {
  const [x, y, z] = [state[0]! - o[0]!, state[1]! - o[1]!, state[2]! - o[2]!]
  return Math.sqrt(x * x + y * y + z * z) / LIGHT_AU_PER_D
}
