import { z } from 'zod'
import { idSchema, pageQuerySchema } from './ids'
import { kindSchema } from './targets'

export const BATCH_STATES = ['draft', 'sent', 'accepted', 'returned', 'declined', 'withdrawn'] as const
export type BatchState = (typeof BATCH_STATES)[number]

/** POST /api/v1/batches?fileName=&kind=&targetId= with the file's bytes as the body (text/csv, text/tab-separated-values or application/octet-stream). */
export const uploadQuerySchema = z.object({
  fileName: z.string().trim().min(1).max(255),
  kind: kindSchema,
  /** Where rows without a `target` column belong. */
  targetId: idSchema.optional(),
})
/** Media types in which a file's bytes are taken. */
export const UPLOAD_TYPES = ['text/csv', 'text/tab-separated-values', 'text/plain', 'application/octet-stream'] as const
/** Largest file that is taken, bytes. */
export const UPLOAD_CAP_BYTES = 8 * 1024 * 1024
/** Most data rows that are read from one file. */
export const UPLOAD_CAP_ROWS = 50_000
/** Most rows that one view of a batch holds; GET /api/v1/batches/:id/rows answers all of them, page by page. */
export const ROWS_IN_VIEW = 1000

export const mendRowSchema = z.object({
  /** Replacement text by canonical column name; only those given change. */
  cells: z.record(z.string().min(1).max(60), z.string().max(1000)),
})
export const chooseTargetSchema = z.object({ targetId: idSchema })
/** Which of the batch's parts is taken back. */
export const withdrawBatchSchema = z.object({ targetId: idSchema })
export const rowParamsSchema = z.object({ id: idSchema, rowId: idSchema })
/** mine=1 leaves out what others sent to the programmes one coordinates. */
export const listBatchesQuerySchema = pageQuerySchema.extend({ mine: z.enum(['0', '1']).optional() })

export interface CellProblem {
  rowNumber: number
  /** Canonical column name, or null where the whole row is meant. */
  column: string | null
  value: string | null
  reason: string
  remedy: string
  /** 'note' does not keep the row from being sent. */
  severity: 'error' | 'note'
}

export interface BatchRowView {
  id: string
  rowNumber: number
  state: 'good' | 'bad' | 'already-here' | 'sent'
  targetName: string | null
  cells: Record<string, string>
  originalCells: Record<string, string>
  problems: CellProblem[]
}

export interface BatchSummary {
  id: string
  number: number
  kind: z.infer<typeof kindSchema>
  fileName: string
  ownerName: string
  createdAt: string
  rows: number
  good: number
  bad: number
  alreadyHere: number
  sent: number
  parts: { targetId: string; targetName: string; state: BatchState; measures: number; lastReason: string | null }[]
}

export interface BatchView extends BatchSummary {
  version: number
  sha256: string
  byteCount: number
  /** How the file was read: delimiter, encoding, columns used and not used. */
  reading: { encoding: string; delimiter: string; columns: string[]; unusedColumns: string[]; headerRow: number }
  fileProblems: CellProblem[]
  defaultTarget: { id: string; name: string } | null
  /** In the order of the file. Where there are more than ROWS_IN_VIEW, those to mend come in first, then those with a note. */
  items: BatchRowView[]
  /** How many rows `items` leaves out. */
  rowsNotShown: number
  isMine: boolean
  mayWithdraw: boolean
}

export interface SendOutcome {
  sent: number
  alreadyHere: number
  keptAsDraft: number
  /** "12 new measures sent. 3 were already here." */
  sentence: string
  fits: { fitId: string; targetId: string; targetName: string }[]
}
