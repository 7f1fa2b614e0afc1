import { predict } from '../../../fitting'
import type { EditionSnapshot } from '#shared/schemas/editions'
import type { FitMeasureView } from '#shared/schemas/fits'
import type { Context, Tx } from '../../context/context'
import { predictionPlaces } from '../../domain/edition-predictions'
import { buildSnapshot } from '../../domain/edition-snapshot'
import { wrongState } from '../../errors/app-error'
import { listFitMeasures } from '../../repositories/fit-content-repository'
import type { FitRecord } from '../../repositories/fit-repository'
import { listMeasuresByIds } from '../../repositories/measure-repository'
import { listTargetNames } from '../../repositories/target-repository'
import type { TargetRow } from '../../repositories/target-repository'
import { fitMeasureView } from '../fits/measure-view'
import { resultOf } from '../fits/fit-summary'

export interface SnapshotSubject {
  fit: FitRecord
  target: TargetRow
  edition: EditionSnapshot['edition']
}

/** Gathers all that an edition consists of, in the transaction that publishes it. */
export async function takeSnapshot(tx: Tx, ctx: Context, { fit, target, edition }: SnapshotSubject): Promise<EditionSnapshot> {
  const result = resultOf(fit)
  if (result === null) throw wrongState(`Fit ${fit.number} has no result, so there is nothing to publish.`)
  const names = await listTargetNames(tx, target.id)
  return buildSnapshot({
    edition,
    target: {
      name: target.name,
      aliases: names.filter(name => name !== target.name),
      kind: target.kind,
      componentA: target.component_a,
      componentB: target.component_b,
      radiusUnit: target.radius_unit,
      diameterScaleArcmin: target.diameter_scale_arcmin,
      caution: target.caution,
      programme: target.programme_name,
    },
    url: `${ctx.baseUrl}/orbits/${target.id}/${edition.number}`,
    measures: await measuresOf(tx, fit.id),
    request: JSON.parse(fit.request),
    result,
    predictions: predict(result, predictionPlaces(target.kind, edition.publishedAt)),
  })
}

async function measuresOf(tx: Tx, fitId: string): Promise<FitMeasureView[]> {
  const parts = new Map((await listFitMeasures(tx, fitId)).map(part => [part.measure_id, part]))
  const measures = await listMeasuresByIds(tx, [...parts.keys()])
  return measures.flatMap((measure) => {
    const part = parts.get(measure.id)
    return part ? [fitMeasureView(measure, part)] : []
  })
}
