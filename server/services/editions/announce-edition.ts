import type { Context } from '../../context/context'

/** Tells the open pages, once the transaction is committed, that the editions of a target changed. */
export function announceEdition(ctx: Context, targetId: string): void {
  ctx.afterCommit(() => ctx.events.publish({ topic: `target:${targetId}`, name: 'edition.changed', data: { targetId } }))
}
