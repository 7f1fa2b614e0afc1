import { isCoordinatorOf } from '#shared/policies/coordinating'
import { mayReadSentWork } from '#shared/policies/reading'
import { mayUpload } from '#shared/policies/uploading'
import type { FitView } from '#shared/schemas/fits'
import type { TargetView } from '#shared/schemas/targets'
import type { Context, Reads } from '../../context/context'
import { notFound } from '../../errors/app-error'
import { listEditionsOfTarget } from '../../repositories/edition-repository'
import { listFitsOfTarget } from '../../repositories/fit-repository'
import type { FitLine } from '../../repositories/fit-repository'
import { isFollowing } from '../../repositories/follow-repository'
import { listStandingMeasures } from '../../repositories/measure-repository'
import { findTargetOverview, listTargetNames } from '../../repositories/target-repository'
import { editionSummaryViews } from '../editions/edition-summary-view'
import { fitSummary } from '../fits/fit-summary'
import { measureView } from '../fits/measure-view'
import { viewFit } from '../fits/read-fit'
import { targetSummary } from './target-summary'

/** The sheet of a target, with the fit asked for or else the latest that counts. Open to signed-in people. */
export async function readTarget(ctx: Context, targetId: string, fitId: string | null): Promise<TargetView> {
  return viewTarget(ctx, ctx.reads, targetId, fitId)
}

/** The same within a transaction, so that an answer shows what was just written. */
export async function viewTarget(ctx: Context, reads: Reads, targetId: string, fitId: string | null): Promise<TargetView> {
  const target = await findTargetOverview(reads, targetId)
  if (!ctx.actor || !target || !mayReadSentWork(ctx.actor)) throw notFound()
  const fits = await listFitsOfTarget(reads, targetId)
  const editions = await listEditionsOfTarget(reads, targetId)
  const measures = await listStandingMeasures(reads, targetId)
  const names = await listTargetNames(reads, targetId)
  return {
    ...targetSummary(target, fits[0] ? fitSummary(fits[0]) : null),
    aliases: names.filter(name => name !== target.name),
    componentA: target.component_a,
    componentB: target.component_b,
    radiusUnit: target.radius_unit,
    diameterScaleArcmin: target.diameter_scale_arcmin,
    remarks: target.remarks,
    isFollowed: await isFollowing(reads, ctx.actor.personId, targetId),
    mayCoordinate: isCoordinatorOf(ctx.actor, target.programme_id),
    mayUpload: mayUpload(ctx.actor),
    fits: fits.map(fitSummary),
    editions: await editionSummaryViews(reads, editions),
    fit: await shownFit(ctx, reads, fits, fitId),
    measures: measures.map(measureView),
  }
}

/**
 * The fit asked for (one of another target is none of this one's), else the newest that waits or was accepted, else the newest:
 * what was superseded or declined is looked at by asking for it.
 */
async function shownFit(ctx: Context, reads: Reads, fits: readonly FitLine[], fitId: string | null): Promise<FitView | null> {
  if (fitId !== null && !fits.some(fit => fit.id === fitId)) throw notFound()
  const shown = fitId ?? (fits.find(fit => fit.state !== 'superseded' && fit.state !== 'declined') ?? fits[0])?.id
  return shown === undefined ? null : viewFit(ctx, reads, shown)
}
