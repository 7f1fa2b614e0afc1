import { letter } from './letter'
import type { LetterText } from './letter'

export interface EditionWithdrawnLetter {
  targetName: string
  programmeName: string
  number: number
  /** The coordinator's words. */
  reason: string
  editionUrl: string
}

/** To those who were told of the edition: what they may have used no longer stands. */
export function editionWithdrawnMail(edition: EditionWithdrawnLetter): LetterText {
  return letter(`${edition.targetName}: edition ${edition.number} is withdrawn`, [
    `Edition ${edition.number} of the orbit of ${edition.targetName} (programme ${edition.programmeName}) is withdrawn. Please do not use it any longer.`,
    `The coordinator's reason: ${edition.reason}`,
    `It stays to be read at its address, marked as withdrawn:\n${edition.editionUrl}`,
  ])
}
