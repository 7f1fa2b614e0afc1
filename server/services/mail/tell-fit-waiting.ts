import type { Context, Tx } from '../../context/context'
import { queueLetter } from '../../mail/outbox/queue-letter'
import { listCoordinators } from '../../repositories/person-repository'
import { mayBeMailed } from './may-be-mailed'

export interface WaitingFitTold {
  fit: { id: string, number: number, newMeasures: number, headline: string, hasFailed: boolean, askedById: string | null }
  target: { id: string, name: string, programmeId: string, programmeName: string }
}

/** Writes to the coordinators of the programme that a fit waits for their ruling, in the caller's transaction; once a fit. Whoever asked for the fit is at the sheet already. */
export async function tellFitWaiting(tx: Tx, ctx: Context, { fit, target }: WaitingFitTold): Promise<void> {
  for (const coordinator of await listCoordinators(tx, target.programmeId)) {
    if (coordinator.id === fit.askedById || !await mayBeMailed(tx, coordinator.id, target.id)) continue
    await queueLetter(tx, ctx, { personId: coordinator.id, targetId: target.id, about: fit.id }, 'fit-waiting', {
      targetName: target.name,
      programmeName: target.programmeName,
      fitNumber: fit.number,
      newMeasures: fit.newMeasures,
      headline: fit.headline,
      hasFailed: fit.hasFailed,
      fitUrl: `${ctx.baseUrl}/targets/${target.id}?fit=${fit.id}`,
    })
  }
}
