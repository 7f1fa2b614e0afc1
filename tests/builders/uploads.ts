import { createHash } from 'node:crypto'
import type { Kind } from '../../fitting/types'
import type { Context } from '../../server/context/context'
import { uploadBatch } from '../../server/services/batches/upload-batch'
import type { BatchView } from '../../shared/schemas/batches'
import type { TestHouse } from './test-house'

export interface TextUpload {
  text: string | Buffer
  fileName?: string
  kind?: Kind
  targetId?: string | null
}

/** Uploads a text as a file of measures of a pair, unless said otherwise. */
export async function uploadText(ctx: Context, { text, fileName = 'measures.csv', kind = 'relative', targetId = null }: TextUpload): Promise<BatchView> {
  const bytes = Buffer.from(text)
  return await uploadBatch(ctx, { fileName, kind, targetId, bytes, sha256: createHash('sha256').update(bytes).digest('hex') })
}

/** Number of rows in each table that an upload, a sending or a ruling can write: equal before and after where nothing was written. */
export async function countRows({ database }: TestHouse): Promise<Record<string, number>> {
  const counts: Record<string, number> = {}
  for (const table of ['raw_file', 'batch', 'batch_target', 'batch_row', 'observer', 'measure', 'fit', 'fit_measure', 'ruling', 'job', 'mail_out', 'audit_event'] as const) {
    const { count } = await database.reads.selectFrom(table).select(({ fn }) => fn.countAll<number>().as('count')).executeTakeFirstOrThrow()
    counts[table] = count
  }
  return counts
}

/** Audit events of these names, oldest first, with who did them. */
export async function auditOf({ database }: TestHouse, ...events: string[]): Promise<{ event: string; subject_id: string; actor_id: string | null; detail: Record<string, unknown> }[]> {
  const rows = await database.reads.selectFrom('audit_event').select(['event', 'subject_id', 'actor_id', 'detail']).where('event', 'in', events).orderBy('seq').execute()
  return rows.map(row => ({ ...row, detail: JSON.parse(row.detail) as Record<string, unknown> }))
}
