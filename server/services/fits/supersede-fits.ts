import type { Context, Tx } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import { WAITING_FIT_STATES } from '../../domain/fit-state'
import { cancelJobByKey } from '../../jobs/queue/cancel-job'
import { listFitsInStates, updateFitIn } from '../../repositories/fit-repository'
import { listRulings } from '../../repositories/ruling-repository'
import { announceFit } from './announce-fit'
import { jobKeyOf } from './job-key'

/**
 * Makes every waiting fit of a target superseded, in the caller's transaction, and cancels the jobs that have not finished,
 * so that their workers can write nothing. A failed fit that was ruled on is settled and stays as it is.
 */
export async function supersedeWaitingFits(tx: Tx, ctx: Context, targetId: string, by: string | null): Promise<number> {
  let count = 0
  for (const fit of await listFitsInStates(tx, targetId, WAITING_FIT_STATES)) {
    if (fit.state === 'failed' && (await listRulings(tx, fit.id)).length > 0) continue
    await updateFitIn(tx, fit.id, fit.state, { state: 'superseded' })
    await cancelJobByKey(tx, ctx, jobKeyOf({ targetId, inputHash: fit.input_hash, engineVersion: fit.engine_version }))
    await recordAudit(tx, ctx, {
      event: 'fit.superseded', subjectKind: 'fit', subjectId: fit.id, targetId, detail: { number: fit.number, by },
    })
    announceFit(ctx, { fitId: fit.id, targetId, state: 'superseded' })
    count += 1
  }
  return count
}
