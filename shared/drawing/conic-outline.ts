import type { FitResult, Residual } from '../../fitting/types'

/** A place on the drawing. relative: x east, y north, arcsec; plane: x toward φ = 0, y toward φ = 90°, in the unit of r. */
export interface Point {
  x: number
  y: number
}

/** A fitted curve as a row of points; the focus (the primary star, the body orbited) is at 0, 0. */
export interface ConicOutline {
  /** closed: an ellipse, its last point joins its first; open: the drawn part of a parabola or hyperbola; straight: two ends of a line. */
  shape: 'closed' | 'open' | 'straight'
  points: Point[]
  /** Periastron or periapsis; null where the curve has none. */
  periapsis: Point | null
}

const RADIANS_PER_DEGREE = Math.PI / 180
const CURVE_POINTS = 96
/** How far past the nearest distance an open curve is drawn at least. */
const OPEN_REACH = 5
/** An orbit about the Sun is drawn to this part of its perihelion distance at least, and this far past its outermost measure. */
const SOLAR_REACH = 2.5
const SOLAR_OVERHANG = 1.5
/** How much a line is drawn on past its outermost measures, as a part of its length. */
const LINE_OVERHANG = 0.15

/**
 * Traces the curve that a result describes, as it is seen: on the sky for a pair, in the plane of the orbit otherwise.
 * @param result a finished fit.
 * @returns the outline, or null where the result has no curve to draw (companion at rest, elements left undetermined).
 */
export function conicOutline(result: FitResult): ConicOutline | null {
  if (result.model === 'line') return straightOutline(result.residuals)
  if (result.model === 'still') return null
  if (result.kind === 'relative') return apparentEllipse(result)
  return result.kind === 'plane' ? planeConic(result) : solarConic(result)
}

/** The apparent ellipse through the Thiele–Innes constants. */
function apparentEllipse(result: FitResult): ConicOutline | null {
  const semiMajorAxisArcsec = finiteValue(result, 'semiMajorAxis')
  const eccentricity = finiteValue(result, 'eccentricity')
  const inclinationRad = angleRad(result, 'inclination')
  const nodeRad = angleRad(result, 'node')
  const periastronRad = angleRad(result, 'argumentOfPeriastron')
  if (semiMajorAxisArcsec === null || eccentricity === null || eccentricity >= 1) return null
  if (inclinationRad === null || nodeRad === null || periastronRad === null) return null

  const cosW = Math.cos(periastronRad), sinW = Math.sin(periastronRad)
  const cosN = Math.cos(nodeRad), sinN = Math.sin(nodeRad), cosI = Math.cos(inclinationRad)
  const toPeriastron = { north: cosW * cosN - sinW * sinN * cosI, east: cosW * sinN + sinW * cosN * cosI }
  const along = { north: -sinW * cosN - cosW * sinN * cosI, east: -sinW * sinN + cosW * cosN * cosI }
  const minorOverMajor = Math.sqrt(1 - eccentricity * eccentricity)

  const at = (eccentricAnomalyRad: number): Point => {
    const u = semiMajorAxisArcsec * (Math.cos(eccentricAnomalyRad) - eccentricity)
    const v = semiMajorAxisArcsec * minorOverMajor * Math.sin(eccentricAnomalyRad)
    return { x: toPeriastron.east * u + along.east * v, y: toPeriastron.north * u + along.north * v }
  }
  return { shape: 'closed', points: aroundOnce(at), periapsis: at(0) }
}

/** r = p / (1 + e cos(φ − φ₀)); an open curve is cut where it leaves the measures well behind. */
function planeConic(result: FitResult): ConicOutline | null {
  const p = finiteValue(result, 'semiLatusRectum')
  const e = finiteValue(result, 'eccentricity')
  if (p === null || e === null || p <= 0) return null
  const periapsisRad = angleRad(result, 'periapsisDirection') ?? 0

  const at = (trueAnomalyRad: number): Point => {
    const r = p / (1 + e * Math.cos(trueAnomalyRad))
    return { x: r * Math.cos(periapsisRad + trueAnomalyRad), y: r * Math.sin(periapsisRad + trueAnomalyRad) }
  }
  if (e < 1) {
    // Even steps of the eccentric anomaly keep the sharp end of a long ellipse smooth.
    const ofEccentric = (eccentricAnomalyRad: number) =>
      2 * Math.atan2(Math.sqrt(1 + e) * Math.sin(eccentricAnomalyRad / 2), Math.sqrt(1 - e) * Math.cos(eccentricAnomalyRad / 2))
    return { shape: 'closed', points: aroundOnce(E => at(ofEccentric(E))), periapsis: at(0) }
  }
  const reach = Math.max(OPEN_REACH * p / (1 + e), 1.1 * largestRadius(result.residuals))
  const limitRad = Math.acos(Math.max(-1, Math.min(1, (p / reach - 1) / e)))
  const points = Array.from({ length: CURVE_POINTS + 1 }, (_, k) => at(limitRad * (2 * k / CURVE_POINTS - 1)))
  return { shape: 'open', points, periapsis: at(0) }
}

/** Seen from above its own plane with perihelion to the right; a long orbit is cut where it leaves the measures well behind. */
function solarConic({ conic, residuals }: FitResult): ConicOutline | null {
  const p = conic?.semiLatusRectum.value
  const e = conic?.eccentricity.value
  if (p === undefined || e === undefined || !(p > 0) || !Number.isFinite(e)) return null
  const outermost = residuals.reduce((largest, { computed }) => Math.max(largest, computed.sunDistanceAu ?? 0), 0)
  const reach = Math.max(SOLAR_REACH * p / (1 + e), SOLAR_OVERHANG * outermost)
  const at = (trueAnomalyRad: number): Point => {
    const r = p / (1 + e * Math.cos(trueAnomalyRad))
    return { x: r * Math.cos(trueAnomalyRad), y: r * Math.sin(trueAnomalyRad) }
  }
  if (e < 1 && p / (1 - e) <= reach) return { shape: 'closed', points: aroundOnce(at), periapsis: at(0) }
  const limitRad = Math.acos(Math.max(-1, Math.min(1, (p / reach - 1) / e)))
  return { shape: 'open', points: Array.from({ length: CURVE_POINTS + 1 }, (_, k) => at(limitRad * (2 * k / CURVE_POINTS - 1))), periapsis: at(0) }
}

function straightOutline(residuals: readonly Residual[]): ConicOutline | null {
  const places = residuals.map(computedPoint).filter(point => point !== null)
  const start = places[0]
  if (start === undefined) return null
  const end = places.reduce((far, point) => distance(start, point) > distance(start, far) ? point : far, start)
  const begin = places.reduce((far, point) => distance(end, point) > distance(end, far) ? point : far, end)
  if (distance(begin, end) === 0) return null
  const over = { x: (end.x - begin.x) * LINE_OVERHANG, y: (end.y - begin.y) * LINE_OVERHANG }
  return {
    shape: 'straight',
    points: [{ x: begin.x - over.x, y: begin.y - over.y }, { x: end.x + over.x, y: end.y + over.y }],
    periapsis: null,
  }
}

/** Where the fit puts the companion at a measure's epoch; null where the residual does not say. */
export function computedPoint(residual: Residual): Point | null {
  const { eastArcsec, northArcsec, thetaDeg, rhoArcsec } = residual.computed
  if (eastArcsec !== undefined && northArcsec !== undefined) return { x: eastArcsec, y: northArcsec }
  if (thetaDeg === undefined || rhoArcsec === undefined) return null
  const thetaRad = thetaDeg * RADIANS_PER_DEGREE
  return { x: rhoArcsec * Math.sin(thetaRad), y: rhoArcsec * Math.cos(thetaRad) }
}

function aroundOnce(at: (angleRad: number) => Point): Point[] {
  return Array.from({ length: CURVE_POINTS }, (_, k) => at(2 * Math.PI * k / CURVE_POINTS))
}

function largestRadius(residuals: readonly Residual[]): number {
  return residuals.reduce((largest, residual) => Math.max(largest, residual.computed.r ?? 0), 0)
}

function finiteValue(result: FitResult, name: string): number | null {
  const value = result.elements[name]?.value
  return value !== undefined && Number.isFinite(value) ? value : null
}

function angleRad(result: FitResult, name: string): number | null {
  const degrees = finiteValue(result, name)
  return degrees === null ? null : degrees * RADIANS_PER_DEGREE
}

function distance(a: Point, b: Point): number {
  return Math.hypot(a.x - b.x, a.y - b.y)
}
