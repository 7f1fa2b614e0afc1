/**
 * From a heliocentric state to whitened rows on the sky.
 *
 * Symbols: R the observer's heliocentric place, V the Sun's velocity about the barycentre, τ light-time, c speed of light,
 *   d = r(t − τ) − R − Vτ,  cτ = |d|
 * because the light left the body where it was about the barycentre at t − τ, while R is counted from the Sun at t. With the observed
 * direction u and its tangents e, n the rows are W·(x, y), x = 2d·e/(|d| + d·u), y likewise with n: the stereographic plane,
 * within θ³/12 of the angle, and finite all over the sky but for the point opposite.
 *
 * The motion is taken at one light-time guessed from the reference and carried over the rest δ by r − vδ − ½μδ²r/r³; what that leaves out
 * is below 1e-12 au for every body that is not grazing the Sun.
 *
 * Source: Explanatory Supplement to the Astronomical Almanac (1992), 3.31; Snyder 1987, Map Projections: A Working Manual, ch. 21.
 */
import { moveInto } from '../conic/universal'
import { LIGHT_AU_PER_D, SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth/constants'
import type { LeastSquaresProblem } from '../solve/least-squares-problem'
import type { StateMap } from './sight-frame'

/** What one line of sight is computed and compared with. */
export interface Sight {
  jdTt: number
  /** Heliocentric observer, au, and the Sun's barycentric velocity, au/d; ICRS axes. */
  observer: Float64Array
  sunVelocity: Float64Array
  /** u, e, n, nine numbers. */
  axes: Float64Array
  /** W: rows (w₀x, w₁x + w₂y), 1/rad. */
  whitening: Float64Array
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
function restOfLightTime(sight: Pick<Sight, 'observer' | 'sunVelocity'>, guess: number, pull: number): number {
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
export function lineOfSightInto(sight: Pick<Sight, 'jdTt' | 'observer' | 'sunVelocity'>, motion: Motion, guessDays: number, out: LineOfSight, withPartials: boolean): boolean {
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
function partialsOfLine(sight: Pick<Sight, 'sunVelocity'>, rest: number, out: LineOfSight): void {
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
 * The least-squares problem of lines of sight.
 * @param sights at least one.
 * @param map from parameters to the state at the epoch.
 * @param motion from the epoch to the sights.
 * @returns two whitened rows a sight, computed minus observed, with their Jacobian.
 * Source: Snyder 1987, Map Projections: A Working Manual, ch. 21 (stereographic projection).
 */
export function sightProblem(sights: readonly Sight[], map: StateMap, motion: Motion): LeastSquaresProblem {
  const p = map.parameters
  const state = new Float64Array(6)
  const byParameter = new Float64Array(6 * p)
  const found = emptyLineOfSight()
  const rowGradient = new Float64Array(12)
  return {
    parameters: p,
    rows: 2 * sights.length,
    evaluate(values, residuals, jacobian) {
      if (!map.stateInto(values, state, jacobian ? byParameter : null) || !motion.begin(state, jacobian !== null)) return false
      for (let i = 0; i < sights.length; i++) {
        const sight = sights[i]!
        if (!lineOfSightInto(sight, motion, roughLightTime(sight, state), found, jacobian !== null)) return false
        rowsInto(sight, found, residuals, 2 * i, jacobian ? rowGradient : null)
        if (jacobian) chainInto(rowGradient, byParameter, p, jacobian.subarray(2 * i * p, 2 * (i + 1) * p))
      }
      return true
    },
  }
}

/**
 * Light-time as if the body had stood still since the epoch.
 * @param sight observer.
 * @param state at the epoch.
 * @returns light-time, d.
 */
export function roughLightTime({ observer: o }: Pick<Sight, 'observer'>, state: ArrayLike<number>): number {
  const [x, y, z] = [state[0]! - o[0]!, state[1]! - o[1]!, state[2]! - o[2]!]
  return Math.sqrt(x * x + y * y + z * z) / LIGHT_AU_PER_D
}

/** Both rows at `from`, and their 2 × 6 derivatives by the state at the epoch. */
function rowsInto({ axes, whitening: w }: Sight, found: LineOfSight, rows: Float64Array, from: number, gradient: Float64Array | null): void {
  const { line: d, distance, partials } = found
  const alongU = d[0]! * axes[0]! + d[1]! * axes[1]! + d[2]! * axes[2]!
  const size = Math.max(distance + alongU, 1e-12 * distance)
  const x = 2 * (d[0]! * axes[3]! + d[1]! * axes[4]! + d[2]! * axes[5]!) / size
  const y = 2 * (d[0]! * axes[6]! + d[1]! * axes[7]! + d[2]! * axes[8]!) / size
  rows[from] = w[0]! * x
  rows[from + 1] = w[1]! * x + w[2]! * y
  if (!gradient) return
  for (let j = 0; j < 6; j++) {
    let [e, n, grow] = [0, 0, 0]
    for (let k = 0; k < 3; k++) {
      const part = partials[6 * k + j]!
      e += part * axes[k + 3]!
      n += part * axes[k + 6]!
      grow += part * (d[k]! / distance + axes[k]!)
    }
    const dx = (2 * e - x * grow) / size
    const dy = (2 * n - y * grow) / size
    gradient[j] = w[0]! * dx
    gradient[j + 6] = w[1]! * dx + w[2]! * dy
  }
}

/** Two rows by the state at the epoch, times its 6 × p derivatives by the parameters. */
function chainInto(byState: Float64Array, byParameter: Float64Array, p: number, out: Float64Array): void {
  for (let row = 0; row < 2; row++) {
    for (let j = 0; j < p; j++) {
      let sum = 0
      for (let k = 0; k < 6; k++) sum += byState[6 * row + k]! * byParameter[k * p + j]!
      out[row * p + j] = sum
    }
  }
}
