import type { Alternative, FitResult } from '../../fitting/types'
import { elementFamily, labelledElements } from './element-labels'
import { formatEpoch } from './angles'
import { formatUtcTime } from './date-text'
import { formatNumber } from './number-text'
import { formatElement } from './value-and-sigma'

/** A piece of a sentence; with a measure's id where it names one. */
export interface SentencePart {
  text: string
  measureId: string | null
}

interface NamedMeasure {
  id: string
  observer: string
  epochYr: number | null
  phiDeg: number | null
  timeUtc?: string | null
  sky?: object
}

const ID = /([a-z2-7]{26})/
const NAMED_ELEMENTS = 3

/** The engine names measures by id; people know them by epoch and observer. */
export function linkMeasures(sentence: string, measures: readonly NamedMeasure[]): SentencePart[] {
  const byId = new Map(measures.map(measure => [measure.id, measure]))
  return sentence.split(ID).filter(Boolean).map((text) => {
    const measure = byId.get(text)
    return measure ? { text: nameOfMeasure(measure), measureId: measure.id } : { text, measureId: null }
  })
}

/** "2011.319, Mirelle Tasque"; by the second for a body that moves, by φ where no time was given. */
export function nameOfMeasure({ observer, epochYr, phiDeg, timeUtc, sky }: NamedMeasure): string {
  if (sky && timeUtc) return `${formatUtcTime(timeUtc)}, ${observer}`
  const place = epochYr !== null ? formatEpoch(epochYr) : phiDeg !== null ? `φ ${formatNumber(phiDeg, 1)}°` : 'undated'
  return `${place}, ${observer}`
}

/** "Another orbit fits with Δχ² 2.1: P 188 ± 21 yr, e 0.48, a 1.2″". */
export function alternativeSentence({ deltaChiSquare, elements }: Alternative, result: FitResult): string {
  const named = labelledElements(elements, elementFamily(result))
    .filter(({ label }) => ['period', 'perihelionDistance', 'eccentricity', 'semiMajorAxis', 'semiLatusRectum'].includes(label.name))
    .slice(0, NAMED_ELEMENTS)
    .map(({ label, element }) => `${label.symbol} ${formatElement(element)}`)
  return `Another orbit fits with Δχ² ${formatNumber(deltaChiSquare, 1)}: ${named.join(', ')}.`
}
