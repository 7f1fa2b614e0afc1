import type { FitOutcome, FitResult, Refusal } from '../../../fitting/types'
import type { FitSummary } from '#shared/schemas/fits'
import { resultTitle } from '#shared/units/result-title'
import type { FitLine, FitRecord } from '../../repositories/fit-repository'

const readResults = new WeakMap<object, FitResult>()

/** The result of a fit, read from its text once for each record: of ten thousand measures it holds megabytes. */
export function resultOf(fit: Pick<FitRecord, 'result'>): FitResult | null {
  if (fit.result === null) return null
  const result = readResults.get(fit) ?? (JSON.parse(fit.result) as FitResult)
  readResults.set(fit, result)
  return result
}

export function refusalOf(fit: Pick<FitRecord, 'refusal'>): Refusal | null {
  return fit.refusal === null ? null : (JSON.parse(fit.refusal) as Refusal)
}

/** What the engine answered; null where it has not yet. */
export function outcomeOf(fit: Pick<FitRecord, 'result' | 'refusal'>): FitOutcome | null {
  const result = resultOf(fit)
  if (result) return { ok: true, result }
  const refusal = refusalOf(fit)
  return refusal ? { ok: false, refusal } : null
}

/** What a fit says in one line: what its conic is, that there is none so far, or why it could not be made. */
export function headlineOf(result: FitResult | null, refusal: Refusal | null): string | null {
  if (result) return resultTitle(result)
  return refusal?.sentence ?? null
}

export function fitSummary(fit: FitLine): FitSummary {
  return {
    id: fit.id,
    number: fit.number,
    state: fit.state,
    version: fit.version,
    createdAt: fit.created_at,
    finishedAt: fit.finished_at,
    requestedBy: fit.requested_by_name,
    newMeasures: fit.new_measures,
    headline: fit.headline,
  }
}
