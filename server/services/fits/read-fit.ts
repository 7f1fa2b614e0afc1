import { mayPublish } from '#shared/policies/coordinating'
import { mayReadSentWork } from '#shared/policies/reading'
import { isHinderedByOwnWork, mayRule } from '#shared/policies/ruling'
import type { FitMeasureView, FitView } from '#shared/schemas/fits'
import { mapInTurns } from '#shared/turns/turns'
import type { FitResult } from '../../../fitting/types'
import type { Context, Reads } from '../../context/context'
import { changeInSigma } from '../../domain/fit-change'
import { fitStateAfter } from '../../domain/fit-state'
import { notFound } from '../../errors/app-error'
import { listFitBatches, listFitMeasures } from '../../repositories/fit-content-repository'
import { findFit, findFitInForce } from '../../repositories/fit-repository'
import type { FitRecord } from '../../repositories/fit-repository'
import { findLatestJobByKey } from '../../repositories/job-repository'
import { listMeasuresByIds } from '../../repositories/measure-repository'
import { listRulings } from '../../repositories/ruling-repository'
import type { RulingRecord } from '../../repositories/ruling-repository'
import { getTarget } from '../../repositories/target-repository'
import type { TargetRow } from '../../repositories/target-repository'
import { findUnmetRules } from '../editions/find-unmet-rules'
import { fitForRuling } from './fit-for-ruling'
import { fitSummary, refusalOf, resultOf } from './fit-summary'
import { jobKeyOf } from './job-key'
import { fitMeasureView } from './measure-view'

/** A fit with everything its sheet shows. Open to signed-in people. */
export async function readFit(ctx: Context, fitId: string): Promise<FitView> {
  return viewFit(ctx, ctx.reads, fitId)
}

/** The same within a transaction, so that an answer shows what was just written. */
export async function viewFit(ctx: Context, reads: Reads, fitId: string): Promise<FitView> {
  const fit = await findFit(reads, fitId)
  if (!fit || !mayReadSentWork(ctx.actor)) throw notFound()
  const target = await getTarget(reads, fit.target_id)
  const result = resultOf(fit)
  const rulings = await listRulings(reads, fitId)
  const batches = await listFitBatches(reads, fitId)
  return {
    ...fitSummary(fit),
    targetId: target.id,
    targetName: target.name,
    kind: target.kind,
    cause: fit.cause,
    engineVersion: fit.engine_version,
    inputHash: fit.input_hash,
    result,
    refusal: refusalOf(fit),
    measures: await fitMeasures(reads, fitId),
    batches: batches.map(batch => ({ id: batch.id, number: batch.number, fileName: batch.file_name, state: batch.state, ownerName: batch.owner_name })),
    rulings: rulings.map(ruling => ({ decision: ruling.decision, reason: ruling.reason, personName: ruling.person_name, createdAt: ruling.created_at })),
    job: await jobOf(reads, fit),
    changeInSigma: await changeAgainstForce(reads, fit, result),
    ...await rights(ctx, reads, { fit, target, rulings }),
  }
}

async function fitMeasures(reads: Reads, fitId: string): Promise<FitMeasureView[]> {
  const parts = new Map((await listFitMeasures(reads, fitId)).map(part => [part.measure_id, part]))
  const measures = await listMeasuresByIds(reads, [...parts.keys()])
  return mapInTurns(measures, measure => fitMeasureView(measure, parts.get(measure.id)!))
}

async function jobOf(reads: Reads, fit: FitRecord): Promise<FitView['job']> {
  const job = await findLatestJobByKey(reads, jobKeyOf({ targetId: fit.target_id, inputHash: fit.input_hash, engineVersion: fit.engine_version }))
  if (!job) return null
  return { state: job.state, attempts: job.attempts, progressFraction: job.progress_fraction, progressStage: job.progress_stage, elapsedMs: job.elapsed_ms }
}

/** Δ/σ against the edition in force; null where there is none, or where this fit is the one in force. */
export async function changeAgainstForce(reads: Reads, fit: FitRecord, result: FitResult | null): Promise<FitView['changeInSigma']> {
  if (!result) return null
  const inForce = await findFitInForce(reads, fit.target_id)
  const older = inForce && inForce.id !== fit.id ? resultOf(inForce) : null
  return older ? changeInSigma(older, result) : null
}

interface JudgedFit {
  fit: FitRecord
  target: TargetRow
  rulings: readonly RulingRecord[]
}

async function rights(ctx: Context, reads: Reads, { fit, target, rulings }: JudgedFit): Promise<Pick<FitView, 'unmetRules' | 'mayRule' | 'ruleHindrance' | 'mayPublish'>> {
  const programmeId = target.programme_id
  const forRuling = await fitForRuling(reads, { fitId: fit.id, programmeId })
  const isRuled = rulings.some(ruling => ruling.decision !== 'consent')
  const awaitsRuling = !isRuled && fitStateAfter('decline', fit.state) !== null
  const unmet = fit.result === null ? [] : await findUnmetRules(reads, fit, target)
  return {
    unmetRules: unmet,
    mayRule: awaitsRuling && mayRule(ctx.actor, forRuling),
    ruleHindrance: awaitsRuling && isHinderedByOwnWork(ctx.actor, forRuling) ? OWN_WORK_SENTENCE : null,
    mayPublish: fit.state === 'accepted' && unmet.length === 0 && mayPublish(ctx.actor, { programmeId }),
  }
}

export const OWN_WORK_SENTENCE = 'New measures in this fit are your own, so another coordinator of the programme rules on it.'
