import type { Kind, Prediction } from '~~/fitting/types'
import { comesNearSun, NEAR_SUN_DEG } from '#shared/drawing/near-sun'
import { formatDirection } from '#shared/units/angles'
import { formatJulianDay } from '#shared/units/date-text'
import { formatNumber } from '#shared/units/number-text'
import { formatDeclination, formatRightAscension } from '#shared/units/sexagesimal'
import { unitSymbol } from '#shared/units/unit-symbol'
import { formatValueAndSigma } from '#shared/units/value-and-sigma'

interface Heading {
  key: string
  symbol: string
  word: string
}

interface Column extends Heading {
  text: (prediction: Prediction) => string
}


/** A value of a prediction with fixed decimals; a dash where there is none. */
function plain(heading: Heading, name: string, write: (value: number) => string): Column {
  return { ...heading, text: ({ values }) => (values[name] === undefined ? '—' : write(values[name])) }
}

/** A value and its σ in two columns with the same decimals. */
function withSigma(heading: Heading, name: string): Column[] {
  const both = ({ values, sigmas }: Prediction) => formatValueAndSigma(values[name] ?? NaN, sigmas[name] ?? null)
  return [
    { ...heading, text: prediction => both(prediction).value },
    { key: `${heading.key}-sigma`, symbol: 'σ', word: '', text: prediction => (both(prediction).sigma === null ? '—' : `± ${both(prediction).sigma}`) },
  ]
}

const DATED: Column[] = [
  { key: 'at', symbol: '', word: '0 h TT', text: ({ at }) => formatJulianDay(at, true) },
  plain({ key: 'ra', symbol: 'α', word: ', h m s' }, 'raDeg', value => formatRightAscension(value, 1)),
  plain({ key: 'dec', symbol: 'δ', word: ', ° ′ ″' }, 'decDeg', value => formatDeclination(value, 0)),
  plain({ key: 'error', symbol: 'σ', word: ', ″' }, 'errorMajorArcsec', value => formatNumber(value, value < 10 ? 1 : 0)),
  plain({ key: 'distance', symbol: 'Δ', word: ', au' }, 'distanceAu', value => formatNumber(value, 3)),
  plain({ key: 'sun', symbol: 'r', word: ', au' }, 'sunDistanceAu', value => formatNumber(value, 3)),
  plain({ key: 'elongation', symbol: '', word: 'from the Sun, °' }, 'elongationDeg', value => `${formatNumber(value, 0)}${value < NEAR_SUN_DEG ? ' !' : ''}`),
  plain({ key: 'motion', symbol: '', word: '″/min' }, 'motionArcsecPerMin', value => formatNumber(value, 2)),
]

function columnsOf(kind: Kind, radiusUnit: string | null): Column[] {
  if (kind === 'equatorial') return DATED
  if (kind === 'plane') {
    return [
      { key: 'at', symbol: 'φ', word: ', °', text: ({ at }) => formatDirection(at, 0) },
      ...withSigma({ key: 'r', symbol: 'r', word: radiusUnit ? `, ${unitSymbol(radiusUnit)}` : '' }, 'r'),
    ]
  }
  return [
    { key: 'at', symbol: '', word: 'year', text: ({ at }) => formatNumber(at, Number.isInteger(at) ? 1 : 2) },
    ...withSigma({ key: 'theta', symbol: 'θ', word: ', °' }, 'thetaDeg'),
    ...withSigma({ key: 'rho', symbol: 'ρ', word: ', ″' }, 'rhoArcsec'),
  ]
}

const NEEDED: Record<Kind, string> = { relative: 'thetaDeg', equatorial: 'raDeg', plane: 'r' }

/** The published predictions as a table, and whether any of them stands near the Sun. */
export function usePredictionRows(predictions: () => readonly Prediction[], kind: () => Kind, radiusUnit: () => string | null) {
  const headings = computed(() => columnsOf(kind(), radiusUnit()))
  const shown = computed(() => predictions().filter(({ values }) => values[NEEDED[kind()]] !== undefined))
  const rows = computed(() => shown.value.map(prediction => headings.value.map(column => column.text(prediction))))
  const isNearSun = computed(() => comesNearSun(shown.value))
  return { headings, rows, isNearSun }
}
