import { computed, ref } from 'vue'
import type { FitResult, Residual } from '~~/fitting/types'
import type { MeasureView } from '#shared/schemas/targets'
import { formatArcsec, formatDirection, formatEpoch, formatResidual, formatResidualMas } from '#shared/units/angles'
import { formatUtcTime } from '#shared/units/date-text'
import { formatNumber } from '#shared/units/number-text'
import { formatDeclination, formatRightAscension } from '#shared/units/sexagesimal'

interface Column<Measure> {
  key: string
  prefix?: string
  symbol: string
  word: string
  isNumber: boolean
  /** What the column sorts by; null where the measure has none. */
  value: (measure: Measure, residual: Residual | undefined) => number | string | null
  text: (measure: Measure, residual: Residual | undefined) => string
}

const ARCSEC_AN_ARCMIN = 60

const difference = (residual: Residual | undefined, name: string) => residual?.observedMinusComputed[name] ?? null

/** A column of numbers: its heading, where the number comes from, how it is written. */
function numbers<Measure>(heading: { key: string; prefix?: string; symbol: string; word: string }, value: Column<Measure>['value'], write: (value: number | null) => string): Column<Measure> {
  return { ...heading, isNumber: true, value, text: (measure, residual) => write(value(measure, residual) as number | null) }
}

const COLUMNS: Column<MeasureView>[] = [
  numbers({ key: 'epoch', symbol: '', word: 'epoch, yr' }, measure => (measure.sky ? null : measure.epochYr), value => formatEpoch(value)),
  {
    key: 'time', symbol: '', word: 'UTC', isNumber: true, value: measure => (measure.sky ? measure.timeUtc : null),
    text: measure => (measure.timeUtc === null ? '—' : formatUtcTime(measure.timeUtc)),
  },
  numbers({ key: 'ra', symbol: 'α', word: ', h m s' }, measure => measure.sky?.raDeg ?? null, value => (value === null ? '—' : formatRightAscension(value))),
  numbers({ key: 'dec', symbol: 'δ', word: ', ° ′ ″' }, measure => measure.sky?.decDeg ?? null, value => (value === null ? '—' : formatDeclination(value))),
  numbers({ key: 'mag', symbol: '', word: 'mag' }, measure => measure.sky?.mag ?? null, value => (value === null ? '—' : formatNumber(value, 1))),
  numbers({ key: 'phi', symbol: 'φ', word: ', °' }, measure => measure.phiDeg, value => formatDirection(value)),
  numbers({ key: 'theta', symbol: 'θ', word: ', °' }, measure => measure.thetaDeg, value => formatDirection(value)),
  {
    key: 'rho', symbol: 'ρ', word: ', ″', isNumber: true, value: measure => measure.rhoArcsec ?? measure.rhoLimitArcsec,
    text: measure => (measure.rhoLimitArcsec === null ? formatArcsec(measure.rhoArcsec) : `< ${formatArcsec(measure.rhoLimitArcsec)}`),
  },
  numbers({ key: 'east', symbol: '', word: 'east, ″' }, measure => measure.eastArcsec, value => formatArcsec(value)),
  numbers({ key: 'north', symbol: '', word: 'north, ″' }, measure => measure.northArcsec, value => formatArcsec(value)),
  numbers({ key: 'r', symbol: 'r', word: '' }, measure => measure.r, value => (value === null ? '—' : formatNumber(value, 5))),
  numbers({ key: 'diameter', symbol: 'd', word: ', ′' }, measure => measure.diameterArcmin, value => (value === null ? '—' : formatNumber(value, 3))),
  numbers({ key: 'oc-theta', prefix: 'O−C', symbol: 'θ', word: ', °' }, (_, residual) => difference(residual, 'thetaDeg'), value => formatResidual(value)),
  numbers({ key: 'oc-rho', prefix: 'O−C', symbol: 'ρ', word: ', mas' }, (_, residual) => difference(residual, 'rhoArcsec'), value => formatResidualMas(value)),
  numbers({ key: 'oc-east', prefix: 'O−C', symbol: '', word: 'east, mas' }, (_, residual) => difference(residual, 'eastArcsec'), value => formatResidualMas(value)),
  numbers({ key: 'oc-north', prefix: 'O−C', symbol: '', word: 'north, mas' }, (_, residual) => difference(residual, 'northArcsec'), value => formatResidualMas(value)),
  numbers({ key: 'oc-r', prefix: 'O−C', symbol: 'r', word: '' }, (_, residual) => (difference(residual, 'diameterArcmin') === null ? difference(residual, 'r') : null), value => formatResidual(value, 5)),
  numbers({ key: 'oc-diameter', prefix: 'O−C', symbol: 'd', word: ', ″' }, (_, residual) => difference(residual, 'diameterArcmin'), value => formatResidual(value === null ? null : value * ARCSEC_AN_ARCMIN)),
  numbers({ key: 'oc-ra', prefix: 'O−C', symbol: 'α cos δ', word: ', ″' }, (_, residual) => difference(residual, 'raCosDecArcsec'), value => formatResidual(value)),
  numbers({ key: 'oc-dec', prefix: 'O−C', symbol: 'δ', word: ', ″' }, (_, residual) => difference(residual, 'decArcsec'), value => formatResidual(value)),
  numbers({ key: 'oc-along', symbol: '', word: 'along, ″' }, (measure, residual) => (measure.sky ? difference(residual, 'alongArcsec') : null), value => formatResidual(value)),
  numbers({ key: 'oc-across', symbol: '', word: 'across, ″' }, (measure, residual) => (measure.sky ? difference(residual, 'acrossArcsec') : null), value => formatResidual(value)),
  numbers({ key: 'sigmas', symbol: '', word: 'in σ' }, (_, residual) => residual?.normalised ?? null, value => (value === null ? '—' : formatNumber(value, 1))),
  { key: 'observer', symbol: '', word: 'observer', isNumber: false, value: measure => measure.observer, text: measure => measure.observer },
  { key: 'station', symbol: '', word: 'station', isNumber: false, value: measure => measure.sky?.station ?? null, text: measure => measure.sky?.station ?? '—' },
]

/** The columns that these measures fill, and the rows in the order chosen. */
export function useMeasureColumns<Measure extends MeasureView>(measures: () => readonly Measure[], result: () => FitResult | null) {
  const sorted = ref<{ key: string; direction: 'ascending' | 'descending' }>({ key: '', direction: 'ascending' })
  const residualOf = computed(() => new Map(result()?.residuals.map(residual => [residual.id, residual])))
  const columns = computed(() => COLUMNS.filter(column => measures().some(measure => column.value(measure, residualOf.value.get(measure.id)) !== null)))

  const rows = computed(() => {
    const key = sorted.value.key || columns.value[0]?.key
    const column = columns.value.find(candidate => candidate.key === key)
    const withValue = measures().map((measure) => {
      const residual = residualOf.value.get(measure.id)
      return { measure, sortValue: column?.value(measure, residual) ?? null, cells: columns.value.map(one => one.text(measure, residual)) }
    })
    const sign = sorted.value.direction === 'ascending' ? 1 : -1
    return withValue.sort((a, b) => compare(a.sortValue, b.sortValue, sign))
  })

  function sortBy(key: string) {
    const isSame = (sorted.value.key || columns.value[0]?.key) === key
    sorted.value = { key, direction: isSame && sorted.value.direction === 'ascending' ? 'descending' : 'ascending' }
  }

  return { columns, rows, sortBy, sorted: computed(() => ({ ...sorted.value, key: sorted.value.key || (columns.value[0]?.key ?? '') })) }
}

/** What has no value stands last in either direction. */
function compare(a: number | string | null, b: number | string | null, sign: number): number {
  if (a === null || b === null) return a === b ? 0 : a === null ? 1 : -1
  return sign * (a < b ? -1 : a > b ? 1 : 0)
}
