import { joinWords } from '../../shared/units/list-text'

const NAMES_IN_SENTENCE = 8

export interface CitedEdition {
  programmeName: string
  targetName: string
  number: number
  publishedAt: string
  /** The permanent address. */
  url: string
  /** Credited observers in the order in which they are named. */
  observers: readonly string[]
}

/** The sentence by which an edition is cited. */
export function citationSentence(edition: CitedEdition): string {
  const year = edition.publishedAt.slice(0, 4)
  return `${edition.programmeName} (${year}): Orbit of ${edition.targetName}, edition ${edition.number}. `
    + `Measures by ${creditedNames(edition.observers)}. ${edition.url} (CC BY 4.0)`
}

/** A long list ends in the number of those left; the edition itself names everybody. */
function creditedNames(names: readonly string[]): string {
  if (names.length === 0) return 'observers who are not named'
  if (names.length <= NAMES_IN_SENTENCE) return joinWords(names)
  return `${names.slice(0, NAMES_IN_SENTENCE).join(', ')} and ${names.length - NAMES_IN_SENTENCE} others`
}
