/** Simulated measures in the plane of an orbit with times: any eccentricity, either sense, by placeAtTime and a seed alone. */
import { placeAtTime } from '../../fitting/conic/anomalies'
import { atan2, cos, hypot, PI, sin } from '../../fitting/elementary'
import { randomStream } from '../../fitting/random'
import type { PlaneMeasure } from '../../fitting/types'

export interface PlaneMotionOptions {
  seed: number
  count: number
  eccentricity: readonly [number, number]
  /** Arc: in periods where bound, in units of √(q³/μ) beyond e = 1; from, to. */
  arc?: readonly [number, number]
  /** Standard error of each coordinate as a part of r: from, to; 0 leaves the measures exact. */
  sigma?: readonly [number, number]
}

export interface PlaneTruth {
  q: number
  e: number
  phi0: number
  mu: number
  periapsisYr: number
  sense: 1 | -1
  /** Yr; Infinity where not bound. */
  periodYr: number
}

const between = ([from, to]: readonly [number, number], part: number) => from + (to - from) * part

/**
 * Draws a conic and its measures.
 * @param options seed, number, eccentricity, arc, errors.
 */
export function simulatedPlaneMotion(options: PlaneMotionOptions): { truth: PlaneTruth; measures: PlaneMeasure[] } {
  const random = randomStream(options.seed * 7919 + 13)
  for (let i = 0; i < 8; i++) random.uniform()
  const e = between(options.eccentricity, random.uniform())
  const q = 0.3 + 2 * random.uniform()
  const mu = 4 * PI * PI
  const periodYr = e < 1 ? Math.sqrt((q / (1 - e)) ** 3) : Infinity
  const unitYr = e < 1 ? periodYr : Math.sqrt((q * q * q) / mu)
  const span = unitYr * between(options.arc ?? (e < 1 ? [0.5, 3] : [2, 8]), random.uniform())
  const sigma = between(options.sigma ?? [0.005, 0.03], random.uniform())
  const middleYr = 2000
  const periapsisYr = middleYr + (e < 1 ? periodYr : 0.4 * span) * (random.uniform() - 0.5)
  const truth: PlaneTruth = { q, e, phi0: 2 * PI * random.uniform(), mu, periapsisYr, sense: random.uniform() < 0.5 ? 1 : -1, periodYr }
  const measures = Array.from({ length: options.count }, (_, i): PlaneMeasure => {
    const epochYr = middleYr + span * (random.uniform() - 0.5)
    const place = placeAtTime({ periapsisDistance: q, eccentricity: e, gravitationalParameter: mu }, epochYr - periapsisYr)
    const phi = truth.phi0 + truth.sense * place.trueAnomalyRad
    const [x, y] = [place.radius * (cos(phi) + sigma * random.normal()), place.radius * (sin(phi) + sigma * random.normal())]
    return { id: `p${String(i).padStart(4, '0')}`, observer: 'Quellmann', epochYr, phiRad: atan2(y, x), r: hypot(x, y), sigmaR: Math.max(sigma, 1e-9) * place.radius }
  })
  return { truth, measures }
}

/** The true orbit in the engine's parameters (p, k, h, H, φᵣ) at a reference epoch. */
export function planeStateValues({ q, e, phi0, mu, periapsisYr, sense }: PlaneTruth, referenceEpochYr: number): number[] {
  const p = q * (1 + e)
  const { trueAnomalyRad } = placeAtTime({ periapsisDistance: q, eccentricity: e, gravitationalParameter: mu }, referenceEpochYr - periapsisYr)
  return [p, e * cos(phi0), e * sin(phi0), sense * Math.sqrt(mu * p), phi0 + sense * trueAnomalyRad]
}
