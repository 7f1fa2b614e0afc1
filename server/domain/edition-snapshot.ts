import type { FitResult, Prediction } from '../../fitting/types'
import type { EditionSnapshot } from '../../shared/schemas/editions'
import type { FitMeasureView } from '../../shared/schemas/fits'
import { canonicalJson, sha256Hex } from './canonical-json'
import { citationSentence } from './citation'
import { isOnTheCurve } from './edition-predictions'

export interface EditionParts {
  edition: EditionSnapshot['edition']
  target: EditionSnapshot['target']
  url: string
  measures: FitMeasureView[]
  request: unknown
  result: FitResult
  predictions: Prediction[]
}

/** Everything needed to read, cite and repeat an edition, in one value. */
export function buildSnapshot(parts: EditionParts): EditionSnapshot {
  const observers = creditedObservers(parts.measures)
  const citation = citationSentence({
    programmeName: parts.target.programme,
    targetName: parts.target.name,
    number: parts.edition.number,
    publishedAt: parts.edition.publishedAt,
    url: parts.url,
    observers: observers.map(observer => observer.name),
  })
  return {
    format: 1,
    product: 'Semilatus',
    edition: parts.edition,
    target: parts.target,
    licence: 'CC-BY-4.0',
    citation,
    observers,
    measures: parts.measures,
    request: parts.request,
    result: parts.result,
    predictions: parts.predictions.filter(isOnTheCurve),
  }
}

/** The bytes that are kept and offered, and the hash over just these bytes. */
export function sealSnapshot(snapshot: EditionSnapshot): { bytes: string; sha256: string } {
  const bytes = canonicalJson(snapshot)
  return { bytes, sha256: sha256Hex(bytes) }
}

/** Who is credited: everyone whose measures were used, most first, then by name. What was set aside earns no credit here. */
export function creditedObservers(measures: readonly Pick<FitMeasureView, 'observer' | 'role'>[]): { name: string; measures: number }[] {
  const counts = new Map<string, number>()
  for (const { observer, role } of measures) {
    if (role === 'used') counts.set(observer, (counts.get(observer) ?? 0) + 1)
  }
  return [...counts]
    .map(([name, count]) => ({ name, measures: count }))
    .sort((a, b) => b.measures - a.measures || (a.name < b.name ? -1 : 1))
}
