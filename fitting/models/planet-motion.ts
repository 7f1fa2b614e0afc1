/**
 * Motion about the Sun under the pull of the eight planets, with its partial derivatives.
 *   r̈ = −μ r/r³ + Σ μₚ((rₚ − r)/|rₚ − r|³ − rₚ/rₚ³)
 * Runge and Kutta's step of fourth order and one day, shorter as r^1.5 inside 0.8 au; between steps the polynomial
 * of fifth degree through place, velocity and acceleration at both ends. The 36 derivatives follow the variational equations
 * of the Sun's pull and are interpolated likewise by cubics.
 *
 * Source: Brouwer & Clemence 1961, Methods of Celestial Mechanics, ch. 4 and 16; Press et al. 1992, Numerical Recipes, 16.1.
 */
import { SUN_GRAVITATION_AU3_PER_D2 as MU } from '../earth'
import { PLANET_GRAVITATION, PlanetTable } from './planet-table'
import type { Motion } from './line-of-sight'

/** Six of the state, 36 of its derivatives. */
const STATE = 6
const WHOLE = 42
const FULL_STEP_BEYOND_AU = 0.8
/** Where the second to fourth rates are taken. */
const PARTS = [0.5, 0.5, 1] as const
const SMALLEST_STEP_DAYS = 1 / 32
/** A motion is followed over at most so many steps to each side. */
const MOST_STEPS = 20_000

const planets = new Float64Array(3 * PLANET_GRAVITATION.length)
const table = new PlanetTable()
const stages = [0, 1, 2, 3].map(() => new Float64Array(WHOLE))
const trial = new Float64Array(WHOLE)

/** Acceleration into rate[3…5]. */
function pullInto(y: Float64Array, jdTt: number, rate: Float64Array): number {
  const r2 = y[0]! * y[0]! + y[1]! * y[1]! + y[2]! * y[2]!
  const r3 = r2 * Math.sqrt(r2)
  for (let k = 0; k < 3; k++) rate[k + 3] = -MU * y[k]! / r3
  table.placesInto(jdTt, planets)
  for (let i = 0; i < PLANET_GRAVITATION.length; i++) {
    const px = planets[3 * i]!
    const py = planets[3 * i + 1]!
    const pz = planets[3 * i + 2]!
    const dx = px - y[0]!
    const dy = py - y[1]!
    const dz = pz - y[2]!
    const d2 = dx * dx + dy * dy + dz * dz
    const p2 = px * px + py * py + pz * pz
    const near = PLANET_GRAVITATION[i]! / (d2 * Math.sqrt(d2))
    const far = PLANET_GRAVITATION[i]! / (p2 * Math.sqrt(p2))
    rate[3]! += near * dx - far * px
    rate[4]! += near * dy - far * py
    rate[5]! += near * dz - far * pz
  }
  return r2
}

function rateInto(y: Float64Array, jdTt: number, rate: Float64Array, width: number): void {
  for (let k = 0; k < 3; k++) rate[k] = y[k + 3]!
  const r2 = pullInto(y, jdTt, rate)
  if (width === STATE) return
  const tide = MU / (r2 * Math.sqrt(r2))
  for (let j = 0; j < 6; j++) {
    const a = y[6 + j]!
    const b = y[12 + j]!
    const c = y[18 + j]!
    const along = 3 * (y[0]! * a + y[1]! * b + y[2]! * c) / r2
    for (let k = 0; k < 3; k++) {
      rate[6 + 6 * k + j] = y[24 + 6 * k + j]!
      rate[24 + 6 * k + j] = tide * (along * y[k]! - y[6 + 6 * k + j]!)
    }
  }
}

/** One step of fourth order from y with its rate; the new y into `next`. */
function stepInto(y: Float64Array, rate: Float64Array, jdTt: number, h: number, width: number, next: Float64Array): void {
  stages[0]!.set(rate)
  for (let s = 0; s < 3; s++) {
    for (let i = 0; i < width; i++) trial[i] = y[i]! + h * PARTS[s]! * stages[s]![i]!
    rateInto(trial, jdTt + PARTS[s]! * h, stages[s + 1]!, width)
  }
  for (let i = 0; i < width; i++) next[i] = y[i]! + h / 6 * (stages[0]![i]! + 2 * (stages[1]![i]! + stages[2]![i]!) + stages[3]![i]!)
}

function stepDays(y: Float64Array): number {
  const part = Math.sqrt(y[0]! * y[0]! + y[1]! * y[1]! + y[2]! * y[2]!) / FULL_STEP_BEYOND_AU
  const wanted = part * Math.sqrt(part)
  let h = 1
  while (h > wanted && h > SMALLEST_STEP_DAYS) h /= 2
  return h
}

/** Steps to one side of the epoch, grown as far as asked. */
interface Side {
  sign: 1 | -1
  /** Days after the epoch. */
  times: number[]
  values: Float64Array[]
  rates: Float64Array[]
}

function grow(side: Side, epochJdTt: number, days: number, width: number): boolean {
  while (side.times.length === 1 || side.sign * (days - side.times[side.times.length - 1]!) > 0) {
    const at = side.times.length - 1
    if (at >= MOST_STEPS) return false
    const y = side.values[at]!
    const h = side.sign * stepDays(y)
    const next = new Float64Array(width)
    stepInto(y, side.rates[at]!, epochJdTt + side.times[at]!, h, width, next)
    const rate = new Float64Array(width)
    rateInto(next, epochJdTt + side.times[at]! + h, rate, width)
    if (!(next[0]! - next[0]! === 0 && rate[3]! - rate[3]! === 0)) return false
    side.times.push(side.times[at]! + h)
    side.values.push(next)
    side.rates.push(rate)
  }
  return true
}

/** Index of the step that holds a time: the last node not beyond it. */
function stepAt({ times, sign }: Side, days: number): number {
  let [low, high] = [0, times.length - 1]
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (sign * (days - times[middle]!) >= 0) low = middle
    else high = middle
  }
  return low
}

/** Place by the quintic, velocity by its derivative, of node values and rates. */
function stateBetween(side: Side, i: number, t: number, h: number, out: Float64Array): void {
  const [a, b, ra, rb] = [side.values[i]!, side.values[i + 1]!, side.rates[i]!, side.rates[i + 1]!]
  for (let k = 0; k < 3; k++) {
    const [p0, v0, a0] = [a[k]!, a[k + 3]! * h, ra[k + 3]! * h * h]
    const [p1, v1, a1] = [b[k]!, b[k + 3]! * h, rb[k + 3]! * h * h]
    const gap = p1 - p0 - v0 - 0.5 * a0
    const turn = v1 - v0 - a0
    const bend = a1 - a0
    const c3 = 10 * gap - 4 * turn + 0.5 * bend
    const c4 = -15 * gap + 7 * turn - bend
    const c5 = 6 * gap - 3 * turn + 0.5 * bend
    out[k] = p0 + t * (v0 + t * (0.5 * a0 + t * (c3 + t * (c4 + t * c5))))
    out[k + 3] = (v0 + t * (a0 + t * (3 * c3 + t * (4 * c4 + t * 5 * c5)))) / h
  }
}

function partialsBetween(side: Side, i: number, t: number, h: number, out: Float64Array): void {
  const [a, b, ra, rb] = [side.values[i]!, side.values[i + 1]!, side.rates[i]!, side.rates[i + 1]!]
  const [h10, h01, h11] = [t * (1 - t) * (1 - t) * h, t * t * (3 - 2 * t), t * t * (t - 1) * h]
  for (let j = 0; j < 36; j++) out[j] = (1 - h01) * a[j + 6]! + h01 * b[j + 6]! + h10 * ra[j + 6]! + h11 * rb[j + 6]!
}

/**
 * Motion under the Sun and the eight planets.
 * @param epochJdTt JD of TT of the state.
 * @returns the motion; it is integrated only as far as asked.
 * Source: Brouwer & Clemence 1961, Methods of Celestial Mechanics, ch. 4.
 */
export function planetMotion(epochJdTt: number): Motion {
  let sides: Side[] = []
  let width = STATE
  return {
    epochJdTt,
    begin(state, withPartials) {
      width = withPartials ? WHOLE : STATE
      const start = new Float64Array(width)
      start.set(state)
      if (withPartials) for (let k = 0; k < 6; k++) start[6 + 7 * k] = 1
      const rate = new Float64Array(width)
      rateInto(start, epochJdTt, rate, width)
      sides = ([1, -1] as const).map((sign) => ({ sign, times: [0], values: [start], rates: [rate] }))
      return rate[3]! - rate[3]! === 0
    },
    at(days, out, partials) {
      const side = sides[days >= 0 ? 0 : 1]!
      if (!grow(side, epochJdTt, days, width)) return false
      const i = stepAt(side, days)
      const h = side.times[i + 1]! - side.times[i]!
      const t = (days - side.times[i]!) / h
      stateBetween(side, i, t, h, out)
      if (partials && width === WHOLE) partialsBetween(side, i, t, h, partials)
      return out[0]! - out[0]! === 0
    },
  }
}
