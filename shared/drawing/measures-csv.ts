import type { Kind } from '../../fitting/types'
import type { SkyMeasure } from './sky-geometry'
import type { TrackMeasure } from './track-sheet'

/** The numbers behind the square drawing: observed and computed place of each measure. */
export function measuresCsv(measures: readonly SkyMeasure[], kind: Kind): string {
  const [x, y] = kind === 'relative' ? ['east_arcsec', 'north_arcsec'] : ['x', 'y']
  const heading = ['measure', `observed_${x}`, `observed_${y}`, `computed_${x}`, `computed_${y}`, 'status']
  const rows = measures.map(({ id, observed, computed, status }) => [id, observed.x, observed.y, computed.x, computed.y, status])
  return [heading, ...rows].map(cells => cells.join(',')).join('\r\n') + '\r\n'
}

/** The numbers behind r against φ. */
export function radiusCsv(measures: readonly { id: string; trueAnomalyDeg: number; radius: number; status: string }[]): string {
  const rows = measures.map(({ id, trueAnomalyDeg, radius, status }) => [id, trueAnomalyDeg, radius, status])
  return [['measure', 'phi_from_periapsis_deg', 'r', 'status'], ...rows].map(cells => cells.join(',')).join('\r\n') + '\r\n'
}

/** The numbers behind the path of a moving body: where it was seen and where the fit puts it, degrees on the axes of the ICRS. */
export function trackCsv(measures: readonly TrackMeasure[]): string {
  const heading = ['measure', 'observed_ra_deg', 'observed_dec_deg', 'computed_ra_deg', 'computed_dec_deg', 'status']
  const rows = measures.map(({ id, observed, computed, status }) => [id, observed.raDeg, observed.decDeg, computed.raDeg, computed.decDeg, status])
  return [heading, ...rows].map(cells => cells.join(',')).join('\r\n') + '\r\n'
}
