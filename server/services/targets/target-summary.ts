import type { FitSummary } from '#shared/schemas/fits'
import type { TargetSummary } from '#shared/schemas/targets'
import type { TargetOverviewRow } from '../../repositories/target-repository'

export function targetSummary(target: TargetOverviewRow, latestFit: FitSummary | null): TargetSummary {
  return {
    id: target.id,
    name: target.name,
    kind: target.kind,
    programme: { id: target.programme_id, name: target.programme_name },
    caution: target.caution,
    measures: target.measures,
    observers: target.observers,
    firstEpochYr: target.first_epoch_yr,
    lastEpochYr: target.last_epoch_yr,
    latestFit,
    currentEdition: target.edition_number === null ? null : { number: target.edition_number, publishedAt: target.edition_published_at! },
  }
}
