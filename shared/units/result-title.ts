import type { FitResult } from '../../fitting/types'

type Told = Pick<FitResult, 'conic' | 'model' | 'kind'>

/**
 * What a result says, as a heading: the conic's statement, or in words where no orbit was fitted. Of an orbit about the Sun the
 * statement is long: its heading is the class alone, or that it is not settled yet.
 * @param result a finished fit
 * @returns such as "Ellipse, bound by construction", "Near a parabola, not settled yet" or "Motion so far straight"
 */
export function resultTitle({ conic, model, kind }: Told): string {
  if (!conic) return model === 'line' ? 'Motion so far straight' : 'No motion seen so far'
  if (kind !== 'equatorial') return conic.statement
  if (conic.parabolaExcluded === false && conic.class !== 'parabola') return 'Near a parabola, not settled yet'
  return conic.statement.split(/[:;,]/)[0]!
}

/**
 * The rest of the statement, where the heading does not say all of it.
 * @param result a finished fit
 * @returns the whole statement of an orbit about the Sun; null where the heading says it
 */
export function resultDetail(result: Told): string | null {
  const statement = result.conic?.statement ?? null
  return statement === null || statement === resultTitle(result) ? null : statement
}
