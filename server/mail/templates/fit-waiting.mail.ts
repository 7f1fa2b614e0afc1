import { letter } from './letter'
import type { LetterText } from './letter'

export interface FitWaitingLetter {
  targetName: string
  programmeName: string
  fitNumber: number
  newMeasures: number
  /** The conic's statement, or the reason why no fit could be made. */
  headline: string
  hasFailed: boolean
  fitUrl: string
}

/** To the coordinators of a programme when a fit waits for their ruling. */
export function fitWaitingMail(fit: FitWaitingLetter): LetterText {
  const measures = fit.newMeasures === 0 ? 'no new measure' : fit.newMeasures === 1 ? 'one new measure' : `${fit.newMeasures} new measures`
  const opening = fit.hasFailed
    ? `Fit ${fit.fitNumber} of ${fit.targetName} (programme ${fit.programmeName}), with ${measures}, could not be made and waits for a decision.`
    : `Fit ${fit.fitNumber} of ${fit.targetName} (programme ${fit.programmeName}), with ${measures}, waits for a ruling.`
  return letter(`${fit.targetName}: fit ${fit.fitNumber} waits on the desk`, [
    opening,
    fit.headline,
    `${fit.hasFailed ? 'See what is missing, and return or keep its measures' : 'Judge its residuals and rule'}:\n${fit.fitUrl}`,
  ])
}
