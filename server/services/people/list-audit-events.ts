import { mayAdminister } from '#shared/policies/administering'
import type { AuditEventView } from '#shared/schemas/events'
import type { Page } from '#shared/schemas/ids'
import type { Context } from '../../context/context'
import { notFound } from '../../errors/app-error'
import { listAuditEvents as listAuditRows } from '../../repositories/audit-repository'
import { decodeCursor, DEFAULT_LIMIT, pageOf } from '../../repositories/cursor'
import type { PageQuery } from '../../repositories/cursor'

/** Who did what to what, newest first. For administrators. */
export async function listAuditEvents(ctx: Context, { cursor, limit = DEFAULT_LIMIT }: PageQuery): Promise<Page<AuditEventView>> {
  if (!mayAdminister(ctx.actor)) throw notFound()
  const beforeSeq = cursor === undefined ? undefined : decodeCursor(cursor, ['number'])[0]
  const rows = await listAuditRows(ctx.reads, { beforeSeq, limit: limit + 1 })
  return pageOf(rows, limit, {
    keyOf: row => [row.seq],
    itemOf: row => ({
      seq: row.seq,
      at: row.at,
      actorName: row.actor_name,
      event: row.event,
      subjectKind: row.subject_kind,
      subjectId: row.subject_id,
      subjectName: row.subject_name,
      detail: JSON.parse(row.detail) as Record<string, unknown>,
    }),
  })
}
