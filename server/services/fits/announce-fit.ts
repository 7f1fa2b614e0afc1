import type { Context } from '../../context/context'

/** Tells the open pages, once the transaction is committed, that a fit has another state and the desk may have changed. */
export function announceFit(ctx: Context, fit: { fitId: string; targetId: string; state: string }): void {
  ctx.afterCommit(() => {
    ctx.events.publish({ topic: `fit:${fit.fitId}`, name: 'fit.changed', data: fit })
    ctx.events.publish({ topic: `target:${fit.targetId}`, name: 'fit.changed', data: fit })
    ctx.events.publish({ topic: 'desk', name: 'desk.changed', data: { fitId: fit.fitId, targetId: fit.targetId } })
  })
}
