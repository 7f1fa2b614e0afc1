import type { MailStopView } from '#shared/schemas/mail'
import type { Context } from '../../context/context'
import { unsubscribeHash } from '../../mail/outbox/queue-mail'
import { followsAnything, getLetterByUnsubscribeHash, isSilenced } from '../../repositories/mail-repository'

/**
 * What the link of a letter can stop, and what is stopped already. Whoever holds the link may call it; it names no person.
 * Throws not-found for a link that no letter carries.
 */
export async function readMailStop(ctx: Context, token: string): Promise<MailStopView> {
  const letter = await getLetterByUnsubscribeHash(ctx.reads, unsubscribeHash(token))
  const isAllStopped = await isSilenced(ctx.reads, letter.person_id, null) && !await followsAnything(ctx.reads, letter.person_id)
  const isTargetStopped = isAllStopped || (letter.target_id !== null && await isSilenced(ctx.reads, letter.person_id, letter.target_id))
  return { targetName: letter.target_name, isTargetStopped, isAllStopped, sentence: sentenceFor(letter.target_name, isTargetStopped, isAllStopped) }
}

function sentenceFor(targetName: string | null, isTargetStopped: boolean, isAllStopped: boolean): string {
  if (isAllStopped) return 'No more mail of this installation goes to the address that this link was sent to.'
  if (targetName === null) return 'This link can stop all mail of this installation to the address it was sent to.'
  if (isTargetStopped) return `Mail about ${targetName} no longer goes to the address that this link was sent to.`
  return `This link can stop mail about ${targetName}, or all mail of this installation, to the address it was sent to.`
}
