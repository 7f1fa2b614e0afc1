import type { Kind } from '../../fitting/types'
import type { SkyMeasure } from './sky-geometry'

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
