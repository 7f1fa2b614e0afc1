import { mayRequestFit } from '#shared/policies/coordinating'
import type { FitSummary, requestFitSchema } from '#shared/schemas/fits'
import type { ValueOf } from '#shared/schemas/parse'
import { withTransaction } from '../../context/context'
import type { Context, Tx } from '../../context/context'
import { recordAudit } from '../../audit/record-audit'
import { inputInvalid, notFound, wrongState } from '../../errors/app-error'
import { listFitMeasures } from '../../repositories/fit-content-repository'
import { getFit, listFitsInStates } from '../../repositories/fit-repository'
import type { FitLine } from '../../repositories/fit-repository'
import { listStandingMeasureIds } from '../../repositories/measure-repository'
import { findTarget } from '../../repositories/target-repository'
import { SETTLED_FIT_STATES } from '../../domain/fit-state'
import { fitSummary } from './fit-summary'
import { queueFit } from './queue-fit'
import type { SetAside } from './queue-fit'

type FitWish = ValueOf<typeof requestFitSchema>

/**
 * Queues a fit of all standing measures of a target with the set-asides given. Open to coordinators of its programme; records
 * 'fit.requested' and each measure newly set aside or taken back; throws input-invalid for a measure that does not stand.
 * The same request again answers the fit that is there.
 */
export async function requestFit(ctx: Context, targetId: string, wish: FitWish): Promise<{ fit: FitSummary; isNew: boolean }> {
  return withTransaction(ctx, async (tx) => {
    const target = await findTarget(tx, targetId)
    if (!ctx.actor || !target || !mayRequestFit(ctx.actor, { programmeId: target.programme_id })) throw notFound()
    const before = await setAsidesBefore(tx, targetId, wish.baseFitId ?? null)
    const setAside = await decide(tx, ctx, { targetId, wish, before })
    const queued = await queueFit(tx, ctx, { target, cause: 'refit', requestedBy: ctx.actor.personId, baseFitId: wish.baseFitId ?? null, setAside, model: wish.model })
    if (!queued) throw wrongState('No measure of this target stands, so there is nothing to fit. Send a batch of measures first.')
    if (queued.isNew) await recordDecisions(tx, ctx, { targetId, fitId: queued.fitId, before, setAside })
    return { fit: fitSummary(await getFit(tx, queued.fitId)), isNew: queued.isNew }
  })
}

/** Set-asides of the fit that the coordinator worked from: the one named, else the last accepted. */
async function setAsidesBefore(tx: Tx, targetId: string, baseFitId: string | null): Promise<Map<string, SetAside>> {
  const base = await baseFit(tx, targetId, baseFitId)
  if (!base) return new Map()
  const rows = await listFitMeasures(tx, base.id)
  return new Map(rows.filter(row => row.role === 'set-aside').map(row => [row.measure_id, { reason: row.reason!, decidedBy: row.decided_by }]))
}

async function baseFit(tx: Tx, targetId: string, baseFitId: string | null): Promise<FitLine | null> {
  if (baseFitId === null) return (await listFitsInStates(tx, targetId, SETTLED_FIT_STATES))[0] ?? null
  const fit = await getFit(tx, baseFitId)
  if (fit.target_id !== targetId) throw inputInvalid([{ path: 'baseFitId', reason: 'is a fit of another target' }])
  return fit
}

interface Decision {
  targetId: string
  wish: FitWish
  before: ReadonlyMap<string, SetAside>
}

/** Each set-aside with its reason and who decided: whoever gave this very reason first, else the one who asks now. */
async function decide(tx: Tx, ctx: Context, { targetId, wish, before }: Decision): Promise<Map<string, SetAside>> {
  const standing = new Set(await listStandingMeasureIds(tx, targetId))
  const unknown = wish.setAside.flatMap(({ measureId }, i) => (standing.has(measureId) ? [] : [`setAside.${i}.measureId`]))
  if (unknown.length > 0) throw inputInvalid(unknown.map(path => ({ path, reason: 'is no standing measure of this target' })))
  return new Map(wish.setAside.map(({ measureId, reason }) => {
    const earlier = before.get(measureId)
    return [measureId, earlier?.reason === reason ? earlier : { reason, decidedBy: ctx.actor!.personId }]
  }))
}

interface Recorded {
  targetId: string
  fitId: string
  before: ReadonlyMap<string, SetAside>
  setAside: ReadonlyMap<string, SetAside>
}

async function recordDecisions(tx: Tx, ctx: Context, { targetId, fitId, before, setAside }: Recorded): Promise<void> {
  for (const [measureId, { reason }] of setAside) {
    if (before.get(measureId)?.reason === reason) continue
    await recordAudit(tx, ctx, { event: 'measure.set-aside', subjectKind: 'measure', subjectId: measureId, targetId, detail: { fitId, reason } })
  }
  for (const measureId of before.keys()) {
    if (setAside.has(measureId)) continue
    await recordAudit(tx, ctx, { event: 'measure.taken-back', subjectKind: 'measure', subjectId: measureId, targetId, detail: { fitId } })
  }
}
