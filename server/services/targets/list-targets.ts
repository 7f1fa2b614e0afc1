import type { Page } from '#shared/schemas/ids'
import { nameKey } from '#shared/intake/name-key'
import { mayReadSentWork } from '#shared/policies/reading'
import type { TargetSummary } from '#shared/schemas/targets'
import type { Kind } from '../../../fitting/types'
import type { Context } from '../../context/context'
import { signInRequired } from '../../errors/app-error'
import { decodeCursor, DEFAULT_LIMIT, pageOf } from '../../repositories/cursor'
import type { PageQuery } from '../../repositories/cursor'
import { listLatestFits } from '../../repositories/fit-repository'
import { listTargetOverviews } from '../../repositories/target-repository'
import { fitSummary } from '../fits/fit-summary'
import { targetSummary } from './target-summary'

export interface TargetListing extends PageQuery {
  programmeId?: string | undefined
  kind?: Kind | undefined
  /** Part of any of a target's names. */
  q?: string | undefined
  /** '1': only those that the person asking follows. */
  followed?: '1' | undefined
}

/** Targets by name, with what is known of their measures, their latest fit and the edition in force. Open to signed-in people. */
export async function listTargets(ctx: Context, { programmeId, kind, q, followed, cursor, limit = DEFAULT_LIMIT }: TargetListing): Promise<Page<TargetSummary>> {
  if (!ctx.actor || !mayReadSentWork(ctx.actor)) throw signInRequired()
  const after = cursor === undefined ? null : decodeCursor(cursor, ['string', 'string'])
  const targets = await listTargetOverviews(ctx.reads, {
    ...(programmeId ? { programmeId } : {}),
    ...(kind ? { kind } : {}),
    ...(q ? { nameKeyPart: nameKey(q) } : {}),
    ...(followed ? { followedBy: ctx.actor.personId } : {}),
    ...(after ? { after: { name: after[0], id: after[1] } } : {}),
    limit: limit + 1,
  })
  const latest = new Map((await listLatestFits(ctx.reads, targets.map(target => target.id))).map(fit => [fit.target_id, fit]))
  return pageOf(targets, limit, {
    keyOf: target => [target.name, target.id],
    itemOf: (target) => {
      const fit = latest.get(target.id)
      return targetSummary(target, fit ? fitSummary(fit) : null)
    },
  })
}
