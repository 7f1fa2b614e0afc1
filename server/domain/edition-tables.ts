import type { FitRequest, Kind, Prediction } from '../../fitting/types'
import { writeCsv } from '../../shared/csv/write-csv'
import type { CsvColumn } from '../../shared/csv/write-csv'
import type { EditionSnapshot } from '../../shared/schemas/editions'
import type { FitMeasureView } from '../../shared/schemas/fits'
import { elementFamily, labelledElements } from '../../shared/units/element-labels'

type MeasureRow = FitMeasureView & { target: string; asked: FitRequest['measures'][number] | undefined }

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

const EQUATORIAL_COLUMNS: readonly CsvColumn<MeasureRow>[] = [
  { name: 'target', cell: row => row.target },
  { name: 'time_utc', cell: row => row.timeUtc },
  { name: 'ra_deg', cell: row => row.sky?.raDeg },
  { name: 'dec_deg', cell: row => row.sky?.decDeg },
  { name: 'station', cell: row => row.sky?.station },
  // A known station is found again by its code; coordinates beside it would be taken instead.
  { name: 'lon_deg', cell: row => (row.sky && 'latitudeDeg' in row.sky.site ? row.sky.site.longitudeEastDeg : null) },
  { name: 'lat_deg', cell: row => (row.sky && 'latitudeDeg' in row.sky.site ? row.sky.site.latitudeDeg : null) },
  { name: 'height_m', cell: row => (row.sky && 'latitudeDeg' in row.sky.site ? row.sky.site.heightM : null) },
  { name: 'sigma_ra_cosdec_arcsec', cell: row => row.sky?.sigmaRaCosDecArcsec },
  { name: 'sigma_dec_arcsec', cell: row => row.sky?.sigmaDecArcsec },
  { name: 'corr_ra_dec', cell: row => row.sky?.correlation },
  { name: 'sigma_time_s', cell: row => row.sky?.sigmaTimeS },
  { name: 'star_catalogue', cell: row => row.sky?.starCatalogue },
  { name: 'tracklet', cell: row => row.sky?.tracklet },
  { name: 'mag', cell: row => row.sky?.mag },
  { name: 'band', cell: row => row.sky?.band },
  { name: 'observer', cell: row => row.observer },
  { name: 'remarks', cell: row => row.remarks },
]

const COLUMNS: Record<Kind, readonly CsvColumn<MeasureRow>[]> = { relative: RELATIVE_COLUMNS, equatorial: EQUATORIAL_COLUMNS, plane: PLANE_COLUMNS }

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
  const asked = new Map((snapshot.request as FitRequest).measures.map(measure => [measure.id, measure] as const))
  const rows = measures.map(measure => ({ ...measure, target: snapshot.target.name, asked: asked.get(measure.id) }))
  return writeCsv([...withoutEmpty(COLUMNS[snapshot.target.kind], rows), ...more], rows)
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
const PREDICTED = [
  'thetaDeg', 'rhoArcsec', 'eastArcsec', 'northArcsec', 'r',
  'raDeg', 'decDeg', 'errorMajorArcsec', 'errorMinorArcsec', 'errorPositionAngleDeg', 'distanceAu', 'sunDistanceAu', 'elongationDeg',
  'phaseAngleDeg', 'raCosDecRateArcsecPerMin', 'decRateArcsecPerMin', 'motionArcsecPerMin', 'motionPositionAngleDeg',
] as const
const PLACE: Record<Kind, string> = { relative: 'julian_year', equatorial: 'jd_tt', plane: 'phi_deg' }
const CORRELATED = { thetaDeg: 'corr_theta_rho', raDeg: 'corr_ra_dec' } as const

/** The predictions with their errors: over Julian years for a pair, over dates for a comet, over φ in the plane of the orbit. */
export function ephemerisCsv(snapshot: EditionSnapshot): string {
  const names = namesIn(snapshot.predictions.map(prediction => prediction.values))
  const withSigma = new Set<string>(snapshot.target.kind === 'equatorial' ? namesIn(snapshot.predictions.map(prediction => prediction.sigmas)) : names)
  const correlated = (['thetaDeg', 'raDeg'] as const).filter(name => names.includes(name))
  const columns: CsvColumn<Prediction>[] = [
    { name: PLACE[snapshot.target.kind], cell: prediction => prediction.at },
    ...names.flatMap(name => [
      { name: snakeCase(name), cell: (prediction: Prediction) => prediction.values[name] },
      ...(withSigma.has(name) ? [{ name: `sigma_${snakeCase(name)}`, cell: (prediction: Prediction) => prediction.sigmas[name] }] : []),
    ]),
    ...correlated.map(name => ({ name: CORRELATED[name], cell: (prediction: Prediction) => prediction.correlation })),
  ]
  return writeCsv(columns, snapshot.predictions)
}

/** The names under which any of these has a number. */
function namesIn(lists: readonly Record<string, number | null>[]): (typeof PREDICTED)[number][] {
  return PREDICTED.filter(name => lists.some(list => typeof list[name] === 'number'))
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
