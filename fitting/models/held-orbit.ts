/**
 * A relative orbit with elements held: the regular parameters (ln P, u, v, A₁, B₁, F₁, G₁) from those that stay free.
 *   shape   (u, v), or s with e = tanh s and ϖ where e or T is held; T held: ϖ = 2π (T − t_ref)/P
 *   plane   A₁ … G₁, or where a, i, Ω or ω is held: g² = 2a, j = i/2, R₊ = g² cos² j, R₋ = g² sin² j and
 *           A₁ ± G₁ = R₊ cos S, R₋ cos D;  B₁ ∓ F₁ = R₊ sin S, −R₋ … sin D with S = ω − ϖ + Ω, D = ω − ϖ − Ω
 * At i = 0 only S is free, at 180° only D. ω is that of the companion's relative orbit.
 * Source: Heintz 1978, Double Stars, ch. 4; the turned constants are ours (relative-elements.ts).
 */
import { atan2, atanh, cos, DEG, exp, hypot, log, PI, sin, TWO_PI } from '../elementary'
import type { ParameterMap } from './constrained-path'
import { LARGEST_S } from './relative-kepler'

/** Elements that can be held, in published units: yr, Julian year, arcsec, degrees. */
export const HOLDABLE = ['period', 'periastronTime', 'eccentricity', 'semiMajorAxis', 'inclination', 'node', 'argumentOfPeriastron'] as const
export type Holdable = (typeof HOLDABLE)[number]
export type Held = Partial<Record<Holdable, number>>

/** Coordinates that may be free; u, v and A … G are the regular ones. */
type Coordinate = 'lnPeriod' | 'u' | 'v' | 's' | 'varpi' | 'A' | 'B' | 'F' | 'G' | 'g' | 'j' | 'S' | 'D' | 'node' | 'turned'

/** The map with starts for it. */
export interface HeldOrbit extends ParameterMap {
  /** Free parameters near a regular orbit; several where the held elements leave a choice. */
  starts(regular: ArrayLike<number>): Float64Array[]
}

const FULL = 7
/** Starts keep away from i = 0 and 180°, where no derivative leads off. */
const LEAST_HALF_INCLINATION = 0.05

function shapeCoordinates(held: Held): Coordinate[] {
  if (held.eccentricity === undefined && held.periastronTime === undefined) return ['u', 'v']
  const hasDirection = held.periastronTime === undefined && held.eccentricity !== 0
  return [...(held.eccentricity === undefined ? ['s' as const] : []), ...(hasDirection ? ['varpi' as const] : [])]
}

function isPlaneHeld(held: Held): boolean {
  return [held.semiMajorAxis, held.inclination, held.node, held.argumentOfPeriastron].some((value) => value !== undefined)
}

function planeCoordinates(held: Held): Coordinate[] {
  if (!isPlaneHeld(held)) return ['A', 'B', 'F', 'G']
  const size: Coordinate[] = [...(held.semiMajorAxis === undefined ? ['g' as const] : []), ...(held.inclination === undefined ? ['j' as const] : [])]
  if (held.node === undefined && held.argumentOfPeriastron === undefined) {
    return [...size, ...(held.inclination === 180 ? [] : ['S' as const]), ...(held.inclination === 0 ? [] : ['D' as const])]
  }
  return [...size, ...(held.node === undefined ? ['node' as const] : []), ...(held.argumentOfPeriastron === undefined ? ['turned' as const] : [])]
}

/** One quantity on the way from y to x, with its gradient by y. */
interface Part {
  value: number
  gradient: Float64Array
}

class Expansion {
  private readonly at = new Map<Coordinate, number>()

  constructor(
    private readonly held: Held,
    private readonly coordinates: readonly Coordinate[],
    private readonly referenceEpochYr: number,
  ) {
    coordinates.forEach((coordinate, j) => this.at.set(coordinate, j))
  }

  /** The free coordinate, or the value it is held at. */
  private part(y: ArrayLike<number>, coordinate: Coordinate, otherwise = 0): Part {
    const gradient = new Float64Array(this.coordinates.length)
    const j = this.at.get(coordinate)
    if (j === undefined) return { value: otherwise, gradient }
    gradient[j] = 1
    return { value: y[j]!, gradient }
  }

  private combined(value: number, ...terms: [number, Part][]): Part {
    const gradient = new Float64Array(this.coordinates.length)
    for (const [factor, part] of terms) for (let j = 0; j < gradient.length; j++) gradient[j] = gradient[j]! + factor * part.gradient[j]!
    return { value, gradient }
  }

  private sum(a: Part, sign: 1 | -1, b: Part): Part {
    return this.combined(a.value + sign * b.value, [1, a], [sign, b])
  }

  /** u, v and ϖ; null outside the domain. */
  private shape(y: ArrayLike<number>, lnPeriod: Part): { u: Part; v: Part; varpi: Part } | null {
    if (this.at.has('u')) {
      const [u, v] = [this.part(y, 'u'), this.part(y, 'v')]
      const s2 = u.value * u.value + v.value * v.value
      const varpi = s2 > 0 ? this.combined(atan2(v.value, u.value), [-v.value / s2, u], [u.value / s2, v]) : this.combined(0)
      return { u, v, varpi }
    }
    const s = this.part(y, 's', atanh(this.held.eccentricity ?? 0))
    if (!(s.value >= 0 && s.value <= LARGEST_S)) return null
    const time = this.held.periastronTime
    const phase = time === undefined ? 0 : TWO_PI * (time - this.referenceEpochYr) * exp(-lnPeriod.value)
    const varpi = time === undefined ? this.part(y, 'varpi') : this.combined(phase, [-phase, lnPeriod])
    const [c, sn] = [cos(varpi.value), sin(varpi.value)]
    return {
      varpi,
      u: this.combined(s.value * c, [c, s], [-s.value * sn, varpi]),
      v: this.combined(s.value * sn, [sn, s], [s.value * c, varpi]),
    }
  }

  /** S and D. */
  private angles(y: ArrayLike<number>, varpi: Part): { S: Part; D: Part } {
    const { node, argumentOfPeriastron } = this.held
    if (node === undefined && argumentOfPeriastron === undefined) return { S: this.part(y, 'S'), D: this.part(y, 'D') }
    const nodePart = this.part(y, 'node', (node ?? 0) * DEG)
    const turned = argumentOfPeriastron === undefined ? this.part(y, 'turned') : this.combined(argumentOfPeriastron * DEG - varpi.value, [-1, varpi])
    return { S: this.sum(turned, 1, nodePart), D: this.sum(turned, -1, nodePart) }
  }

  /** A₁, B₁, F₁, G₁. */
  private plane(y: ArrayLike<number>, varpi: Part): Part[] {
    if (this.at.has('A')) return [this.part(y, 'A'), this.part(y, 'B'), this.part(y, 'F'), this.part(y, 'G')]
    const { semiMajorAxis, inclination } = this.held
    const g = this.part(y, 'g', Math.sqrt(2 * (semiMajorAxis ?? 0)))
    const j = this.part(y, 'j', ((inclination ?? 0) * DEG) / 2)
    const { S, D } = this.angles(y, varpi)
    const alpha = inclination === 180 ? 0 : g.value * cos(j.value)
    const beta = g.value * sin(j.value)
    const [plus, minus, cross] = [(alpha * alpha) / 2, (beta * beta) / 2, alpha * beta]
    const [cs, ss, cd, sd] = [cos(S.value), sin(S.value), cos(D.value), sin(D.value)]
    const constant = (value: number, byJ: number, byS: number, byD: number) =>
      this.combined(value, [g.value === 0 ? 0 : (2 * value) / g.value, g], [byJ, j], [byS, S], [byD, D])
    return [
      constant(plus * cs + minus * cd, cross * (cd - cs), -plus * ss, -minus * sd),
      constant(plus * ss - minus * sd, -cross * (ss + sd), plus * cs, -minus * cd),
      constant(-plus * ss - minus * sd, cross * (ss - sd), -plus * cs, -minus * cd),
      constant(plus * cs - minus * cd, -cross * (cs + cd), -plus * ss, minus * sd),
    ]
  }

  expand(y: ArrayLike<number>, x: Float64Array, derivatives: Float64Array | null): boolean {
    const free = this.coordinates.length
    const lnPeriod = this.part(y, 'lnPeriod', log(this.held.period ?? 1))
    const shape = this.shape(y, lnPeriod)
    if (shape === null) return false
    const parts = [lnPeriod, shape.u, shape.v, ...this.plane(y, shape.varpi)]
    parts.forEach((part, i) => {
      x[i] = part.value
      derivatives?.set(part.gradient, i * free)
    })
    return true
  }
}

/** Half the inclination of turned constants, away from its ends. */
function halfInclination(plus: number, minus: number): number {
  const j = atan2(Math.sqrt(minus), Math.sqrt(plus))
  return Math.max(LEAST_HALF_INCLINATION, Math.min(PI / 2 - LEAST_HALF_INCLINATION, j))
}

/** Values of every coordinate at a regular orbit, the held elements put in; two where Ω or ω leave a choice. */
function coordinateValues(held: Held, referenceEpochYr: number, regular: ArrayLike<number>): Record<Coordinate, number>[] {
  const [lnPeriod, u, v, A, B, F, G] = Array.from(regular) as [number, number, number, number, number, number, number]
  const periodYr = held.period ?? exp(lnPeriod)
  const s = held.eccentricity === undefined ? Math.min(hypot(u, v), LARGEST_S * 0.999) : atanh(held.eccentricity)
  const own = s > 0 ? atan2(v, u) : 0
  const varpi = held.periastronTime === undefined ? own : (TWO_PI * (held.periastronTime - referenceEpochYr)) / periodYr
  const plus = hypot(A + G, B - F)
  const minus = hypot(A - G, B + F)
  const S = plus > 0 ? atan2(B - F, A + G) : 0
  const D = minus > 0 ? atan2(-B - F, A - G) : 0
  const base = { lnPeriod: log(periodYr), u, v, s, varpi, A, B, F, G, g: Math.sqrt(plus + minus), j: halfInclination(plus, minus), S, D, node: (S - D) / 2, turned: (S + D) / 2 }
  if (held.node !== undefined && held.argumentOfPeriastron === undefined) {
    const node = held.node * DEG
    return [S - node, D + node].map((turned) => ({ ...base, turned }))
  }
  if (held.argumentOfPeriastron !== undefined && held.node === undefined) {
    const turned = held.argumentOfPeriastron * DEG - varpi
    return [S - turned, turned - D].map((node) => ({ ...base, node }))
  }
  return [base]
}

/**
 * The map from free parameters to a regular orbit with elements held.
 * @param held elements by name, in published units; 0 ≤ e ≤ 0.9999, 0 ≤ i ≤ 180°.
 * @param referenceEpochYr t_ref, Julian year.
 * @returns the map and starts for it.
 * Source: Heintz 1978, Double Stars, ch. 4.
 */
export function heldOrbit(held: Held, referenceEpochYr: number): HeldOrbit {
  const coordinates: Coordinate[] = [...(held.period === undefined ? ['lnPeriod' as const] : []), ...shapeCoordinates(held), ...planeCoordinates(held)]
  const expansion = new Expansion(held, coordinates, referenceEpochYr)
  return {
    free: coordinates.length,
    full: FULL,
    expand: (y, x, derivatives) => expansion.expand(y, x, derivatives),
    starts: (regular) => coordinateValues(held, referenceEpochYr, regular).map((values) => Float64Array.from(coordinates, (coordinate) => values[coordinate])),
  }
}

/**
 * Eccentricity as the search takes it.
 * @param held elements.
 * @returns s with e = tanh s, or null where e is free.
 */
export function heldShape(held: Held): number | null {
  return held.eccentricity === undefined ? null : Math.min(atanh(held.eccentricity), LARGEST_S)
}
