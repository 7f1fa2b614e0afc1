import { z } from 'zod'
import type { Conic, Element, FitResult, Kind, Prediction } from '../../fitting/types'
import type { FitMeasureView } from './fits'
import { idSchema, pageQuerySchema } from './ids'
import { kindSchema } from './targets'

export const EDITION_STATES = ['published', 'superseded', 'withdrawn'] as const
export type EditionState = (typeof EDITION_STATES)[number]

/** An edition's place: /orbits/{target id}/{n}. */
export const editionAddressSchema = z.object({
  targetId: idSchema,
  n: z.string().regex(/^[1-9]\d{0,5}$/, 'the number of an edition').transform(Number),
})
export const orbitsQuerySchema = pageQuerySchema.extend({
  /** Part of a name or an alias. */
  q: z.string().trim().max(120).optional(),
  kind: kindSchema.optional(),
})

export interface EditionSummary {
  targetId: string
  targetName: string
  kind: Kind
  programmeName: string
  number: number
  state: EditionState
  publishedAt: string
  sha256: string
  measures: number
  observers: number
  /** One line of what it says, e.g. "P 62.41 ± 0.38 yr, e 0.482, a 0.861″". */
  summary: string
  thumbnailSvg: string | null
}

/** The canonical (RFC 8785) JSON that an edition's hash is taken over. */
export interface EditionSnapshot {
  format: 1
  product: 'Semilatus'
  edition: { targetId: string; number: number; publishedAt: string; whatChanged: string }
  target: { name: string; aliases: string[]; kind: Kind; componentA: string | null; componentB: string | null; radiusUnit: string | null; diameterScaleArcmin: number | null; caution: 'none' | 'sun'; programme: string }
  licence: 'CC-BY-4.0'
  citation: string
  observers: { name: string; measures: number }[]
  measures: FitMeasureView[]
  /** The whole engine request; repeating it with the engine version named gives the same bytes. */
  request: unknown
  result: FitResult
  predictions: Prediction[]
}

export interface EditionView extends EditionSummary {
  /** For If-Match when it is withdrawn. */
  version: number
  snapshot: EditionSnapshot
  whatChanged: string
  conic: Conic | null
  elements: Record<string, Element>
  publishedBy: string
  withdrawal: { at: string; reason: string } | null
  supersededBy: number | null
  editions: { number: number; state: EditionState; publishedAt: string }[]
  mayWithdraw: boolean
}
