import type { FitRequest, FitSettings } from '../../fitting/types'
import type { ParsedRow } from '../../shared/intake/parsed-row'
import { fitRequestOf, toFitMeasure, type FitMeasure } from '../../shared/intake/to-fit-measure'
import { mapInTurns } from '../../shared/turns/turns'
import { canonicalJson } from './canonical-json'

/** One seed for every fit of record, kept in its request: the same request repeated gives the same bytes. */
export const FIT_SEED = 1

export interface StandingMeasure {
  id: string
  observer: string
  row: ParsedRow
}

export interface FittedTarget {
  kind: 'relative' | 'equatorial' | 'plane'
  radius_unit: string | null
  diameter_scale_arcmin: number | null
}

export interface RequestOptions {
  setAside: ReadonlySet<string>
  model?: FitSettings['model'] | undefined
}

/** The part a measure plays: a limit on the separation is kept and shown, never fitted. */
export function fitRole(row: ParsedRow, isSetAside: boolean): 'used' | 'set-aside' | 'not-fitted' {
  if (isSetAside) return 'set-aside'
  return row.kind === 'relative' && row.rhoLimitArcsec !== null ? 'not-fitted' : 'used'
}

/**
 * The whole of what the engine is asked, as it is kept with the fit and hashed. No start from the accepted fit goes along: from a
 * start the engine looks nearby only, while the search, a matter of milliseconds, finds that orbit again and any that is now better.
 */
export function buildFitRequest(target: FittedTarget, measures: readonly StandingMeasure[], options: RequestOptions): FitRequest {
  const settings = settingsOf(target, options)
  const asked = measures.map(measure => askedMeasure(measure, options))
  return fitRequestOf(target.kind, asked, settings)
}

/** The canonical JSON of that request, written measure by measure and in slices: of ten thousand it takes a while. */
export async function fitRequestText(target: FittedTarget, measures: readonly StandingMeasure[], options: RequestOptions): Promise<string> {
  const { kind, settings } = buildFitRequest(target, [], options)
  const asked = await mapInTurns(measures, measure => canonicalJson(askedMeasure(measure, options)))
  return `{"kind":${canonicalJson(kind)},"measures":[${asked.join(',')}],"settings":${canonicalJson(settings)}}`
}

function askedMeasure({ id, observer, row }: StandingMeasure, { setAside }: RequestOptions): FitMeasure {
  const measure = toFitMeasure(row, id, observer)
  return setAside.has(id) ? { ...measure, setAside: true } : measure
}

function settingsOf(target: FittedTarget, { model }: RequestOptions): FitSettings {
  return {
    seed: FIT_SEED,
    ...(model ? { model } : {}),
    ...(target.kind === 'plane' && target.radius_unit !== null ? { radiusUnit: target.radius_unit } : {}),
    ...(target.kind === 'plane' && target.diameter_scale_arcmin !== null ? { diameterScaleArcmin: target.diameter_scale_arcmin } : {}),
  }
}
