import type { Decision } from '#shared/schemas/fits'
import type { Context, Tx } from '../../context/context'
import { queueLetter } from '../../mail/outbox/queue-letter'
import { mayBeMailed } from './may-be-mailed'

export interface RulingTold {
  rulingId: string
  decision: Decision
  reason: string
  target: { id: string, name: string }
  /** The batches whose parts the ruling settled. */
  batches: readonly { id: string, number: number, fileName: string, ownerId: string }[]
}

/** Writes to the owner of each batch that a ruling settled, in the caller's transaction; not to the coordinator who ruled. */
export async function tellRuling(tx: Tx, ctx: Context, { rulingId, decision, reason, target, batches }: RulingTold): Promise<void> {
  for (const batch of batches) {
    if (batch.ownerId === ctx.actor?.personId || !await mayBeMailed(tx, batch.ownerId, target.id)) continue
    const addressing = { personId: batch.ownerId, targetId: target.id, about: `${rulingId}:${batch.id}` }
    await queueLetter(tx, ctx, addressing, 'ruling-made', {
      targetName: target.name,
      batchNumber: batch.number,
      fileName: batch.fileName,
      decision,
      reason,
      batchUrl: `${ctx.baseUrl}/uploads/${batch.id}`,
    })
  }
}
