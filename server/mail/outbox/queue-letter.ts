import type { Tx } from '../../repositories/connection'
import { editionPublishedMail } from '../templates/edition-published.mail'
import { editionWithdrawnMail } from '../templates/edition-withdrawn.mail'
import { fitWaitingMail } from '../templates/fit-waiting.mail'
import type { LetterText } from '../templates/letter'
import { rulingMadeMail } from '../templates/ruling-made.mail'
import { queueMail } from './queue-mail'
import type { Sender } from './queue-mail'

/** Every letter of this house by name. */
const TEMPLATES = {
  'edition-published': editionPublishedMail,
  'edition-withdrawn': editionWithdrawnMail,
  'ruling-made': rulingMadeMail,
  'fit-waiting': fitWaitingMail,
} as const

export type TemplateName = keyof typeof TEMPLATES
export type LetterContent<Name extends TemplateName> = Parameters<(typeof TEMPLATES)[Name]>[0]

export interface Addressing {
  personId: string
  targetId: string
  /** What makes this letter one of its kind beside template and reader: the edition, the ruling or the fit it tells of. */
  about: string
}

/** Writes a letter by its template into the outbox. Every one of them can be stopped by its reader. */
export async function queueLetter<Name extends TemplateName>(tx: Tx, sender: Sender, { personId, targetId, about }: Addressing, template: Name, content: LetterContent<Name>): Promise<void> {
  const compose = TEMPLATES[template] as (content: LetterContent<Name>) => LetterText
  const { subject, bodyText } = compose(content)
  await queueMail(tx, sender, {
    personId, targetId, template, subject, bodyText, dedupeKey: `${template}:${about}:${personId}`, canUnsubscribe: true,
  })
}
