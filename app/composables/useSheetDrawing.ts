import type { FitResult, Prediction } from '~~/fitting/types'
import { predict } from '~~/fitting'
import { diameterScaleOf, predictedSigmas, sampledEpochsYr, yearsToMark } from '#shared/drawing/prediction-band'
import { markedDays, trackDates, trackSpan } from '#shared/drawing/track-dates'
import type { TrackSpan } from '#shared/drawing/track-dates'
import { residualChart } from '#shared/drawing/residual-series'
import type { FitMeasureView } from '#shared/schemas/fits'
import { useObserverMarks } from './useObserverMarks'

/** The path of a moving body over its measures and some weeks more. */
export interface TrackDrawing {
  span: TrackSpan
  path: Prediction[]
  /** Predictions at the round dates that drawings mark. */
  marked: Prediction[]
}

interface Drawn {
  result: () => FitResult | null
  measures: () => readonly FitMeasureView[]
  nowYr: () => number
  /** Predictions that were published with the result; without them the coming years are computed. */
  published?: () => Prediction[]
}

/** What the drawings of one fit share: marks of its observers, the residual chart with its band, the coming years, the path, the walking order. */
export function useSheetDrawing({ result, measures, nowYr, published }: Drawn) {
  const { marks, lookOf } = useObserverMarks(measures)
  const aside = computed(() => new Set(measures().filter(measure => measure.role !== 'used').map(measure => measure.id)))
  const order = computed(() => [...measures()].sort((a, b) => placeOf(a) - placeOf(b)).map(measure => measure.id))

  const coming = computed<Prediction[]>(() => {
    const shown = result()
    if (!shown || shown.kind !== 'relative') return []
    return published?.() ?? predict(shown, yearsToMark(shown, nowYr()))
  })

  const track = computed<TrackDrawing | null>(() => {
    const shown = result()
    const span = shown?.kind === 'equatorial' ? trackSpan(shown) : null
    return shown && span && { span, path: predict(shown, trackDates(span)), marked: predict(shown, markedDays(span.fromJd, span.toJd)) }
  })

  const chart = computed(() => {
    const shown = result()
    if (!shown) return null
    const predicted = track.value?.path ?? predict(shown, sampledEpochsYr(shown, measures(), nowYr()))
    return residualChart(shown, measures(), predictedSigmas(predicted, diameterScaleOf(shown)))
  })

  return { marks, lookOf, aside, order, coming, track, chart }
}

/** Where a measure stands in the order of walking: by epoch, else by φ. */
function placeOf(measure: FitMeasureView): number {
  return measure.epochYr ?? measure.phiDeg ?? 0
}
