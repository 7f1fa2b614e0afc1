import { z } from 'zod'
import { KINDS, type MeasureSite } from '../../fitting/types'
import { idSchema, pageQuerySchema } from './ids'
import type { EditionSummary } from './editions'
import type { FitSummary, FitView } from './fits'

export const kindSchema = z.enum(KINDS)

export const createProgrammeSchema = z.object({
  name: z.string().trim().min(1).max(120),
  description: z.string().trim().max(2000).default(''),
  leastMeasures: z.number('a whole number').int('a whole number').min(1).max(10000).default(8),
  leastObservers: z.number('a whole number').int('a whole number').min(1).max(100).default(1),
  leastArcTurns: z.number('a number').min(0).max(10).default(0),
})

export const createTargetSchema = z.object({
  programmeId: idSchema,
  kind: kindSchema,
  name: z.string().trim().min(1).max(120),
  aliases: z.array(z.string().trim().min(1).max(120)).max(50).default([]),
  componentA: z.string().trim().max(40).nullish(),
  componentB: z.string().trim().max(40).nullish(),
  radiusUnit: z.string().trim().min(1).max(20).nullish(),
  diameterScaleArcmin: z.number('a number above zero').positive('a number above zero').max(1e6).nullish(),
  caution: z.enum(['none', 'sun']).default('none'),
  remarks: z.string().trim().max(2000).default(''),
})

export const listTargetsQuerySchema = pageQuerySchema.extend({
  programmeId: idSchema.optional(),
  kind: kindSchema.optional(),
  /** Part of any of a target's names. */
  q: z.string().trim().max(120).optional(),
  /** followed=1: only those that the person asking follows. */
  followed: z.literal('1').optional(),
})
/** The fit to show; the latest where not given. */
export const readTargetQuerySchema = z.object({ fit: idSchema.optional() })

export interface ProgrammeView {
  id: string
  name: string
  description: string
  leastMeasures: number
  leastObservers: number
  leastArcTurns: number
  coordinators: { id: string; displayName: string }[]
}

export interface TargetSummary {
  id: string
  name: string
  kind: z.infer<typeof kindSchema>
  programme: { id: string; name: string }
  caution: 'none' | 'sun'
  measures: number
  observers: number
  firstEpochYr: number | null
  lastEpochYr: number | null
  latestFit: FitSummary | null
  currentEdition: { number: number; publishedAt: string } | null
}

/** The sheet of a target. Measures come with the fit shown (FitView.measures), or alone where no fit exists yet. */
export interface TargetView extends Omit<TargetSummary, 'measures'> {
  aliases: string[]
  componentA: string | null
  componentB: string | null
  radiusUnit: string | null
  diameterScaleArcmin: number | null
  remarks: string
  isFollowed: boolean
  mayCoordinate: boolean
  mayUpload: boolean
  fits: FitSummary[]
  editions: EditionSummary[]
  /** The fit asked for by ?fit=, else the latest one. */
  fit: FitView | null
  /** Standing measures, newest state; what the table shows where no fit exists. */
  measures: MeasureView[]
}

/** One measure as pages and downloads show it; only the fields of its kind are there. */
export interface MeasureView {
  id: string
  observer: string
  batchNumber: number
  epochYr: number | null
  timeUtc: string | null
  thetaDeg: number | null
  rhoArcsec: number | null
  rhoLimitArcsec: number | null
  sigmaThetaDeg: number | null
  sigmaRhoArcsec: number | null
  eastArcsec: number | null
  northArcsec: number | null
  sigmaEastArcsec: number | null
  sigmaNorthArcsec: number | null
  phiDeg: number | null
  r: number | null
  sigmaR: number | null
  diameterArcmin: number | null
  sigmaDiameterArcmin: number | null
  nights: number | null
  method: string | null
  remarks: string | null
  /** Of a comet or minor planet only. */
  sky?: SkyPlaceView
}

/** Where a comet or minor planet was seen, from where, and how well. */
export interface SkyPlaceView {
  raDeg: number
  decDeg: number
  sigmaRaCosDecArcsec: number | null
  sigmaDecArcsec: number | null
  correlation: number | null
  sigmaTimeS: number | null
  station: string | null
  site: MeasureSite
  starCatalogue: string | null
  tracklet: string | null
  mag: number | null
  band: string | null
}
