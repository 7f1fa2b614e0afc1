/**
 * Campbell elements of a double star and their Thiele–Innes constants.
 *
 * Symbols: a semi-major axis (arcsec), i inclination, Ω position angle of the node, ω argument of periastron of the companion's relative
 * orbit (rad); A, B, F, G Thiele–Innes constants (arcsec). With x north and y east, x = A·X + F·Y and y = B·X + G·Y for the place (X, Y)
 * in the plane of the orbit, X towards periastron, in units of a.
 *   A =  a·(cos ω cos Ω − sin ω sin Ω cos i)    F = a·(−sin ω cos Ω − cos ω sin Ω cos i)
 *   B =  a·(cos ω sin Ω + sin ω cos Ω cos i)    G = a·(−sin ω sin Ω + cos ω cos Ω cos i)
 * Back: ω + Ω = atan2(B − F, A + G), ω − Ω = atan2(−B − F, A − G), a·(1 ± cos i) = hypot(A ± G, B ∓ F).
 *
 * Sources: Heintz 1978, Double Stars, ch. 4; Binnendijk 1960, Properties of Double Stars.
 */
import { atan2, hypot, PI, sinCosInto, TWO_PI } from '../elementary'

/** Thiele–Innes constants, in the unit of the semi-major axis (arcsec). */
export interface ThieleInnes {
  a: number
  b: number
  f: number
  g: number
}

/** Size and orientation of the orbit of a double star. */
export interface OrbitOrientation {
  /** a, arcsec, > 0. */
  semiMajorAxisArcsec: number
  /** i, rad, 0 to π; below π/2 where the position angle grows with time. */
  inclinationRad: number
  /** Ω, rad. */
  nodeRad: number
  /** ω, rad. */
  argumentOfPeriastronRad: number
}

/** What the constants determine: both angles, only ω + Ω (i = 0) or only ω − Ω (i = 180°). */
export const DETERMINED_ANGLES = ['node-and-argument', 'sum', 'difference'] as const
export type DeterminedAngles = (typeof DETERMINED_ANGLES)[number]

/** Below this share of a, a·(1 ∓ cos i) is rounding: i is then 0 or 180° within 1e-7 rad. */
const FACE_ON = 1e-14

const nodeDirection = new Float64Array(2)
const argumentDirection = new Float64Array(2)
const tilt = new Float64Array(2)

/**
 * Thiele–Innes constants of an orbit.
 * @param orientation a (arcsec), i, Ω, ω (rad).
 * @returns A, B, F, G, arcsec.
 * Source: Heintz 1978, Double Stars, ch. 4.
 */
export function thieleInnesFromCampbell(orientation: OrbitOrientation): ThieleInnes {
  const a = orientation.semiMajorAxisArcsec
  sinCosInto(orientation.nodeRad, nodeDirection)
  sinCosInto(orientation.argumentOfPeriastronRad, argumentDirection)
  sinCosInto(orientation.inclinationRad, tilt)
  const sinNode = nodeDirection[0]!
  const cosNode = nodeDirection[1]!
  const sinArgument = argumentDirection[0]!
  const cosArgument = argumentDirection[1]!
  const cosTilt = tilt[1]!
  return {
    a: a * (cosArgument * cosNode - sinArgument * sinNode * cosTilt),
    b: a * (cosArgument * sinNode + sinArgument * cosNode * cosTilt),
    f: a * (-sinArgument * cosNode - cosArgument * sinNode * cosTilt),
    g: a * (-sinArgument * sinNode + cosArgument * cosNode * cosTilt),
  }
}

/**
 * Campbell elements of Thiele–Innes constants. Without velocities Ω and ω may both turn by 180°: given is 0 ≤ Ω < 180°, 0 ≤ ω < 360°.
 * @param constants A, B, F, G, arcsec, not all 0.
 * @returns a, i, Ω, ω, and what is determined; where only ω ± Ω is, Ω is 0 and ω that sum or difference.
 * Source: Heintz 1978, Double Stars, ch. 4.
 */
export function campbellFromThieleInnes(constants: ThieleInnes): OrbitOrientation & { determined: DeterminedAngles } {
  const { a, b, f, g } = constants
  const direct = hypot(a + g, b - f)
  const retrograde = hypot(a - g, b + f)
  const semiMajorAxisArcsec = 0.5 * (direct + retrograde)
  const inclinationRad = 2 * atan2(Math.sqrt(retrograde), Math.sqrt(direct))
  const sum = atan2(b - f, a + g)
  const difference = atan2(-b - f, a - g)
  const size = { semiMajorAxisArcsec, inclinationRad }
  if (retrograde <= FACE_ON * direct) return { ...size, nodeRad: 0, argumentOfPeriastronRad: withinTurn(sum), determined: 'sum' }
  if (direct <= FACE_ON * retrograde) return { ...size, nodeRad: 0, argumentOfPeriastronRad: withinTurn(difference), determined: 'difference' }
  const reduced = withFirstNode(0.5 * (sum - difference), 0.5 * (sum + difference))
  return { ...size, ...reduced, determined: 'node-and-argument' }
}

/**
 * Turns Ω and ω together by 180° where needed so that 0 ≤ Ω < 180°, and brings ω to 0 … 360°.
 * @param nodeRad Ω, rad, any finite number.
 * @param argumentOfPeriastronRad ω, rad, any finite number.
 * @returns the same orbit with Ω in [0, π) and ω in [0, 2π), rad.
 * Source: common practice for orbits without velocities.
 */
export function withFirstNode(nodeRad: number, argumentOfPeriastronRad: number): { nodeRad: number, argumentOfPeriastronRad: number } {
  const node = withinTurn(nodeRad)
  const isSecond = node >= PI
  return {
    nodeRad: isSecond ? Math.max(0, node - PI) : node,
    argumentOfPeriastronRad: withinTurn(argumentOfPeriastronRad + (isSecond ? PI : 0)),
  }
}

/**
 * An angle brought into one turn.
 * @param angleRad any finite angle, rad.
 * @returns the same direction in [0, 2π), rad.
 * Source: definition.
 */
export function withinTurn(angleRad: number): number {
  const within = angleRad - TWO_PI * Math.floor(angleRad / TWO_PI)
  return within >= TWO_PI || within < 0 ? 0 : within
}
