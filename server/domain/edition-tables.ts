import type { FitRequest, PlaneMeasure, Prediction, RelativeMeasure } from '../../fitting/types'
import { writeCsv } from '../../shared/csv/write-csv'
import type { CsvColumn } from '../../shared/csv/write-csv'
import type { EditionSnapshot } from '../../shared/schemas/editions'
import type { FitMeasureView } from '../../shared/schemas/fits'
import { elementFamily, labelledElements } from '../../shared/units/element-labels'

type MeasureRow = FitMeasureView & { target: string; asked: RelativeMeasure | PlaneMeasure | undefined }

const RELATIVE_COLUMNS: readonly CsvColumn<MeasureRow>[] = [
  { name: 'target', cell: row => row.target },
  // The prefix says Julian, so that years before 1984 are not read as Besselian.
  { name: 'epoch', cell: row => row.epochYr === null ? null : `J${row.epochYr}` },
  { name: 'theta_deg', cell: row => row.thetaDeg },
  { name: 'rho_arcsec', cell: row => row.rhoArcsec },
  { name: 'sigma_theta_deg', cell: row => row.sigmaThetaDeg },
  { name: 'sigma_rho_arcsec', cell: row => row.sigmaRhoArcsec },
  { name: 'corr_theta_rho', cell: row => correlationOf(row, 'polar') },
  { name: 'east_arcsec', cell: row => row.eastArcsec },
  { name: 'north_arcsec', cell: row => row.northArcsec },
  { name: 'sigma_east_arcsec', cell: row => row.sigmaEastArcsec },
  { name: 'sigma_north_arcsec', cell: row => row.sigmaNorthArcsec },
  { name: 'corr_east_north', cell: row => correlationOf(row, 'rectangular') },
  { name: 'rho_limit_arcsec', cell: row => row.rhoLimitArcsec },
  { name: 'quadrant', cell: quadrantOf },
  { name: 'nights', cell: row => row.nights },
  { name: 'observer', cell: row => row.observer },
  { name: 'method', cell: row => row.method },
  { name: 'remarks', cell: row => row.remarks },
]

const PLANE_COLUMNS: readonly CsvColumn<MeasureRow>[] = [
  { name: 'target', cell: row => row.target },
  { name: 'time_utc', cell: row => row.timeUtc },
  { name: 'phi_deg', cell: row => row.phiDeg },
  { name: 'r', cell: row => row.r },
  { name: 'sigma_r', cell: row => row.sigmaR },
  { name: 'diameter_arcmin', cell: row => row.diameterArcmin },
  { name: 'sigma_diameter_arcmin', cell: row => row.sigmaDiameterArcmin },
  { name: 'observer', cell: row => row.observer },
  { name: 'remarks', cell: row => row.remarks },
]

/**
 * The measures that the edition stands on, by the canonical columns of the upload: the fit command reads the file back and finds
 * the same orbit. What was set aside is another table, so that nobody fits it by mistake.
 */
export function measuresCsv(snapshot: EditionSnapshot): string {
  return measureTable(snapshot, snapshot.measures.filter(measure => measure.role !== 'set-aside'), [])
}

/** The measures left out of the edition, each with the reason and the name of who decided. */
export function setAsideCsv(snapshot: EditionSnapshot): string {
  return measureTable(snapshot, snapshot.measures.filter(measure => measure.role === 'set-aside'), [
    { name: 'set_aside_reason', cell: row => row.reason },
    { name: 'set_aside_by', cell: row => row.decidedBy },
  ])
}

function measureTable(snapshot: EditionSnapshot, measures: readonly FitMeasureView[], more: readonly CsvColumn<MeasureRow>[]): string {
  // Read back from our own snapshot, whose request is the engine's.
  const asked = new Map((snapshot.request as FitRequest).measures.map(measure => [measure.id, measure as RelativeMeasure | PlaneMeasure]))
  const rows = measures.map(measure => ({ ...measure, target: snapshot.target.name, asked: asked.get(measure.id) }))
  const columns = snapshot.target.kind === 'plane' ? PLANE_COLUMNS : RELATIVE_COLUMNS
  return writeCsv([...withoutEmpty(columns, rows), ...more], rows)
}

/** A column in which no measure has anything is left out; without any measure all stay, as a heading. */
function withoutEmpty(columns: readonly CsvColumn<MeasureRow>[], rows: readonly MeasureRow[]): readonly CsvColumn<MeasureRow>[] {
  return rows.length === 0 ? columns : columns.filter(column => rows.some(row => (column.cell(row) ?? '') !== ''))
}

function correlationOf({ asked }: MeasureRow, form: 'polar' | 'rectangular'): number | null {
  if (asked === undefined || !('position' in asked) || asked.position.form !== form) return null
  return 'correlation' in asked.position ? asked.position.correlation ?? null : null
}

function quadrantOf({ asked }: MeasureRow): string | null {
  if (asked === undefined || !('position' in asked) || asked.position.form !== 'polar') return null
  return asked.position.quadrant ?? null
}

/** What is predicted, in reading order; canonical JSON keeps its keys by the alphabet. */
const PREDICTED = ['thetaDeg', 'rhoArcsec', 'eastArcsec', 'northArcsec', 'r'] as const

/** The predictions with their errors: over Julian years for a pair, over φ in the plane of the orbit. */
export function ephemerisCsv(snapshot: EditionSnapshot): string {
  const given = new Set(snapshot.predictions.flatMap(prediction => Object.keys(prediction.values)))
  const names = PREDICTED.filter(name => given.has(name))
  const columns: CsvColumn<Prediction>[] = [
    { name: snapshot.target.kind === 'plane' ? 'phi_deg' : 'julian_year', cell: prediction => prediction.at },
    ...names.flatMap(name => [
      { name: snakeCase(name), cell: (prediction: Prediction) => prediction.values[name] },
      { name: `sigma_${snakeCase(name)}`, cell: (prediction: Prediction) => prediction.sigmas[name] },
    ]),
    ...(names.includes('thetaDeg') ? [{ name: 'corr_theta_rho', cell: (prediction: Prediction) => prediction.correlation }] : []),
  ]
  return writeCsv(columns, snapshot.predictions)
}

/** The elements with their errors: the published one, the formal one and the scaled one. */
export function elementsCsv(snapshot: EditionSnapshot): string {
  return writeCsv([
    { name: 'element', cell: ({ label }) => snakeCase(label.name) },
    { name: 'value', cell: ({ element }) => element.value },
    { name: 'sigma', cell: ({ element }) => element.sigma },
    { name: 'sigma_formal', cell: ({ element }) => element.sigmaFormal },
    { name: 'sigma_scaled', cell: ({ element }) => element.sigmaScaled },
    { name: 'unit', cell: ({ element }) => element.unit },
  ], labelledElements(snapshot.result.elements, elementFamily(snapshot.result)))
}

function snakeCase(name: string): string {
  return name.replace(/[A-Z]/g, letter => `_${letter.toLowerCase()}`)
}
