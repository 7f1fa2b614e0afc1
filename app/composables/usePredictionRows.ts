import type { Kind, Prediction } from '~~/fitting/types'
import { formatDirection } from '#shared/units/angles'
import { formatNumber } from '#shared/units/number-text'
import { unitSymbol } from '#shared/units/unit-symbol'
import { formatValueAndSigma } from '#shared/units/value-and-sigma'

interface Heading {
  key: string
  symbol: string
  word: string
}

const PLACES: Record<Kind, Heading> = {
  relative: { key: 'at', symbol: '', word: 'year' },
  equatorial: { key: 'at', symbol: '', word: 'year' },
  plane: { key: 'at', symbol: 'φ', word: ', °' },
}

/** The published predictions as a table: place, then each coordinate with its σ. */
export function usePredictionRows(predictions: () => readonly Prediction[], kind: () => Kind, radiusUnit: () => string | null) {
  const coordinates = computed<(Heading & { name: string })[]>(() => (kind() === 'plane'
    ? [{ key: 'r', name: 'r', symbol: 'r', word: radiusUnit() ? `, ${unitSymbol(radiusUnit()!)}` : '' }]
    : [{ key: 'theta', name: 'thetaDeg', symbol: 'θ', word: ', °' }, { key: 'rho', name: 'rhoArcsec', symbol: 'ρ', word: ', ″' }]))

  const headings = computed<Heading[]>(() => [
    PLACES[kind()],
    ...coordinates.value.flatMap(({ key, symbol, word }) => [{ key, symbol, word }, { key: `${key}-sigma`, symbol: 'σ', word: '' }]),
  ])

  const rows = computed(() => predictions().filter(({ values }) => coordinates.value.some(({ name }) => values[name] !== undefined)).map(prediction => [
    placeText(prediction.at, kind()),
    ...coordinates.value.flatMap(({ name }) => {
      const { value, sigma } = formatValueAndSigma(prediction.values[name] ?? NaN, prediction.sigmas[name] ?? null)
      return [value, sigma === null ? '—' : `± ${sigma}`]
    }),
  ]))

  return { headings, rows }
}

function placeText(at: number, kind: Kind): string {
  return kind === 'plane' ? formatDirection(at, 0) : formatNumber(at, Number.isInteger(at) ? 0 : 2)
}
