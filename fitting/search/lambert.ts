/**
 * Two places and the time between: the conic through both (Lambert's problem), any eccentricity, less than one revolution.
 *
 * Symbols: r₁, r₂ distances, θ the angle between, A = ±√(r₁r₂(1 + cos θ)) with − where the body goes the long way, z = αχ² (4π² a full
 * revolution, 0 the parabola, negative the hyperbola), y = r₁ + r₂ − A(1 − z c₃)/√c₂:
 *   √μ Δt = (y/c₂)^{3/2} c₃ + A√y
 * The time grows with z, so the root is bracketed; secant steps, halved where they leave the bracket.
 *   F = 1 − y/r₁, G = A√(y/μ), Ġ = 1 − y/r₂, v₁ = (r₂ − F r₁)/G, v₂ = (Ġ r₂ − r₁)/G
 *
 * Source: Bate, Mueller & White 1971, Fundamentals of Astrodynamics, 5.3.
 */
import { PI } from '../elementary'
import { stumpffInto } from '../conic/stumpff'

const FULL_TURN = 4 * PI * PI
const MOST_STEPS = 90
/** Where the places lie closer to opposite than this (1 + cos θ), the plane of the orbit is not determined. */
const OPPOSITE = 1e-12
const LOWEST_Z = -4e5

const c = new Float64Array(6)

interface Transfer {
  sum: number
  a: number
  rootMu: number
}

/** y at z, with c filled; not positive where the conic does not exist. */
function heightAt(z: number, { sum, a }: Transfer): number {
  stumpffInto(z, c)
  return sum - a * (1 - z * c[3]!) / Math.sqrt(c[2]!)
}

/** √μ times the time at z; −Infinity below the conics that exist. */
function timeAt(z: number, transfer: Transfer): number {
  const y = heightAt(z, transfer)
  if (!(y > 0)) return -Infinity
  const chi = Math.sqrt(y / c[2]!)
  const time = chi * chi * chi * c[3]! + transfer.a * Math.sqrt(y)
  return time === time ? time : -Infinity
}

/** z where the time is the one wanted; NaN where no conic is so quick. */
function solveZ(transfer: Transfer, target: number): number {
  let low = -1
  while (timeAt(low, transfer) > target) {
    low *= 4
    if (low < LOWEST_Z) return NaN
  }
  let high = FULL_TURN
  let timeLow = timeAt(low, transfer)
  let timeHigh = Infinity
  for (let i = 0; i < MOST_STEPS && high - low > 4e-16 * (1 + Math.abs(low)); i++) {
    const secant = timeLow > -Infinity && timeHigh < Infinity ? low + (high - low) * (target - timeLow) / (timeHigh - timeLow) : NaN
    const z = i % 3 !== 2 && secant > low && secant < high ? secant : 0.5 * (low + high)
    const time = timeAt(z, transfer)
    if (time === target) return z
    if (time < target) {
      low = z
      timeLow = time
    } else {
      high = z
      timeHigh = time
    }
    if (Math.abs(time - target) <= 1e-15 * target) return z
  }
  return 0.5 * (low + high)
}

/**
 * Velocities at both ends.
 * @param from first place, three numbers, any unit of length.
 * @param to second place.
 * @param elapsed time between, > 0.
 * @param options μ (length³/time²), and whether the body goes the long way round (more than 180°).
 * @param out takes the velocity at the first place, then that at the second.
 * @returns false where no conic joins them so, or where they lie opposite.
 * Source: Bate, Mueller & White 1971, Fundamentals of Astrodynamics, 5.3.
 */
export function joinInto(from: ArrayLike<number>, to: ArrayLike<number>, elapsed: number, options: { mu: number; isLongWay: boolean }, out: Float64Array): boolean {
  const [x, y, z] = [from[0]!, from[1]!, from[2]!]
  const r1 = Math.sqrt(x * x + y * y + z * z)
  const r2 = Math.sqrt(to[0]! * to[0]! + to[1]! * to[1]! + to[2]! * to[2]!)
  const product = r1 * r2
  const onePlusCosine = 1 + (x * to[0]! + y * to[1]! + z * to[2]!) / product
  if (!(elapsed > 0 && product > 0 && onePlusCosine > OPPOSITE)) return false
  const rootMu = Math.sqrt(options.mu)
  const transfer: Transfer = { sum: r1 + r2, a: (options.isLongWay ? -1 : 1) * Math.sqrt(product * onePlusCosine), rootMu }
  const root = solveZ(transfer, rootMu * elapsed)
  if (!(root - root === 0)) return false
  const height = heightAt(root, transfer)
  if (!(height > 0)) return false
  const f = 1 - height / r1
  const g = transfer.a * Math.sqrt(height) / rootMu
  const gDot = 1 - height / r2
  for (let k = 0; k < 3; k++) {
    out[k] = (to[k]! - f * from[k]!) / g
    out[k + 3] = (gDot * to[k]! - from[k]!) / g
  }
  return true
}
