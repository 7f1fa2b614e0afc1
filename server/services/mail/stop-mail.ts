import { recordAudit } from '../../audit/record-audit'
import { actingAs, withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { unsubscribeHash } from '../../mail/outbox/queue-mail'
import { endFollows, getLetterByUnsubscribeHash, insertMailStop, stopQueuedLetters } from '../../repositories/mail-repository'
import { findPerson } from '../../repositories/person-repository'
import { actorOf } from '../people/actor-of-session'

/**
 * Ends mail to the reader of a letter, about its target or altogether. Whoever holds the link of the letter may call it, signed in
 * or not, and again without harm; what waits in the outbox and what is followed ends with it, and following anew asks for mail
 * again. Records mail.stopped. Throws not-found for a link that no letter carries.
 */
export async function stopMail(ctx: Context, token: string, scope: 'target' | 'all'): Promise<void> {
  await withTransaction(ctx, async (tx) => {
    const letter = await getLetterByUnsubscribeHash(tx, unsubscribeHash(token))
    // A letter about no target can only be stopped with all the others.
    const targetId = scope === 'target' ? letter.target_id : null
    const isNew = await insertMailStop(tx, { id: ctx.ids.newId(), person_id: letter.person_id, target_id: targetId, created_at: ctx.clock.now() })
    await endFollows(tx, letter.person_id, targetId)
    await stopQueuedLetters(tx, letter.person_id, targetId)
    if (!isNew) return
    const reader = await findPerson(tx, letter.person_id)
    await recordAudit(tx, actingAs(ctx, reader ? actorOf(reader) : null), {
      event: 'mail.stopped', subjectKind: 'person', subjectId: letter.person_id, targetId, detail: { scope: targetId === null ? 'all' : 'target' },
    })
  })
}
