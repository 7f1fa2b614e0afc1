/**
 * Motion along any conic by universal variables, with its partial derivatives.
 *
 * Symbols: r₀, v₀ state at the start, μ gravitational parameter, α = 2/r₀ − v₀²/μ = 1/a, σ₀ = r₀·v₀/√μ, χ the universal anomaly,
 * Uₙ = χⁿ cₙ(αχ²) with Stumpff's cₙ. Solved for χ:  √μ Δt = r₀U₁ + σ₀U₂ + U₃, whose derivative is r = r₀U₀ + σ₀U₁ + U₂ > 0.
 *   F = 1 − U₂/r₀, G = (r₀U₁ + σ₀U₂)/√μ, Ḟ = −√μ U₁/(r r₀), Ġ = 1 − U₂/r
 * Laguerre's step of degree 5 inside the bracket 0 … √μ Δt/q (r is never below the periapsis distance q), halved where it leaves it.
 * Partials with C = (3U₅ − χU₄)/√μ − Δt U₂.
 *
 * Sources: Battin 1999, An Introduction to the Mathematics and Methods of Astrodynamics, 4.5 and 9.7; Conway 1986, An improved
 * algorithm due to Laguerre for the solution of Kepler's equation, Celestial Mechanics 39, 199.
 */
import { TWO_PI } from '../elementary'
import { stumpffInto } from './stumpff'

const MOST_STEPS = 80
/** Laguerre's step converges with the third order: after one below this part of χ nothing is left. */
const LAST_STEP = 1e-9
/** Angular momentum below this part of r·v is a fall into the centre. */
const STRAIGHT_FALL = 1e-12

const c = new Float64Array(6)
/** U₀ to U₅. */
const u = new Float64Array(6)

function powersInto(chi: number, alpha: number): void {
  stumpffInto(alpha * chi * chi, c)
  let power = 1
  for (let n = 0; n < 6; n++) {
    u[n] = power * c[n]!
    power *= chi
  }
}

interface Start {
  distance: number
  sigma: number
  alpha: number
  periapsis: number
}

const start: Start = { distance: 0, sigma: 0, alpha: 0, periapsis: 0 }

/** Fills `start`; false where the motion is a fall into the centre or the state holds no finite numbers. */
function readStart(state: ArrayLike<number>, mu: number): boolean {
  const [x, y, z, vx, vy, vz] = [state[0]!, state[1]!, state[2]!, state[3]!, state[4]!, state[5]!]
  const squared = x * x + y * y + z * z
  const speedSquared = vx * vx + vy * vy + vz * vz
  const along = x * vx + y * vy + z * vz
  const hSquared = squared * speedSquared - along * along
  if (!(squared > 0 && squared < Infinity && hSquared > STRAIGHT_FALL * STRAIGHT_FALL * squared * speedSquared && speedSquared < Infinity)) return false
  start.distance = Math.sqrt(squared)
  start.sigma = along / Math.sqrt(mu)
  start.alpha = 2 / start.distance - speedSquared / mu
  const p = hSquared / mu
  start.periapsis = p / (1 + Math.sqrt(Math.max(0, 1 - start.alpha * p)))
  return true
}

/** Universal anomaly after √μ Δt = target ≥ 0, with u filled there; NaN where it does not settle. */
function solveForward(target: number, sigma: number): number {
  const { distance, alpha, periapsis } = start
  let low = 0
  let high = target / periapsis * (1 + 1e-9)
  let chi = Math.min(target / distance, high)
  for (let i = 0; i < MOST_STEPS; i++) {
    powersInto(chi, alpha)
    const f = distance * u[1]! + sigma * u[2]! + u[3]! - target
    const slope = distance * u[0]! + sigma * u[1]! + u[2]!
    const bend = sigma * u[0]! + (1 - alpha * distance) * u[1]!
    if (f > 0 || f !== f) high = chi
    else low = chi
    const step = -5 * f / (slope + Math.sqrt(Math.abs(16 * slope * slope - 20 * f * bend)))
    const next = chi + step
    if (Math.abs(step) <= LAST_STEP * chi) return next
    chi = next > low && next < high && i < MOST_STEPS / 2 ? next : 0.5 * (low + high)
    if (high - low <= 1e-15 * high) return chi
  }
  return NaN
}

/**
 * State after a time along any conic.
 * @param state six numbers, place and velocity, in one unit of length and one of time.
 * @param mu μ, > 0, length³/time².
 * @param elapsed time, of either sign.
 * @param out takes the six numbers of the state then.
 * @param partials where given, takes the 36 derivatives of `out` by `state`, row-major.
 * @returns false where the motion is a fall into the centre, or no numbers that can be computed with.
 * Source: Battin 1999, Mathematics and Methods of Astrodynamics, 4.5 and 9.7.
 */
export function moveInto(state: ArrayLike<number>, mu: number, elapsed: number, out: Float64Array, partials?: Float64Array): boolean {
  if (!readStart(state, mu)) return false
  const rootMu = Math.sqrt(mu)
  const { distance, sigma, alpha } = start
  const chi = anomalyAfter(rootMu * elapsed)
  if (!(chi - chi === 0)) return false
  powersInto(chi, alpha)
  const r = distance * u[0]! + sigma * u[1]! + u[2]!
  const f = 1 - u[2]! / distance
  const g = (distance * u[1]! + sigma * u[2]!) / rootMu
  const fDot = -rootMu * u[1]! / (r * distance)
  const gDot = 1 - u[2]! / r
  for (let i = 0; i < 3; i++) {
    out[i] = f * state[i]! + g * state[i + 3]!
    out[i + 3] = fDot * state[i]! + gDot * state[i + 3]!
  }
  if (!(r > 0 && r < Infinity)) return false
  if (partials) partialsInto({ before: state, after: out, mu, r0: distance, r, f, g, fDot, gDot, secular: (3 * u[5]! - chi * u[4]!) / rootMu - elapsed * u[2]! }, partials)
  return true
}

/** χ for √μ Δt of either sign; whole revolutions are taken out of the solve and put back. */
function anomalyAfter(target: number): number {
  const { alpha, sigma } = start
  if (target === 0) return 0
  const revolution = alpha > 0 ? TWO_PI / (alpha * Math.sqrt(alpha)) : Infinity
  const turns = alpha > 0 ? Math.round(target / revolution) : 0
  const rest = turns === 0 ? target : target - turns * revolution
  const chi = rest === 0 ? 0 : rest > 0 ? solveForward(rest, sigma) : -solveForward(-rest, -sigma)
  return turns === 0 ? chi : chi + turns * TWO_PI / Math.sqrt(alpha)
}

interface Moved {
  before: ArrayLike<number>
  after: Float64Array
  mu: number
  r0: number
  r: number
  f: number
  g: number
  fDot: number
  gDot: number
  /** C. */
  secular: number
}

/** Battin's four blocks: ∂r/∂r₀, ∂r/∂v₀, ∂v/∂r₀, ∂v/∂v₀. */
function partialsInto({ before, after, mu, r0, r, f, g, fDot, gDot, secular }: Moved, partials: Float64Array): void {
  const bent = r0 * (1 - f)
  for (let i = 0; i < 3; i++) {
    const place = after[i]!
    const velocity = after[i + 3]!
    const gain = velocity - before[i + 3]!
    for (let j = 0; j < 3; j++) {
      const same = i === j ? 1 : 0
      const place0 = before[j]!
      const velocity0 = before[j + 3]!
      const gainJ = after[j + 3]! - velocity0
      partials[6 * i + j] = r / mu * gain * gainJ + (bent * place + secular * velocity) * place0 / (r0 * r0 * r0) + f * same
      partials[6 * i + j + 3] = (bent * ((place - before[i]!) * velocity0 - gain * place0) + secular * velocity * velocity0) / mu + g * same
      partials[6 * i + j + 18] = -gain * place0 / (r0 * r0) - place * gainJ / (r * r) + fDot * same - mu * secular * place * place0 / (r * r * r * r0 * r0 * r0)
      partials[6 * i + j + 21] = r0 / mu * gain * gainJ + (bent * place * place0 - secular * place * velocity0) / (r * r * r) + gDot * same
    }
  }
  addCrossTerm({ after, mu, r, fDot, before }, partials)
}

/** Ḟ·(−r rᵀ/r² + (r vᵀ − v rᵀ) r (v − v₀)ᵀ/(μ r)) of ∂v/∂r₀. */
function addCrossTerm({ after, mu, r, fDot, before }: Pick<Moved, 'after' | 'mu' | 'r' | 'fDot' | 'before'>, partials: Float64Array): void {
  const along = after[0]! * after[3]! + after[1]! * after[4]! + after[2]! * after[5]!
  for (let i = 0; i < 3; i++) {
    const turned = (after[i]! * along - after[i + 3]! * r * r) / (mu * r)
    for (let j = 0; j < 3; j++) {
      partials[6 * i + j + 18] = partials[6 * i + j + 18]! + fDot * (-after[i]! * after[j]! / (r * r) + turned * (after[j + 3]! - before[j + 3]!))
    }
  }
}
