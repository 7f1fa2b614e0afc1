import { mayWithdrawEdition } from '#shared/policies/coordinating'
import type { EditionView } from '#shared/schemas/editions'
import { recordAudit } from '../../audit/record-audit'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { canBecome } from '../../domain/edition-state'
import { changedMeanwhile, notFound, wrongState } from '../../errors/app-error'
import { getEdition, updatePublishedEdition } from '../../repositories/edition-repository'
import { tellEditionWithdrawn } from '../mail/tell-edition'
import { announceEdition } from './announce-edition'
import { readEdition } from './read-edition'

export interface Withdrawal {
  targetId: string
  number: number
  reason: string
  seenVersion: number
}

/**
 * Takes an edition back. It keeps its address and its bytes, marked with the reason, and leaves the list of orbits. Open to
 * coordinators of its programme; records edition.withdrawn and writes to those who were told of the edition; throws not-found,
 * changed-meanwhile, wrong-state.
 */
export async function withdrawEdition(ctx: Context, { targetId, number, reason, seenVersion }: Withdrawal): Promise<EditionView> {
  await withTransaction(ctx, async (tx) => {
    const edition = await getEdition(tx, targetId, number)
    if (!ctx.actor || !mayWithdrawEdition(ctx.actor, { programmeId: edition.programme_id })) throw notFound()
    if (edition.version !== seenVersion) throw changedMeanwhile()
    if (!canBecome(edition.state, 'withdrawn')) throw wrongState(`Edition ${number} is ${edition.state} already, so it cannot be withdrawn. Nothing was written.`)
    const isWithdrawn = await updatePublishedEdition(tx, edition, {
      state: 'withdrawn', withdrawn_at: ctx.clock.now(), withdrawn_by: ctx.actor.personId, withdrawal_reason: reason,
    })
    if (!isWithdrawn) throw changedMeanwhile()
    await recordAudit(tx, ctx, { event: 'edition.withdrawn', subjectKind: 'edition', subjectId: edition.id, targetId, detail: { number, reason } })
    await tellEditionWithdrawn(tx, ctx, edition, reason)
    announceEdition(ctx, targetId)
  })
  return await readEdition(ctx, targetId, number)
}
