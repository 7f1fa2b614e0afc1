import { hasDesk } from '#shared/policies/coordinating'
import { thumbnailSvg } from '#shared/drawing/thumbnail-svg'
import type { DeskItem } from '#shared/schemas/fits'
import type { Context } from '../../context/context'
import { deskNotes, deskSubject } from '../../domain/desk-notes'
import { notFound } from '../../errors/app-error'
import { listNewMeasureObservers } from '../../repositories/fit-content-repository'
import { listFitsForDesk } from '../../repositories/fit-repository'
import type { FitRecord } from '../../repositories/fit-repository'
import { listTargetsByIds } from '../../repositories/target-repository'
import type { TargetRow } from '../../repositories/target-repository'
import { fitSummary, refusalOf, resultOf } from '../fits/fit-summary'
import { changeAgainstForce } from '../fits/read-fit'

/** What waits for a ruling in the programmes that the actor coordinates, the longest waiting first. Open to coordinators. */
export async function listDesk(ctx: Context): Promise<DeskItem[]> {
  if (!ctx.actor || !hasDesk(ctx.actor)) throw notFound()
  const fits = await listFitsForDesk(ctx.reads, ctx.actor.coordinatorOf)
  const targets = new Map((await listTargetsByIds(ctx.reads, fits.map(fit => fit.target_id))).map(target => [target.id, target]))
  const observers = await listNewMeasureObservers(ctx.reads, fits.map(fit => fit.id))
  return Promise.all(fits.map(fit => deskItem(ctx, fit, {
    target: targets.get(fit.target_id)!,
    observers: observers.filter(credit => credit.fit_id === fit.id).map(credit => credit.name),
  })))
}

async function deskItem(ctx: Context, fit: FitRecord, { target, observers }: { target: TargetRow; observers: string[] }): Promise<DeskItem> {
  const result = resultOf(fit)
  return {
    fit: fitSummary(fit),
    targetId: target.id,
    targetName: target.name,
    kind: target.kind,
    programme: { id: target.programme_id, name: target.programme_name },
    what: deskSubject(fit.new_measures, observers),
    notes: deskNotes({ result, refusal: refusalOf(fit), changeInSigma: await changeAgainstForce(ctx.reads, fit, result) }),
    waitingSince: fit.finished_at ?? fit.created_at,
    thumbnailSvg: result ? thumbnailSvg(result) : null,
  }
}
