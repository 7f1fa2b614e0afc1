/**
 * Places of the eight planets between two dates, tabulated every two days and interpolated by cubic Hermite polynomials.
 * Mercury moves by 0.14 rad in two days; the polynomial is then within 1e-6 au of it, the others far closer.
 * Source: Hermite interpolation: common practice; planets as earth/planets.ts.
 */
import { planetHeliocentric, PLANETS, SUN_GRAVITATION_AU3_PER_D2 as MU, SUN_OVER_PLANET_MASS } from '../earth'

const STEP_DAYS = 2
const STATE = 6
/** The table is begun anew beyond this many dates (8 MB). */
const MOST_NODES = 20_000

/** Gravitational parameters of the planets, au³/d². */
export const PLANET_GRAVITATION = Float64Array.from(PLANETS, (planet) => MU / SUN_OVER_PLANET_MASS[planet])

export class PlanetTable {
  private readonly nodes = new Map<number, Float64Array>()
  private index = NaN
  private before: Float64Array = new Float64Array(0)
  private after: Float64Array = new Float64Array(0)

  private moveTo(index: number): void {
    if (this.nodes.size > MOST_NODES) this.nodes.clear()
    this.index = index
    this.before = this.node(index)
    this.after = this.node(index + 1)
  }

  private node(index: number): Float64Array {
    const known = this.nodes.get(index)
    if (known) return known
    const states = new Float64Array(PLANETS.length * STATE)
    PLANETS.forEach((planet, i) => planetHeliocentric(planet, index * STEP_DAYS, states.subarray(i * STATE, (i + 1) * STATE)))
    this.nodes.set(index, states)
    return states
  }

  /** Heliocentric places at a date, three numbers a planet, au. */
  placesInto(jdTt: number, out: Float64Array): void {
    const index = Math.floor(jdTt / STEP_DAYS)
    if (index !== this.index) this.moveTo(index)
    const { before, after } = this
    const t = jdTt / STEP_DAYS - index
    const h10 = t * (1 - t) * (1 - t) * STEP_DAYS
    const h01 = t * t * (3 - 2 * t)
    const h11 = t * t * (t - 1) * STEP_DAYS
    for (let i = 0; i < PLANETS.length; i++) {
      for (let k = 0; k < 3; k++) {
        const at = i * STATE + k
        out[3 * i + k] = (1 - h01) * before[at]! + h01 * after[at]! + h10 * before[at + 3]! + h11 * after[at + 3]!
      }
    }
  }
}
