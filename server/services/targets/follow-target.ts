import { mayReadSentWork } from '#shared/policies/reading'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import { notFound } from '../../errors/app-error'
import { deleteFollow, insertFollow } from '../../repositories/follow-repository'
import { findTarget } from '../../repositories/target-repository'

/** Has the actor hear of new editions of a target; again changes nothing. Open to signed-in people; records 'follow.started'. */
export async function followTarget(ctx: Context, targetId: string): Promise<void> {
  await withTransaction(ctx, async (tx) => {
    if (!ctx.actor || !mayReadSentWork(ctx.actor) || !await findTarget(tx, targetId)) throw notFound()
    const isNew = await insertFollow(tx, { person_id: ctx.actor.personId, target_id: targetId, created_at: ctx.clock.now() })
    if (isNew) await recordAudit(tx, ctx, { event: 'follow.started', subjectKind: 'target', subjectId: targetId, targetId, detail: {} })
  })
}

/** Ends it; where nothing was followed nothing changes. Open to signed-in people; records 'follow.stopped'. */
export async function unfollowTarget(ctx: Context, targetId: string): Promise<void> {
  await withTransaction(ctx, async (tx) => {
    if (!ctx.actor || !mayReadSentWork(ctx.actor) || !await findTarget(tx, targetId)) throw notFound()
    const isGone = await deleteFollow(tx, ctx.actor.personId, targetId)
    if (isGone) await recordAudit(tx, ctx, { event: 'follow.stopped', subjectKind: 'target', subjectId: targetId, targetId, detail: {} })
  })
}
