/**
 * The types that cross the engine's door. Angles in a request are radians, epochs Julian years (TT), separations
 * arcseconds, radii in the target's own unit. A result is plain JSON with angles in degrees.
 */

export const KINDS = ['relative', 'equatorial', 'plane'] as const
export type Kind = (typeof KINDS)[number]

export const MODELS = ['kepler', 'line', 'still'] as const
export type Model = (typeof MODELS)[number]

/** What every measure carries, whatever its kind. */
export interface MeasureBase {
  /** Stable identifier; results refer to measures by it. */
  id: string
  /** Credited observer; only compared for equality and sorted by. */
  observer: string
  station?: string
  /** Set aside: reported with its residual, left out of every sum. */
  setAside?: boolean
  /** Multiplies the weight 1/σ² of this measure; default 1, must be > 0. */
  weightFactor?: number
}

export interface PolarPosition {
  form: 'polar'
  /** Position angle from north through east, rad; undefined where only ρ was measured. */
  thetaRad?: number
  /** Separation, arcsec, > 0; undefined where only θ was measured. */
  rhoArcsec?: number
  sigmaThetaRad?: number
  sigmaRhoArcsec?: number
  /** Correlation of θ and ρ, in (−1, 1). */
  correlation?: number
  /** Ambiguous: enters modulo 180°. */
  quadrant?: 'stated' | 'ambiguous'
}

export interface RectangularPosition {
  form: 'rectangular'
  eastArcsec: number
  northArcsec: number
  sigmaEastArcsec?: number
  sigmaNorthArcsec?: number
  correlation?: number
}

/** Not resolved: kept and shown, never fitted. */
export interface LimitPosition {
  form: 'limit'
  rhoLimitArcsec: number
}

export interface RelativeMeasure extends MeasureBase {
  /** Julian year, TT; 1600 to 2500. */
  epochYr: number
  position: PolarPosition | RectangularPosition | LimitPosition
  /** Number of nights in the mean, ≥ 1; shapes σ only where it is not stated. */
  nights?: number
  /** How it was measured, compared for equality only: errors by observer are errors by observer and method. */
  method?: string
  /** Equinox of the position angle (or of north and east), Julian year; 2000 for ICRS and J2000, the epoch itself for of-date. */
  thetaEquinoxYr?: number
}

export interface PlaneMeasure extends MeasureBase {
  /** Direction in the plane of the orbit, rad. */
  phiRad: number
  /** Distance from the focus in the target's unit, > 0; exactly one of r and diameterArcmin. */
  r?: number
  sigmaR?: number
  /** Apparent diameter, arcmin, > 0: r = scale / diameter. */
  diameterArcmin?: number
  sigmaDiameterArcmin?: number
  /** Julian year, TT, where a time was given. */
  epochYr?: number
}

/** Where an equatorial measure was made: published parallax constants (equatorial radii), or a geodetic place on WGS 84. East positive. */
export type MeasureSite =
  | { longitudeEastDeg: number; rhoCosPhi: number; rhoSinPhi: number }
  | { longitudeEastDeg: number; latitudeDeg: number; heightM: number }

/** A direction on the axes of the ICRS as measured against catalogue stars (no aberration taken off, diurnal parallax left in). */
export interface EquatorialMeasure extends MeasureBase {
  /** Middle of the exposure, JD of UTC (before 1972 of UT), 1620 to 2500. */
  jdUtc: number
  raRad: number
  /** −π/2 to π/2. */
  decRad: number
  site: MeasureSite
  /** σ of Δα cos δ and of δ, arcsec. */
  sigmaRaCosDecArcsec?: number
  sigmaDecArcsec?: number
  /** Correlation of the two, in (−1, 1). */
  correlation?: number
  /** σ of the time, s: enters along the motion. */
  sigmaTimeS?: number
  /** Total or nuclear brightness in `band`, mag. */
  magnitude?: number
  band?: string
  starCatalogue?: string
  tracklet?: string
}

export interface FitSettings {
  model?: Model
  loss?: 'squares' | 'huber' | 'biweight'
  weights?: 'stated' | 'equal' | 'by-observer'
  /** Elements by name at the value they are held at, in the unit in which they are published. */
  hold?: Record<string, number>
  conicClass?: 'any' | 'ellipse' | 'parabola' | 'circle'
  forces?: 'sun' | 'planets'
  normalPoints?: boolean
  /** Relative: equinox to which position angles are brought, Julian year; left out, they are taken as they stand. */
  thetaEquinox?: number
  /** Relative: where the pair stands at J2000.0; needed to bring position angles to another equinox. */
  targetPosition?: { rightAscensionRad: number; declinationRad: number }
  /** Relative: what the reference point of the measures may do against the focus; default 'none'. */
  frameOffset?: 'none' | 'offset' | 'offset-and-drift'
  shortestPeriodYr?: number
  sigmaScale?: number
  /** Plane: the diameter, arcmin, that the body shows at r = 1 unit. */
  diameterScaleArcmin?: number
  /** Plane: name of the unit of r, for units in the result; default 'unit'. */
  radiusUnit?: string
  seed?: number
  /** 'profile': profile intervals always; 'linear': never; left out: where the linearised errors do not hold. Relative only. */
  errors?: 'linear' | 'profile'
}

/** An earlier result's regular parameters, to refit from instead of searching blind. */
export interface FitStart {
  state: FitState
}

export type FitRequest =
  | { kind: 'relative'; measures: RelativeMeasure[]; settings?: FitSettings; start?: FitStart }
  | { kind: 'plane'; measures: PlaneMeasure[]; settings?: FitSettings; start?: FitStart }
  | { kind: 'equatorial'; measures: EquatorialMeasure[]; settings?: FitSettings; start?: FitStart }

export const PROGRESS_STAGES = ['reading', 'searching', 'polishing', 'judging'] as const
export interface Progress {
  stage: (typeof PROGRESS_STAGES)[number]
  /** 0 to 1 over the whole fit, never falling. */
  fraction: number
}

export const STOP_REASONS = [
  'chi-square-settled', 'step-settled', 'gradient-settled', 'iteration-limit', 'singular', 'exact', 'linear',
] as const
export type StopReason = (typeof STOP_REASONS)[number]

export const REFUSAL_CODES = [
  'no-measures', 'too-few-measures', 'one-epoch', 'one-direction', 'too-many-measures', 'value-out-of-range', 'setting-out-of-range',
  'setting-not-available', 'kind-not-available', 'no-orbit-found', 'duplicate-id', 'time-limit', 'memory-limit', 'worker-failed',
] as const
export type RefusalCode = (typeof REFUSAL_CODES)[number]
export interface Refusal {
  code: RefusalCode
  /** What is wrong and where, in plain words. */
  sentence: string
  /** What would help. */
  remedy: string
}

/** A number with its standard error. sigma is the one to publish (formal where every σ was stated, else scaled). */
export interface Element {
  value: number
  sigma: number | null
  sigmaFormal: number | null
  sigmaScaled: number | null
  unit: string
  /** Held at this value by the request: its errors are 0, and those of the others are conditional on it. */
  status?: 'held'
}

export const CONIC_CLASSES = ['circle', 'ellipse', 'parabola', 'hyperbola'] as const
export interface Conic {
  class: (typeof CONIC_CLASSES)[number]
  semiLatusRectum: Element
  eccentricity: Element
  /** P(e < 1); null where the model is bound by construction or no error is known. */
  probabilityBound: number | null
  parabolaExcluded: boolean | null
  circleExcluded: boolean | null
  /** The same in a sentence for the page, e.g. "Ellipse, bound by construction". */
  statement: string
}

/** Constants of motion per unit mass, with the gravitational parameter they were computed with. */
export interface Constants {
  gravitationalParameter: Element
  specificEnergy: Element
  angularMomentum: Element
  /** Laplace–Runge–Lenz vector; components in the frame named. */
  laplaceRungeLenz: { frame: string; components: Element[]; magnitude: Element }
  /** Largest relative drift of ε, h and A over the measured epochs: a self-check of the arithmetic. */
  largestDrift: number
}

export interface Residual {
  id: string
  status: 'used' | 'set-aside' | 'not-fitted'
  /** By coordinate; the keys of the kind: thetaDeg, rhoArcsec, eastArcsec, northArcsec | r, diameterArcmin, with times phiDeg | raDeg, decDeg, distanceAu, sunDistanceAu. */
  computed: Record<string, number>
  /** Observed minus computed; null for a coordinate that was not measured. relative adds acrossArcsec (ρΔθ) and alongArcsec (Δρ); plane with times adds across, in the unit of r;
   *  equatorial has raCosDecArcsec and decArcsec, and the same along and across the motion on the sky. */
  observedMinusComputed: Record<string, number | null>
  /** Whitened length √Σr² in σ, and the whitened rows themselves. */
  normalised: number | null
  rows: number[]
  weight: number
  leverage: number | null
  cook: number | null
  /** True anomaly and radius in the plane of the orbit (measure carried back onto it); null where not possible. */
  inOrbitPlane: { trueAnomalyDeg: number; radius: number } | null
}

export interface Alternative {
  /** χ² above that of the orbit given, in units of the reduced χ² where that is above 1; slightly negative where periods fit alike and the longest was given. */
  deltaChiSquare: number
  elements: Record<string, Element>
}

export interface Proposal {
  measureId: string
  action: 'set-aside' | 'change-quadrant'
  reason: string
}

/** Regular parameters: what predict and a refit work from. */
export interface FitState {
  model: Model | 'plane' | 'sight' | 'parabola'
  names: string[]
  values: number[]
  /** Covariance of values with the errors to publish; null where the problem is singular or exact. */
  covariance: number[][] | null
  /** Reference epoch, Julian year (relative, plane with times); 0 otherwise. */
  referenceEpochYr: number
  /** Equatorial: what the parameters are counted from; plain numbers. */
  reference?: SightReference
  /** Equatorial: the forces it was fitted with. */
  forces?: 'sun' | 'planets'
}

/** Line of sight and the Earth at the epoch of an equatorial state. */
export interface SightReference {
  /** JD of TT of the state. */
  jdTt: number
  /** The Earth then: place (au) and velocity (au/d), equatorial axes of the ICRS. */
  earth: number[]
  /** Unit vector of the line of sight. */
  direction: readonly [number, number, number]
  /** Unit vector of the direction of motion, for a held parabola only. */
  motion?: readonly [number, number, number]
}

/** How far a motion without perturbations can be believed. */
export interface HonestArc {
  /** Days from the first to the last used measure. */
  days: number
  /** Arc in days up to which a conic holds within the errors of measures; 0 where it does not hold at all. */
  honestUntilDays: number
  standing: 'honest' | 'strained' | 'needs-perturbations' | 'perturbed'
  statement: string
}

/** The error of one observer's measures by one method, estimated from their residuals. */
export interface ObserverError {
  observer: string
  method: string | null
  measures: number
  /** σ of a single night, the same along and across. */
  sigmaArcsec: number
  /** Weight of one measure against one of the typical σ. */
  weight: number
  /** estimated: from the group's own residuals; typical: too few measures, so the median σ of the others; floor: 0.3 of that. */
  basis: 'estimated' | 'typical' | 'floor'
}

/** Several measures close in time as one, about a provisional orbit. */
export interface NormalPoint {
  /** Weighted mean, Julian year. */
  epochYr: number
  northArcsec: number
  eastArcsec: number
  sigmaNorthArcsec: number
  sigmaEastArcsec: number
  correlation: number
  /** Identifiers of the measures in it. */
  members: string[]
}

export interface FitStatistics {
  measures: number
  used: number
  rows: number
  parameters: number
  degreesOfFreedom: number
  chiSquare: number
  reducedChiSquare: number | null
  /** By coordinate with unit: { across: {value, unit} … } */
  rms: Record<string, { value: number; unit: string }>
  conditionNumber: number | null
  /** formal: every σ stated; scaled: none stated; mixed: the median stated was taken for the missing. */
  errorBasis: 'formal' | 'scaled' | 'mixed'
  /** Where errors were estimated (scaled): the standard error of every measure alike, in arcsec or by coordinate of a plane fit. */
  estimatedSigma?: Record<string, { value: number; unit: string }>
  /** Weights 'by-observer': the errors of each observer and method. */
  observerErrors?: ObserverError[]
  /** Plane with times: relative change of ½ r² φ̇ a year, which the law of areas has 0, with its published error. */
  arealLaw?: { changePerYr: number; sigma: number }
  /** Parameters that the measures determine; below `parameters` the problem is singular. */
  rank?: number
  arc: {
    firstEpochYr: number | null
    lastEpochYr: number | null
    /** Span in periods; null where there is no period. */
    turns: number | null
    trueAnomalyCoveredDeg: number | null
    positionAngleCoveredDeg: number | null
  }
  byObserver: { observer: string; measures: number; rms: Record<string, number>; bias: Record<string, number> }[]
}

/** Ends of profile intervals of 68.27 and 95 %, in the element's unit; null where the measures do not bound the element on that side. */
export interface ProfileInterval {
  low68: number | null
  high68: number | null
  low95: number | null
  high95: number | null
}

export interface FitResult {
  format: 1
  kind: Kind
  model: Model
  engine: { version: string; seed: number }
  stop: { reason: StopReason; sentence: string; iterations: number }
  /** null for line and still. */
  conic: Conic | null
  elements: Record<string, Element>
  /** relative: 'ambiguous' without velocities; equinox of Ω. */
  nodeStatus?: 'ambiguous' | 'ascending'
  nodeEquinox?: number
  /** equatorial: epoch of the osculating elements, JD of TT, and the frame of angles. */
  epochOfElements?: number
  frame?: string
  /** equatorial: over which arc the motion fitted is honest. */
  honestArc?: HonestArc
  covariance: { names: string[]; matrix: number[][] } | null
  /** Profile intervals by element, where asked for or where the linearised errors do not hold. */
  profile?: Record<string, ProfileInterval>
  constants: Constants | null
  statistics: FitStatistics
  residuals: Residual[]
  /** Relative, with normalPoints: the points of two or more measures; residuals remain those of the measures. */
  normalPoints?: NormalPoint[]
  alternatives: Alternative[]
  proposals: Proposal[]
  warnings: string[]
  state: FitState
}

export type FitOutcome = { ok: true; result: FitResult } | { ok: false; refusal: Refusal }

export interface Prediction {
  /** relative: Julian year; plane: φ in degrees; equatorial: JD of TT. */
  at: number
  values: Record<string, number>
  /** Same keys as values; null without covariance. */
  sigmas: Record<string, number | null>
  correlation: number | null
}

/** The error that a planned measure would have. */
export type MeasureSigma =
  | { kind: 'relative'; sigmaThetaRad: number; sigmaRhoArcsec: number }
  | { kind: 'plane'; sigmaR: number }
  | { kind: 'equatorial'; sigmaRaCosDecArcsec: number; sigmaDecArcsec: number }

/** What one more measure would add. */
export interface Gain {
  /** relative: Julian year; plane: φ in degrees; equatorial: JD of TT. */
  at: number
  /** Information gained, ½ ln det(I + G C Gᵀ), natural units, ≥ 0. */
  information: number
  /** Standard error of each published element after that measure, in the element's unit. */
  sigmasAfter: Record<string, number | null>
}

/** Do several fits agree with the fit of their pooled measures? */
export interface Agreement {
  /** χ² of the pooled fit minus the sum of the parts', ≥ 0 up to rounding; arcsec² (or the unit of r squared) where errors were estimated. */
  q: number
  /** Degrees of freedom of Q and of the parts together. */
  degreesOfFreedom: number
  partDegreesOfFreedom: number
  /** Q taken as χ²: for calibrated errors only; null where errors were estimated from the residuals. */
  probabilityChiSquare: number | null
  /** (Q/ν_Q)/(Σχ²/Σν) and its probability; null where the parts have no degrees of freedom. */
  f: number | null
  probabilityF: number | null
  /** In words, by F where there is one. */
  statement: string
}
