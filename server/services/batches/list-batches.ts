import type { BatchSummary } from '#shared/schemas/batches'
import type { Page } from '#shared/schemas/ids'
import type { Context } from '../../context/context'
import { signInRequired } from '../../errors/app-error'
import { listPartOverviews } from '../../repositories/batch-part-repository'
import { listBatchOverviews } from '../../repositories/batch-repository'
import { decodeCursor, DEFAULT_LIMIT, pageOf } from '../../repositories/cursor'
import type { PageQuery } from '../../repositories/cursor'
import { batchSummary } from './batch-view'

export interface BatchListing extends PageQuery {
  /** Leave out what others sent to the programmes one coordinates. */
  isMineOnly: boolean
}

/** One's own batches, for coordinators also those sent to their programmes, newest first. Open to signed-in people. */
export async function listBatches(ctx: Context, { isMineOnly, cursor, limit = DEFAULT_LIMIT }: BatchListing): Promise<Page<BatchSummary>> {
  if (!ctx.actor) throw signInRequired()
  const batches = await listBatchOverviews(ctx.reads, {
    ownerId: ctx.actor.personId,
    programmeIds: isMineOnly ? [] : ctx.actor.coordinatorOf,
    ...(cursor === undefined ? {} : { before: decodeCursor(cursor, ['number'])[0] }),
    limit: limit + 1,
  })
  const parts = await listPartOverviews(ctx.reads, batches.map(batch => batch.id))
  return pageOf(batches, limit, {
    keyOf: batch => [batch.number],
    itemOf: batch => batchSummary(batch, parts.filter(part => part.batch_id === batch.id)),
  })
}
