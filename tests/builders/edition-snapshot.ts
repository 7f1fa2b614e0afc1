import type { RelativeMeasure } from '../../fitting/types'
import type { EditionSnapshot } from '../../shared/schemas/editions'
import type { FitMeasureView } from '../../shared/schemas/fits'
import { pairResult } from './fit-result'

/** A measure as a snapshot holds it; what is not given is not there. */
export function snapshotMeasure(id: string, values: Partial<FitMeasureView>): FitMeasureView {
  return {
    id, observer: 'Ossian Brandvik', batchNumber: 1, epochYr: null, timeUtc: null, thetaDeg: null, rhoArcsec: null, rhoLimitArcsec: null,
    sigmaThetaDeg: null, sigmaRhoArcsec: null, eastArcsec: null, northArcsec: null, sigmaEastArcsec: null, sigmaNorthArcsec: null,
    phiDeg: null, r: null, sigmaR: null, diameterArcmin: null, sigmaDiameterArcmin: null, nights: null, method: null, remarks: null,
    role: 'used', reason: null, decidedBy: null, isNew: false, ...values,
  }
}

/** An edition of a pair with these measures and what the engine was asked of them. */
export function pairSnapshot(measures: FitMeasureView[], asked: RelativeMeasure[] = []): EditionSnapshot {
  return {
    format: 1,
    product: 'Semilatus',
    edition: { targetId: 'a'.repeat(26), number: 1, publishedAt: '2026-03-14T09:30:00.000Z', whatChanged: '' },
    target: { name: 'Linden 12 AB', aliases: [], kind: 'relative', componentA: 'A', componentB: 'B', radiusUnit: null, diameterScaleArcmin: null, caution: 'none', programme: 'Northern pairs' },
    licence: 'CC-BY-4.0',
    citation: '',
    observers: [],
    measures,
    request: { kind: 'relative', measures: asked },
    result: pairResult(),
    predictions: [],
  }
}
