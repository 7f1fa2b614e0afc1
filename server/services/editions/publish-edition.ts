import { mayPublish } from '#shared/policies/coordinating'
import type { EditionSummary } from '#shared/schemas/editions'
import { recordAudit } from '../../audit/record-audit'
import { withTransaction } from '../../context/context'
import type { Context, Tx } from '../../context/context'
import { editionSummary } from '../../domain/edition-summary'
import { sealSnapshot } from '../../domain/edition-snapshot'
import { canBecome } from '../../domain/fit-state'
import { AppError, changedMeanwhile, notFound, wrongState } from '../../errors/app-error'
import { findCurrentEdition, getEdition, insertEdition, nextEditionNumber, updatePublishedEdition } from '../../repositories/edition-repository'
import type { EditionRecord } from '../../repositories/edition-repository'
import { findFit, getFit, updateFitIn } from '../../repositories/fit-repository'
import type { FitRecord } from '../../repositories/fit-repository'
import { findTarget } from '../../repositories/target-repository'
import type { TargetRow } from '../../repositories/target-repository'
import { announceFit } from '../fits/announce-fit'
import { tellEditionPublished } from '../mail/tell-edition'
import { announceEdition } from './announce-edition'
import { digestOf, summaryOf } from './edition-summary-view'
import { takeSnapshot } from './take-snapshot'
import { findUnmetRules } from './find-unmet-rules'

export interface Publication {
  fitId: string
  whatChanged: string
  seenVersion: number
}

/**
 * Publishes an accepted fit as the next edition of its target; the edition in force is superseded and keeps its address. Open to
 * coordinators of the programme, once its rules are met. Records edition.published and edition.superseded and writes to followers
 * and to those whose measures took part; throws not-found, changed-meanwhile, wrong-state, rules-not-met.
 */
export async function publishEdition(ctx: Context, publication: Publication): Promise<EditionSummary> {
  return await withTransaction(ctx, async (tx) => {
    const fit = await findFit(tx, publication.fitId)
    const target = fit && await findTarget(tx, fit.target_id)
    if (!ctx.actor || !fit || !target || !mayPublish(ctx.actor, { programmeId: target.programme_id })) throw notFound()
    if (fit.version !== publication.seenVersion) throw changedMeanwhile()
    const previous = await findCurrentEdition(tx, target.id)
    await refuseUnfit(tx, fit, target, previous)

    const number = await nextEditionNumber(tx, target.id)
    const id = ctx.ids.newId()
    const publishedAt = ctx.clock.now()
    const snapshot = await takeSnapshot(tx, ctx, { fit, target, edition: { targetId: target.id, number, publishedAt, whatChanged: publication.whatChanged } })
    const { bytes, sha256 } = sealSnapshot(snapshot)

    if (previous) await supersede(tx, ctx, previous, number)
    await insertEdition(tx, {
      id,
      target_id: target.id,
      number,
      fit_id: fit.id,
      state: 'published',
      snapshot: bytes,
      sha256,
      summary: editionSummary(snapshot.result),
      what_changed: publication.whatChanged,
      published_by: ctx.actor.personId,
      published_at: publishedAt,
      withdrawn_at: null,
      withdrawn_by: null,
      withdrawal_reason: null,
    })
    if (!await updateFitIn(tx, fit.id, 'accepted', { state: 'published' })) throw changedMeanwhile()
    await recordAudit(tx, ctx, { event: 'edition.published', subjectKind: 'edition', subjectId: id, targetId: target.id, detail: { number, fitId: fit.id, sha256 } })

    const edition = await getEdition(tx, target.id, number)
    await tellEditionPublished(tx, ctx, edition, previous?.number ?? null)
    announceEdition(ctx, target.id)
    announceFit(ctx, { fitId: fit.id, targetId: target.id, state: 'published' })
    return summaryOf(edition, digestOf(snapshot))
  })
}

async function refuseUnfit(tx: Tx, fit: FitRecord, target: TargetRow, previous: EditionRecord | undefined): Promise<void> {
  if (!canBecome(fit.state, 'published')) {
    throw wrongState(`Fit ${fit.number} is ${fit.state}. Only an accepted fit can be published: rule on it first. Nothing was written.`)
  }
  if (previous && (await getFit(tx, previous.fit_id)).number > fit.number) {
    throw wrongState(`Edition ${previous.number} stands on a newer fit than fit ${fit.number}. Publish a fit that is newer still, or withdraw that edition first.`)
  }
  const unmet = await findUnmetRules(tx, fit, target)
  if (unmet.length > 0) throw new AppError('rules-not-met', unmet.join(' '))
}

async function supersede(tx: Tx, ctx: Context, previous: EditionRecord, by: number): Promise<void> {
  if (!await updatePublishedEdition(tx, previous, { state: 'superseded' })) throw changedMeanwhile()
  await recordAudit(tx, ctx, {
    event: 'edition.superseded', subjectKind: 'edition', subjectId: previous.id, targetId: previous.target_id, detail: { number: previous.number, by },
  })
}
