import type { SimulatedMeasure } from './simulated-measures'

/** What stands in every row of a file beside the measure itself. */
export interface PairFileFrame {
  sigmaThetaDeg?: number
  sigmaRhoArcsec?: number
  observer?: string
  nights?: number
  method?: string
  /** Name in a column of its own; without it the file's measures go where the upload says. */
  target?: string
}

/** A file of measures of a pair as an observer would write it, by the canonical columns. */
export function pairFile(measures: readonly SimulatedMeasure[], frame: PairFileFrame = {}): string {
  return tableText(measures.map(measure => ({
    ...(frame.target === undefined ? {} : { target: frame.target }),
    epoch: measure.epochYr.toFixed(3),
    theta_deg: measure.thetaDeg.toFixed(2),
    rho_arcsec: measure.rhoArcsec.toFixed(4),
    ...(frame.sigmaThetaDeg === undefined ? {} : { sigma_theta_deg: String(frame.sigmaThetaDeg) }),
    ...(frame.sigmaRhoArcsec === undefined ? {} : { sigma_rho_arcsec: String(frame.sigmaRhoArcsec) }),
    ...(frame.nights === undefined ? {} : { nights: String(frame.nights) }),
    ...(frame.method === undefined ? {} : { method: frame.method }),
    ...(frame.observer === undefined ? {} : { observer: frame.observer }),
  })))
}

/** Rows with the same columns, written as CSV; the values hold no commas or quotes. */
export function tableText(rows: readonly Record<string, string>[]): string {
  const columns = Object.keys(rows[0] ?? {})
  return [columns.join(','), ...rows.map(row => columns.map(column => row[column] ?? '').join(','))].join('\n') + '\n'
}
