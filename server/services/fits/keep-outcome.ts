import type { FitOutcome } from '../../../fitting/types'
import { withTransaction } from '../../context/context'
import type { Context, Tx } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import type { Lease } from '../../jobs/contracts/lease'
import { getFit, updateFitIn } from '../../repositories/fit-repository'
import type { FitRecord } from '../../repositories/fit-repository'
import { getTarget } from '../../repositories/target-repository'
import { tellFitWaiting } from '../mail/tell-fit-waiting'
import { announceFit } from './announce-fit'
import { headlineOf } from './fit-summary'

/** Keeps what the engine answered, once: fit, audit row and letters in one transaction, and only while the lease is held. */
export async function keepOutcome(ctx: Context, { fitId, lease, outcome }: { fitId: string; lease: Lease; outcome: FitOutcome }): Promise<void> {
  await withTransaction(ctx, async (tx) => {
    await lease.assertHeld(tx)
    const fit = await getFit(tx, fitId)
    if (fit.state !== 'running') return // superseded meanwhile, or kept already
    await settleComputed(tx, ctx, fit, outcome)
  })
}

/** Writes an outcome onto a fit that has none, in the caller's transaction. */
export async function settleComputed(tx: Tx, ctx: Context, fit: FitRecord, outcome: FitOutcome): Promise<void> {
  const finished_at = ctx.clock.now()
  const headline = outcome.ok ? headlineOf(outcome.result, null) : headlineOf(null, outcome.refusal)
  const subject = { subjectKind: 'fit', subjectId: fit.id, targetId: fit.target_id } as const
  if (outcome.ok) {
    await updateFitIn(tx, fit.id, fit.state, { state: 'done', result: JSON.stringify(outcome.result), headline, finished_at })
    await recordAudit(tx, ctx, {
      ...subject, event: 'fit.done', detail: { number: fit.number, inputHash: fit.input_hash, engineVersion: fit.engine_version },
    })
  }
  else {
    await updateFitIn(tx, fit.id, fit.state, { state: 'failed', refusal: JSON.stringify(outcome.refusal), headline, finished_at })
    await recordAudit(tx, ctx, { ...subject, event: 'fit.failed', detail: { number: fit.number, refusal: outcome.refusal.code } })
  }
  await tellWaiting(tx, ctx, fit, { headline: headline ?? '', hasFailed: !outcome.ok })
  announceFit(ctx, { fitId: fit.id, targetId: fit.target_id, state: outcome.ok ? 'done' : 'failed' })
}

async function tellWaiting(tx: Tx, ctx: Context, fit: FitRecord, outcome: { headline: string; hasFailed: boolean }): Promise<void> {
  const target = await getTarget(tx, fit.target_id)
  await tellFitWaiting(tx, ctx, {
    fit: { id: fit.id, number: fit.number, newMeasures: fit.new_measures, askedById: fit.requested_by, ...outcome },
    target: { id: target.id, name: target.name, programmeId: target.programme_id, programmeName: target.programme_name },
  })
}
