/**
 * Three directions and times: the orbits that may pass through them (Gauss's method), with light-time.
 *
 * Symbols: tᵢ times, Lᵢ unit vectors of the directions, Rᵢ the observer's places, ρᵢ distances, τ₁ = t₁ − t₂, τ₃ = t₃ − t₂, τ = τ₃ − τ₁,
 * pᵢ the vector products of pairs of L, D₀ = L₁·p₁, Dⱼᵢ = Rⱼ·pᵢ. With f and g to the third order in time, ρ₂ = A + μB/r₂³, which with
 * r₂² = ρ₂² + 2E ρ₂ + R₂², E = L₂·R₂, is r₂⁸ + a r₂⁶ + b r₂³ + c = 0. Every positive root is taken, then f and g are replaced by those of the
 * orbit itself until the distances no longer change.
 *
 * Source: Gauss 1809, Theoria motus corporum coelestium, arts. 131–163; the form is that of Curtis 2014, Orbital Mechanics for Engineering
 * Students, 5.10.
 */
import type { Vector } from '../conic/state'
import { cross, dot } from '../conic/state'
import { moveInto } from '../conic/universal'
import { positiveRoots } from './positive-roots'

export interface Direction {
  /** Time, in the unit of μ. */
  time: number
  /** Unit vector to the body. */
  line: Vector
  /** Place of the observer about the centre of attraction. */
  observer: Vector
}

export interface AngleProblem {
  directions: readonly [Direction, Direction, Direction]
  /** μ, length³/time². */
  mu: number
  /** Length per time; Infinity leaves light-time out. */
  lightSpeed: number
}

export interface AngleOrbit {
  /** Place and velocity when the light of the second direction left. */
  state: Float64Array
  /** That time. */
  time: number
  distances: [number, number, number]
}

const MOST_ROUNDS = 60
const SETTLED = 1e-12
/** Below this the three directions lie in one plane through the observer and determine nothing. */
const ONE_PLANE = 1e-14

interface Products {
  triple: number
  /** Dⱼᵢ, row j. */
  d: number[][]
}

function productsOf([first, second, third]: AngleProblem['directions']): Products {
  const p = [cross(second.line, third.line), cross(first.line, third.line), cross(first.line, second.line)]
  const observers = [first.observer, second.observer, third.observer]
  return { triple: dot(first.line, p[0]!), d: observers.map((place) => p.map((product) => dot(place, product))) }
}

/** Lagrange's f and g at the outer times, and the distances that they give. */
interface Coefficients {
  f1: number
  g1: number
  f3: number
  g3: number
}

function distancesFrom({ triple, d }: Products, { f1, g1, f3, g3 }: Coefficients): [number, number, number] {
  const whole = f1 * g3 - f3 * g1
  const c1 = g3 / whole
  const c3 = -g1 / whole
  const rho = (i: number) => (-c1 * d[0]![i]! + d[1]![i]! - c3 * d[2]![i]!) / triple
  return [rho(0) / c1, rho(1), rho(2) / c3]
}

function placesOf({ directions }: AngleProblem, distances: readonly number[]): Vector[] {
  return directions.map(({ line, observer }, i): Vector => [0, 1, 2].map((k) => observer[k]! + distances[i]! * line[k]!) as unknown as Vector)
}

/** State at the middle from the outer places by f and g. */
function stateOf(places: readonly Vector[], { f1, g1, f3, g3 }: Coefficients): Float64Array {
  const whole = f1 * g3 - f3 * g1
  const state = new Float64Array(6)
  for (let k = 0; k < 3; k++) {
    state[k] = places[1]![k]!
    state[k + 3] = (f1 * places[2]![k]! - f3 * places[0]![k]!) / whole
  }
  return state
}

/** f and g of the orbit itself, from the places that its state reaches. */
function coefficientsOf(state: Float64Array, mu: number, elapsed: readonly [number, number]): Coefficients | null {
  const ends = elapsed.map((time) => {
    const end = new Float64Array(6)
    return moveInto(state, mu, time, end) ? end : null
  })
  if (ends[0] === null || ends[1] === null) return null
  const place: Vector = [state[0]!, state[1]!, state[2]!]
  const velocity: Vector = [state[3]!, state[4]!, state[5]!]
  const h = cross(place, velocity)
  const hSquared = dot(h, h)
  const pair = (end: Float64Array) => {
    const there: Vector = [end[0]!, end[1]!, end[2]!]
    return { f: dot(cross(there, velocity), h) / hSquared, g: dot(cross(place, there), h) / hSquared }
  }
  const [one, three] = [pair(ends[0]!), pair(ends[1]!)]
  return { f1: one.f, g1: one.g, f3: three.f, g3: three.g }
}

function seriesCoefficients(r: number, mu: number, [before, after]: readonly [number, number]): Coefficients {
  const pull = mu / (r * r * r)
  const f = (time: number) => 1 - 0.5 * pull * time * time
  const g = (time: number) => time - pull * time * time * time / 6
  return { f1: f(before), g1: g(before), f3: f(after), g3: g(after) }
}

/** Distances r₂ at which the third-order solution puts the body. */
function middleRadii(problem: AngleProblem, products: Products): number[] {
  const [first, second, third] = problem.directions
  const [before, after] = [first.time - second.time, third.time - second.time]
  const span = after - before
  const { triple, d } = products
  const a0 = (-d[0]![1]! * after / span + d[1]![1]! + d[2]![1]! * before / span) / triple
  const b0 = (d[0]![1]! * (after * after - span * span) * after / span + d[2]![1]! * (span * span - before * before) * before / span) / (6 * triple)
  const e = dot(second.line, second.observer)
  const squared = dot(second.observer, second.observer)
  const { mu } = problem
  return positiveRoots(-(a0 * a0 + 2 * a0 * e + squared), -2 * mu * b0 * (a0 + e), -mu * mu * b0 * b0)
}

function isGood(distances: readonly number[]): boolean {
  return distances.every((distance) => distance > 0 && distance < Infinity)
}

/**
 * The third-order solutions, one for each root of the equation of the eighth degree with positive distances.
 * @param problem three directions in order of time, μ, speed of light.
 * @returns states at the second direction, light-time left out.
 * Source: Gauss 1809, Theoria motus, arts. 131–149; Curtis 2014, algorithm 5.5.
 */
export function roughAngleOrbits(problem: AngleProblem): AngleOrbit[] {
  const [first, second, third] = problem.directions
  const products = productsOf(problem.directions)
  if (!(Math.abs(products.triple) > ONE_PLANE)) return []
  const elapsed = [first.time - second.time, third.time - second.time] as const
  return middleRadii(problem, products).flatMap((r) => {
    const coefficients = seriesCoefficients(r, problem.mu, elapsed)
    const distances = distancesFrom(products, coefficients)
    return isGood(distances) ? [{ state: stateOf(placesOf(problem, distances), coefficients), time: second.time, distances }] : []
  })
}

/**
 * Brings a third-order solution to the exact one.
 * @param problem as before.
 * @param rough one of its third-order solutions.
 * @returns the orbit through all three directions, or the rough one where the rounds do not settle.
 * Source: Gauss 1809, Theoria motus, arts. 150–163; Curtis 2014, algorithm 5.6.
 */
export function refinedAngleOrbit(problem: AngleProblem, rough: AngleOrbit): AngleOrbit {
  const products = productsOf(problem.directions)
  let orbit = rough
  let coefficients: Coefficients | null = null
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const left = problem.directions.map((direction, i) => direction.time - orbit.distances[i]! / problem.lightSpeed)
    const next = coefficientsOf(orbit.state, problem.mu, [left[0]! - left[1]!, left[2]! - left[1]!])
    if (next === null) return rough
    // Halfway between rounds: the whole step swings about the solution.
    const last: Coefficients = coefficients ?? next
    coefficients = { f1: 0.5 * (last.f1 + next.f1), g1: 0.5 * (last.g1 + next.g1), f3: 0.5 * (last.f3 + next.f3), g3: 0.5 * (last.g3 + next.g3) }
    const distances = distancesFrom(products, coefficients)
    if (!isGood(distances)) return rough
    const change = Math.max(...distances.map((distance, i) => Math.abs(distance - orbit.distances[i]!) / distance))
    orbit = { state: stateOf(placesOf(problem, distances), coefficients), time: left[1]!, distances }
    if (change <= SETTLED) return orbit
  }
  return rough
}
