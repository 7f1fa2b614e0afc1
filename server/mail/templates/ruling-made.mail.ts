import type { Decision } from '#shared/schemas/fits'
import { letter } from './letter'
import type { LetterText } from './letter'

export interface RulingMadeLetter {
  targetName: string
  batchNumber: number
  fileName: string
  decision: Decision
  /** The coordinator's words. */
  reason: string
  batchUrl: string
}

const OUTCOMES: Record<Decision, { heading: string, sentence: string, next: string }> = {
  accept: {
    heading: 'accepted',
    sentence: 'are accepted.',
    next: 'They stand in the fit from which the next edition is published.',
  },
  return: {
    heading: 'returned to you',
    sentence: 'are returned to you.',
    next: 'They are a draft again: mend what the reason names and send them once more.',
  },
  decline: {
    heading: 'declined',
    sentence: 'are declined.',
    next: 'They are kept with this reason, but no fit uses them.',
  },
}

/** To the owner of a batch whose part for a target was ruled on. */
export function rulingMadeMail(ruling: RulingMadeLetter): LetterText {
  const outcome = OUTCOMES[ruling.decision]
  return letter(`${ruling.targetName}: batch ${ruling.batchNumber} was ${outcome.heading}`, [
    `Your measures of ${ruling.targetName} in batch ${ruling.batchNumber} (${ruling.fileName}) ${outcome.sentence}`,
    `The coordinator's reason: ${ruling.reason}`,
    outcome.next,
    `The batch, row by row:\n${ruling.batchUrl}`,
  ])
}
