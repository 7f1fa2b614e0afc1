import type { Context, Tx } from '../../context/context'
import { queueLetter } from '../../mail/outbox/queue-letter'
import type { EditionRecord } from '../../repositories/edition-repository'
import { listEditionRecipients } from '../../repositories/mail-repository'

type ToldEdition = Pick<EditionRecord, 'id' | 'target_id' | 'fit_id' | 'number' | 'target_name' | 'programme_name' | 'summary' | 'what_changed'>

/** Writes to followers and to the people behind observers whose measures took part, in the transaction that publishes. */
export async function tellEditionPublished(tx: Tx, ctx: Context, edition: ToldEdition, supersedes: number | null): Promise<void> {
  for (const reader of await listEditionRecipients(tx, { targetId: edition.target_id, fitId: edition.fit_id })) {
    await queueLetter(tx, ctx, addressing(edition, reader.person_id), 'edition-published', {
      targetName: edition.target_name,
      programmeName: edition.programme_name,
      number: edition.number,
      supersedes,
      summary: edition.summary,
      whatChanged: edition.what_changed,
      ownMeasures: reader.own_measures,
      editionUrl: addressOf(ctx, edition),
    })
  }
}

/** Writes to the same people that an edition is withdrawn, in the transaction that withdraws it. */
export async function tellEditionWithdrawn(tx: Tx, ctx: Context, edition: ToldEdition, reason: string): Promise<void> {
  for (const reader of await listEditionRecipients(tx, { targetId: edition.target_id, fitId: edition.fit_id })) {
    await queueLetter(tx, ctx, addressing(edition, reader.person_id), 'edition-withdrawn', {
      targetName: edition.target_name,
      programmeName: edition.programme_name,
      number: edition.number,
      reason,
      editionUrl: addressOf(ctx, edition),
    })
  }
}

function addressing(edition: ToldEdition, personId: string) {
  return { personId, targetId: edition.target_id, about: edition.id }
}

function addressOf(ctx: Context, edition: ToldEdition): string {
  return `${ctx.baseUrl}/orbits/${edition.target_id}/${edition.number}`
}
