import { z } from 'zod'
import type { FitResult, Refusal } from '../../fitting/types'
import { idSchema } from './ids'
import type { MeasureView } from './targets'

export const FIT_STATES = ['queued', 'running', 'done', 'failed', 'accepted', 'declined', 'superseded', 'published'] as const
export type FitState = (typeof FIT_STATES)[number]

export const DECISIONS = ['accept', 'return', 'decline'] as const
export type Decision = (typeof DECISIONS)[number]

const reasonSchema = z.string().trim().min(3, 'a reason, in a few words').max(2000)

export const requestFitSchema = z.object({
  /** The fit whose measures and set-asides this one starts from. */
  baseFitId: idSchema.nullish(),
  /** The whole list of what is set aside in the new fit; a measure of the base fit that is missing here is taken back in. */
  setAside: z.array(z.object({ measureId: idSchema, reason: reasonSchema })).max(5000),
  model: z.enum(['kepler', 'line', 'still']).optional(),
})
/** With header If-Match: "version" of the fit as seen. */
export const ruleSchema = z.object({ decision: z.enum(DECISIONS), reason: reasonSchema })
/** With header If-Match: "version" of the fit as seen. */
export const publishSchema = z.object({ whatChanged: z.string().trim().max(2000).default('') })
export const withdrawEditionSchema = z.object({ reason: reasonSchema })

export interface FitSummary {
  id: string
  number: number
  state: FitState
  version: number
  createdAt: string
  finishedAt: string | null
  requestedBy: string | null
  newMeasures: number
  /** The conic's statement or the refusal's sentence. */
  headline: string | null
}

export interface FitMeasureView extends MeasureView {
  role: 'used' | 'set-aside' | 'not-fitted'
  reason: string | null
  decidedBy: string | null
  isNew: boolean
}

export interface FitView extends FitSummary {
  targetId: string
  targetName: string
  kind: 'relative' | 'equatorial' | 'plane'
  cause: 'batch-sent' | 'refit' | 'requeued' | 'merge'
  engineVersion: string
  inputHash: string
  result: FitResult | null
  refusal: Refusal | null
  measures: FitMeasureView[]
  batches: { id: string; number: number; fileName: string; state: string; ownerName: string }[]
  rulings: { decision: string; reason: string; personName: string; createdAt: string }[]
  job: { state: string; attempts: number; progressFraction: number; progressStage: string | null; elapsedMs: number | null } | null
  /** Difference to the current edition, by element: (new − old) / σ of the difference; null where there is no edition. */
  changeInSigma: Record<string, number | null> | null
  /** Programme rules not yet met, in words; empty where publishing is open. */
  unmetRules: string[]
  mayRule: boolean
  /** Why not, where a coordinator may not (own work). */
  ruleHindrance: string | null
  mayPublish: boolean
}

export interface DeskItem {
  fit: FitSummary
  targetId: string
  targetName: string
  kind: 'relative' | 'equatorial' | 'plane'
  programme: { id: string; name: string }
  /** "9 measures by T. Orrowin" */
  what: string
  /** What stands out, in words; empty where nothing does. */
  notes: string[]
  waitingSince: string
  thumbnailSvg: string | null
}
