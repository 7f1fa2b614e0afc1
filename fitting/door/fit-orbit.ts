/** The door: one request in, a result or a refusal out. */
import type { FitOutcome, FitRequest, Progress } from '../types'
import { fitPlane } from './fit-plane'
import { fitRelative } from './fit-relative'
import { progressReport } from './progress'
import { refuse, RefusedRequest } from './refusal'
import { validateList } from './validate-measures'
import { validateSettings } from './validate-settings'
import { validateStart } from './validate-start'

/**
 * Fits an orbit. Synchronous, without a clock and without random numbers beyond the seed: the same request gives the same result to
 * the last bit in every engine.
 * @param request kind, measures (radians, Julian years, arcsec), settings, start.
 * @param onProgress called with the stage and the fraction over the whole, which never falls.
 * @returns the result, or a refusal with its reason and what would help.
 * @throws only on a programmer's error.
 * Source: fitting/README.md.
 */
export function fitOrbit(request: FitRequest, onProgress?: (progress: Progress) => void): FitOutcome {
  try {
    const report = progressReport(onProgress)
    const settings = request.settings ?? {}
    if (request.kind === 'equatorial') {
      refuse('kind-not-available', 'Orbits of comets and minor planets are not fitted yet: they are coming with the next engine.', 'Keep the measures; they can be fitted then.')
    }
    if (request.kind !== 'relative' && request.kind !== 'plane') refuse('kind-not-available', 'The kind of the request is not known.', 'Give relative or plane.')
    validateList(request.measures)
    validateSettings(request.kind, settings)
    validateStart(request.kind, request.start)
    const result = request.kind === 'relative'
      ? fitRelative({ measures: request.measures, settings, start: request.start, report })
      : fitPlane({ measures: request.measures, settings, start: request.start, report })
    return { ok: true, result }
  } catch (error) {
    if (error instanceof RefusedRequest) return { ok: false, refusal: error.refusal }
    throw error
  }
}
