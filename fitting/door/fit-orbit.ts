/** The door: one request in, a result or a refusal out. */
import { KINDS, type FitOutcome, type FitRequest, type FitResult, type FitSettings, type Progress } from '../types'
import { fitEquatorial } from './fit-equatorial'
import { fitPlane } from './fit-plane'
import { fitRelative } from './fit-relative'
import { progressReport, type Report } from './progress'
import { refuse, RefusedRequest } from './refusal'
import { validateList } from './validate-measures'
import { validateSettings } from './validate-settings'
import { validateStart } from './validate-start'

function fitByKind(request: FitRequest, settings: FitSettings, report: Report): FitResult {
  const { start } = request
  if (request.kind === 'relative') return fitRelative({ measures: request.measures, settings, start, report })
  if (request.kind === 'equatorial') return fitEquatorial({ measures: request.measures, settings, start, report })
  return fitPlane({ measures: request.measures, settings, start, report })
}

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
    if (!KINDS.includes(request.kind)) refuse('kind-not-available', 'The kind of the request is not known.', 'Give relative, equatorial or plane.')
    validateList(request.measures)
    validateSettings(request.kind, settings)
    validateStart(request.kind, request.start)
    return { ok: true, result: fitByKind(request, settings, report) }
  } catch (error) {
    if (error instanceof RefusedRequest) return { ok: false, refusal: error.refusal }
    throw error
  }
}
