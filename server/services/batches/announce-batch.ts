import type { Context } from '../../context/context'

/** Tells the open pages, once the transaction is committed, that a batch changed. */
export function announceBatch(ctx: Context, batchId: string): void {
  ctx.afterCommit(() => ctx.events.publish({ topic: `batch:${batchId}`, name: 'batch.changed', data: { batchId } }))
}
