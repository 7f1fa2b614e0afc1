import type { FitResult } from '../../fitting/types'

/**
 * What a result says, as a heading: the conic's statement, or in words where no orbit was fitted.
 * @param result a finished fit
 * @returns such as "Ellipse, bound by construction" or "Motion so far straight"
 */
export function resultTitle({ conic, model }: Pick<FitResult, 'conic' | 'model'>): string {
  if (conic) return conic.statement
  return model === 'line' ? 'Motion so far straight' : 'No motion seen so far'
}
