import type { ResidualChart } from './residual-series'

/** A cell as CSV wants it; text that a spreadsheet would take for a formula gets an apostrophe before it. */
export function csvText(text: string): string {
  const safe = /^[=+\-@\t\r]/.test(text) ? `'${text}` : text
  return /[",\n\r]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe
}

/** The residual plots' numbers: one row a point. */
export function residualCsv(chart: ResidualChart): string {
  const place = chart.axis === 'direction' ? 'phi_deg' : 'epoch_yr'
  const rows = chart.series.flatMap(series =>
    series.points.map(point => [csvText(series.name), csvText(series.unit), point.at, point.value, point.status, csvText(point.observer), point.id].join(',')))
  return [['coordinate', 'unit', place, 'observed_minus_computed', 'status', 'observer', 'measure'].join(','), ...rows].join('\r\n') + '\r\n'
}
