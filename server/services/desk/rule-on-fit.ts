import { isHinderedByOwnWork, mayRule } from '#shared/policies/ruling'
import type { Decision, FitView } from '#shared/schemas/fits'
import { withTransaction } from '../../context/context'
import type { Context, Tx } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import { fitStateAfter } from '../../domain/fit-state'
import { AppError, changedMeanwhile, notFound, wrongState } from '../../errors/app-error'
import { findFit, updateFitIn } from '../../repositories/fit-repository'
import type { FitRecord } from '../../repositories/fit-repository'
import { insertRuling, listRulings } from '../../repositories/ruling-repository'
import { findTarget } from '../../repositories/target-repository'
import type { TargetRow } from '../../repositories/target-repository'
import { announceFit } from '../fits/announce-fit'
import { fitForRuling } from '../fits/fit-for-ruling'
import { OWN_WORK_SENTENCE, viewFit } from '../fits/read-fit'
import { requeueWaiting } from '../fits/requeue-waiting'
import { tellRuling } from '../mail/tell-ruling'
import { settleParts } from './settle-parts'

export interface Ruling {
  fitId: string
  decision: Decision
  reason: string
  /** Version of the fit that the coordinator saw. */
  seenVersion: number
}

/**
 * Rules on a fit and, in the same transaction, on the parts of batches it brought in; other waiting fits of the target are
 * superseded and fitted anew. Open to coordinators of the programme but for own work while another can rule. Records
 * 'fit.accepted', 'fit.returned' or 'fit.declined' and the same of each batch; throws changed-meanwhile, own-work or wrong-state.
 */
export async function ruleOnFit(ctx: Context, ruling: Ruling): Promise<FitView> {
  return withTransaction(ctx, async (tx) => {
    const fit = await findFit(tx, ruling.fitId)
    const target = fit ? await findTarget(tx, fit.target_id) : undefined
    if (!fit || !target) throw notFound()
    await refuseOthers(tx, ctx, fit, target)
    if (fit.version !== ruling.seenVersion) throw changedMeanwhile()
    const next = await stateAfter(tx, fit, ruling.decision)

    await updateFitIn(tx, fit.id, fit.state, { state: next })
    const rulingId = ctx.ids.newId()
    await insertRuling(tx, {
      id: rulingId, fit_id: fit.id, decision: ruling.decision, reason: ruling.reason,
      person_id: ctx.actor!.personId, created_at: ctx.clock.now(),
    })
    await recordFitRuling(tx, ctx, fit, ruling)
    const batches = await settleParts(tx, ctx, { fit, decision: ruling.decision, reason: ruling.reason })
    await tellRuling(tx, ctx, { rulingId, decision: ruling.decision, reason: ruling.reason, target, batches })
    await requeueWaiting(tx, ctx, target.id)
    announceFit(ctx, { fitId: fit.id, targetId: target.id, state: next })
    return viewFit(ctx, tx, fit.id)
  })
}

async function refuseOthers(tx: Tx, ctx: Context, fit: FitRecord, target: TargetRow): Promise<void> {
  const forRuling = await fitForRuling(tx, { fitId: fit.id, programmeId: target.programme_id })
  if (mayRule(ctx.actor, forRuling)) return
  if (isHinderedByOwnWork(ctx.actor, forRuling)) throw new AppError('own-work', `${OWN_WORK_SENTENCE} Ask one of them.`)
  throw notFound()
}

async function stateAfter(tx: Tx, fit: FitRecord, decision: Decision): Promise<NonNullable<ReturnType<typeof fitStateAfter>>> {
  const isRuled = (await listRulings(tx, fit.id)).some(ruling => ruling.decision !== 'consent')
  const next = isRuled ? null : fitStateAfter(decision, fit.state)
  if (next) return next
  if (fit.state === 'failed' && !isRuled) {
    throw wrongState('This fit has no result to accept. Return or decline its measures, or let it wait: a new fit that includes them is made as soon as more are sent.')
  }
  throw wrongState(`Fit ${fit.number} is ${isRuled && fit.state === 'failed' ? 'ruled on' : fit.state}; only a finished fit that waits can be ruled on. Load the page again.`)
}

async function recordFitRuling(tx: Tx, ctx: Context, fit: FitRecord, { decision, reason }: Ruling): Promise<void> {
  await recordAudit(tx, ctx, {
    event: decision === 'accept' ? 'fit.accepted' : decision === 'return' ? 'fit.returned' : 'fit.declined',
    subjectKind: 'fit',
    subjectId: fit.id,
    targetId: fit.target_id,
    detail: { number: fit.number, decision, reason },
  })
}
