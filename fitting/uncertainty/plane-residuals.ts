/** Residuals of measures in the plane of the orbit, without and with times. */
import { withinTurn } from '../conic/thiele-innes'
import { atan2, cos, hypot, RAD, sin } from '../elementary'
import type { PlanePoint } from '../models/plane-measure'
import { PlaneMotion, planeRowBuffer, planeRowsInto } from '../models/plane-motion'
import { wrapToHalfTurn } from '../models/relative-kepler'
import type { Residual } from '../types'
import { influenceOf } from './influence'
import { planePlaceAt } from './plane-motion-elements'

/** A gradient by (p, k, h) as one by all parameters. */
export const widened = (gradient: readonly number[], parameters: number) => [...gradient, ...new Array<number>(parameters - gradient.length).fill(0)]

export interface PointContext {
  values: ArrayLike<number>
  covariance: number[][] | null
  scaleSquared: number | null
  diameterScale: number | null
  referenceEpochYr: number | null
}

/** With times: place at the epoch, rows along and across. */
function timedResidual(point: PlanePoint, context: PointContext, referenceEpochYr: number): Residual {
  const { values, covariance, scaleSquared, diameterScale } = context
  const motion = new PlaneMotion(referenceEpochYr)
  const buffer = planeRowBuffer()
  const place = planePlaceAt(values, referenceEpochYr, point)
  const isReached = place !== null && motion.prepare(values) && planeRowsInto(point, motion, values, diameterScale ?? 1, buffer)
  const rows = isReached ? Array.from(buffer.values) : []
  const p = values.length
  const gradients = [buffer.gradients.slice(0, p), buffer.gradients.slice(p)]
  const influence = isReached && point.status === 'used' && covariance !== null ? influenceOf({ residuals: rows, gradients }, covariance, scaleSquared) : null
  const isDiameter = point.coordinate === 'diameterArcmin'
  const computed: Record<string, number> = isReached ? { r: place.r, phiDeg: withinTurn(place.phiRad) * RAD } : {}
  if (isReached && isDiameter) computed.diameterArcmin = (diameterScale ?? 1) / place.r
  return {
    id: point.id,
    status: point.status,
    computed,
    observedMinusComputed: {
      r: isReached ? point.r - place.r : null, across: isReached ? point.r * wrapToHalfTurn(point.phiRad - place.phiRad) : null,
      ...(isDiameter ? { diameterArcmin: isReached ? point.value - (diameterScale ?? 1) / place.r : null } : {}),
    },
    normalised: isReached ? hypot(rows[0]!, rows[1]!) : null,
    rows,
    weight: point.status === 'used' ? point.weight : 0,
    leverage: influence?.leverage ?? null,
    cook: influence?.cook ?? null,
    inOrbitPlane: { trueAnomalyDeg: wrapToHalfTurn(point.phiRad - atan2(values[2]!, values[1]!)) * RAD, radius: point.r },
  }
}

/**
 * Residual of one measure at the solution.
 * @param point used or set aside.
 * @param context solution and its errors.
 * @returns the residual; leverage and Cook's distance for used measures only.
 */
export function planeResidual(point: PlanePoint, context: PointContext): Residual {
  return context.referenceEpochYr !== null && point.epochYr !== null ? timedResidual(point, context, context.referenceEpochYr) : untimedResidual(point, context)
}

function untimedResidual(point: PlanePoint, { values, covariance, scaleSquared, diameterScale }: PointContext): Residual {
  const p = values[0]!
  const c = cos(point.phiRad)
  const s = sin(point.phiRad)
  const denominator = 1 + values[1]! * c + values[2]! * s
  const r = denominator > 0 ? p / denominator : NaN
  const isDiameter = point.coordinate === 'diameterArcmin'
  const scale = diameterScale ?? 1
  const model = isDiameter ? scale / r : r
  const whitening = Math.sqrt(point.weight) / point.sigma
  const row = (model - point.value) * whitening
  const byShape = (isDiameter ? scale / p : -r / denominator) * whitening
  const gradient = widened([(isDiameter ? -model / p : r / p) * whitening, byShape * c, byShape * s], values.length)
  const isReached = denominator > 0
  const influence = point.status === 'used' && covariance !== null ? influenceOf({ residuals: [row], gradients: [gradient] }, covariance, scaleSquared) : null
  const difference = isReached ? point.value - model : null
  return {
    id: point.id,
    status: point.status,
    computed: isReached ? (isDiameter ? { r, diameterArcmin: model } : { r }) : {},
    observedMinusComputed: { r: isReached ? point.r - r : null, ...(isDiameter ? { diameterArcmin: difference } : {}) },
    normalised: isReached ? Math.abs(row) : null,
    rows: isReached ? [row] : [],
    weight: point.status === 'used' ? point.weight : 0,
    leverage: influence?.leverage ?? null,
    cook: influence?.cook ?? null,
    inOrbitPlane: { trueAnomalyDeg: wrapToHalfTurn(point.phiRad - atan2(values[2]!, values[1]!)) * RAD, radius: point.r },
  }
}
