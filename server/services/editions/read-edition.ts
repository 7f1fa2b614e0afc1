import { mayWithdrawEdition } from '#shared/policies/coordinating'
import type { EditionSnapshot, EditionView } from '#shared/schemas/editions'
import type { Context } from '../../context/context'
import { canBecome } from '../../domain/edition-state'
import { getEdition, getSnapshotText, listEditionsOfTarget } from '../../repositories/edition-repository'
import type { EditionRecord } from '../../repositories/edition-repository'
import { digestOf, summaryOf } from './edition-summary-view'

/** One edition with its whole snapshot, whatever became of it since. Open to everybody; throws not-found. */
export async function readEdition(ctx: Context, targetId: string, number: number): Promise<EditionView> {
  const edition = await getEdition(ctx.reads, targetId, number)
  const snapshot = JSON.parse(await getSnapshotText(ctx.reads, edition.id)) as EditionSnapshot
  const all = await listEditionsOfTarget(ctx.reads, targetId)
  return {
    ...summaryOf(edition, digestOf(snapshot)),
    version: edition.version,
    snapshot,
    whatChanged: edition.what_changed,
    conic: snapshot.result.conic,
    elements: snapshot.result.elements,
    publishedBy: edition.publisher_name,
    withdrawal: withdrawalOf(edition),
    supersededBy: edition.state === 'superseded' ? nextAfter(all, number) : null,
    editions: all.map(({ number, state, published_at }) => ({ number, state, publishedAt: published_at })),
    mayWithdraw: canBecome(edition.state, 'withdrawn') && mayWithdrawEdition(ctx.actor, { programmeId: edition.programme_id }),
  }
}

function withdrawalOf({ withdrawn_at, withdrawal_reason }: EditionRecord): EditionView['withdrawal'] {
  return withdrawn_at === null || withdrawal_reason === null ? null : { at: withdrawn_at, reason: withdrawal_reason }
}

/** An edition is superseded by the very next one. */
function nextAfter(all: readonly EditionRecord[], number: number): number | null {
  return all.findLast(edition => edition.number > number)?.number ?? null
}
