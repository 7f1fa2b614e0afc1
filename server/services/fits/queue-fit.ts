import type { FitSettings } from '../../../fitting/types'
import type { FitView } from '#shared/schemas/fits'
import { mapInTurns, mapLazily } from '#shared/turns/turns'
import { ENGINE_VERSION } from '../../../fitting'
import type { Context, Tx } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import { sha256Hex } from '../../domain/canonical-json'
import { FIT_SEED, fitRequestText, fitRole } from '../../domain/fit-request'
import type { StandingMeasure } from '../../domain/fit-request'
import { SETTLED_FIT_STATES } from '../../domain/fit-state'
import { enqueueJob } from '../../jobs/queue/enqueue-job'
import { listSentPartsOfTarget } from '../../repositories/batch-part-repository'
import { insertFitMeasures, insertFitParts, listAcceptedMeasureIds, listFitMeasures } from '../../repositories/fit-content-repository'
import { getFit, insertFit, listFitsInStates, listFitsOfInput, nextFitNumber } from '../../repositories/fit-repository'
import { parsedRowOf } from '../../repositories/measure-columns'
import { listStandingMeasures } from '../../repositories/measure-repository'
import type { MeasureRecord } from '../../repositories/measure-repository'
import type { TargetRow } from '../../repositories/target-repository'
import { announceFit } from './announce-fit'
import { outcomeOf, refusalOf } from './fit-summary'
import { jobKeyOf } from './job-key'
import { settleComputed } from './keep-outcome'
import { supersedeWaitingFits } from './supersede-fits'

export interface SetAside {
  reason: string
  decidedBy: string | null
}

export interface FitOrder {
  target: TargetRow
  cause: FitView['cause']
  requestedBy: string | null
  /** The fit that the one who asks worked from; the last accepted where not given. */
  baseFitId?: string | null
  /** What is left out, by measure; the set-asides of the last accepted fit where not given. */
  setAside?: ReadonlyMap<string, SetAside>
  model?: FitSettings['model']
}

export interface QueuedFit {
  fitId: string
  /** False where a fit from the very same request stands already. */
  isNew: boolean
}

/**
 * Makes one fit of all standing measures of a target, in the caller's transaction; null where no measure stands.
 *
 * The fit takes in every part that was sent and waits, so it contains whatever an older waiting fit of the target contains.
 * The older one is therefore superseded here and now rather than ruled upon: two waiting fits would ask the coordinator the
 * same question twice, and a target whose first batches are too few alone could never be fitted at all. Its batches go over
 * to the new fit, so that one ruling settles them together.
 */
export async function queueFit(tx: Tx, ctx: Context, order: FitOrder): Promise<QueuedFit | null> {
  const measures = await mapInTurns(await listStandingMeasures(tx, order.target.id), standingMeasure)
  if (measures.length === 0) return null
  const accepted = (await listFitsInStates(tx, order.target.id, SETTLED_FIT_STATES))[0] ?? null
  const setAside = order.setAside ?? (accepted ? await setAsidesOf(tx, accepted.id) : new Map<string, SetAside>())
  const request = await fitRequestText(order.target, measures, { setAside: new Set(setAside.keys()), model: order.model })
  const input = { targetId: order.target.id, inputHash: sha256Hex(request), engineVersion: ENGINE_VERSION }

  // A fit that only failed because the program broke down says nothing about its request, which may be tried again.
  const twins = (await listFitsOfInput(tx, input)).filter(twin => refusalOf(twin)?.code !== 'worker-failed')
  const standing = twins.find(twin => twin.state !== 'superseded' && twin.state !== 'declined')
  if (standing) return { fitId: standing.id, isNew: false }

  const fitId = ctx.ids.newId()
  await supersedeWaitingFits(tx, ctx, order.target.id, fitId)
  await keepFit(tx, ctx, order, { fitId, request, input, baseFitId: order.baseFitId ?? accepted?.id ?? null })
  await linkContent(tx, { fitId, targetId: order.target.id, measures, setAside })
  announceFit(ctx, { fitId, targetId: order.target.id, state: 'queued' })
  // The same request gives the same bytes, so what was computed once is taken over instead of being computed again.
  const computed = twins.map(outcomeOf).find(outcome => outcome !== null)
  if (computed) await settleComputed(tx, ctx, await getFit(tx, fitId), computed)
  else await enqueueJob(tx, ctx, { name: 'run-fit', payload: { fitId }, uniqueKey: jobKeyOf(input) })
  return { fitId, isNew: true }
}

interface NewFit {
  fitId: string
  request: string
  input: { targetId: string; inputHash: string; engineVersion: string }
  baseFitId: string | null
}

async function keepFit(tx: Tx, ctx: Context, order: FitOrder, { fitId, request, input, baseFitId }: NewFit): Promise<void> {
  const number = await nextFitNumber(tx, input.targetId)
  await insertFit(tx, {
    id: fitId,
    target_id: input.targetId,
    number,
    state: 'queued',
    requested_by: order.requestedBy,
    cause: order.cause,
    request,
    input_hash: input.inputHash,
    engine_version: input.engineVersion,
    seed: FIT_SEED,
    base_fit_id: baseFitId,
    result: null,
    refusal: null,
    created_at: ctx.clock.now(),
    finished_at: null,
  })
  await recordAudit(tx, ctx, {
    event: 'fit.requested',
    subjectKind: 'fit',
    subjectId: fitId,
    targetId: input.targetId,
    detail: { number, cause: order.cause, inputHash: input.inputHash, engineVersion: input.engineVersion },
  })
}

async function setAsidesOf(tx: Tx, fitId: string): Promise<Map<string, SetAside>> {
  const rows = await listFitMeasures(tx, fitId)
  return new Map(rows
    .filter(row => row.role === 'set-aside')
    .map(row => [row.measure_id, { reason: row.reason!, decidedBy: row.decided_by }]))
}

interface FitContent {
  fitId: string
  targetId: string
  measures: readonly StandingMeasure[]
  setAside: ReadonlyMap<string, SetAside>
}

async function linkContent(tx: Tx, { fitId, targetId, measures, setAside }: FitContent): Promise<void> {
  const accepted = await listAcceptedMeasureIds(tx, targetId)
  await insertFitMeasures(tx, mapLazily(measures, (measure) => {
    const decision = setAside.get(measure.id)
    return {
      fit_id: fitId,
      measure_id: measure.id,
      role: fitRole(measure.row, decision !== undefined),
      reason: decision?.reason ?? null,
      decided_by: decision?.decidedBy ?? null,
      is_new: accepted.has(measure.id) ? 0 : 1,
    }
  }))
  const parts = await listSentPartsOfTarget(tx, targetId)
  await insertFitParts(tx, fitId, parts.map(part => part.id))
}

function standingMeasure(measure: MeasureRecord): StandingMeasure {
  return { id: measure.id, observer: measure.observer_name, row: parsedRowOf(measure) }
}
