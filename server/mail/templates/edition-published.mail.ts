import { letter } from './letter'
import type { LetterText } from './letter'

export interface EditionPublishedLetter {
  targetName: string
  programmeName: string
  number: number
  /** The edition that this one takes the place of; null for the first. */
  supersedes: number | null
  /** One line of what the edition says. */
  summary: string
  /** The coordinator's words; empty where none were given. */
  whatChanged: string
  /** Measures of the reader that were used; 0 for those who only follow. */
  ownMeasures: number
  editionUrl: string
}

/** To followers, and to the people behind observers whose measures took part. */
export function editionPublishedMail(edition: EditionPublishedLetter): LetterText {
  const place = edition.supersedes === null
    ? `Edition ${edition.number} of the orbit of ${edition.targetName} is published (programme ${edition.programmeName}).`
    : `Edition ${edition.number} of the orbit of ${edition.targetName} is published (programme ${edition.programmeName}). It supersedes edition ${edition.supersedes}, which keeps its address.`
  return letter(`${edition.targetName}: edition ${edition.number} is published`, [
    place,
    edition.summary,
    edition.whatChanged === '' ? '' : `What changed: ${edition.whatChanged}`,
    ownShare(edition.ownMeasures),
    `Read, cite and download it:\n${edition.editionUrl}`,
  ])
}

function ownShare(count: number): string {
  if (count === 0) return ''
  return count === 1 ? 'One of the measures in it is yours. Thank you.' : `${count} of the measures in it are yours. Thank you.`
}
