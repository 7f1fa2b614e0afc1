import * as rules from './number-rules'
import type { ParsedEquatorialRow } from './parsed-row'
import { readSkyPlace } from './read-sky-place'
import { readSkyTime } from './read-sky-time'
import { readSite } from './read-station'
import type { RowReader } from './row-reader'
import { VALUE_SENTENCES } from './sentences'

const magnitude = rules.within(-30, 40, 'mag')

/** Reads one row of a comet's or minor planet's places; null where something in it is wrong, which then stands in the row's problems. */
export function readEquatorialRow(row: RowReader, nowYr?: number): ParsedEquatorialRow | null {
  const time = readSkyTime(row, nowYr)
  const place = readSkyPlace(row)
  const site = readSite(row)
  const rest = {
    sigmaRaCosDecArcsec: row.number('sigma_ra_cosdec_arcsec', rules.standardError),
    sigmaDecArcsec: row.number('sigma_dec_arcsec', rules.standardError),
    correlation: readCorrelation(row),
    sigmaTimeS: row.number('sigma_time_s', rules.standardError),
    starCatalogue: row.text('star_catalogue'),
    tracklet: row.text('tracklet'),
    mag: row.number('mag', magnitude),
    band: row.text('band'),
    stationText: row.text('station'),
    targetName: row.text('target'),
    observerName: row.text('observer'),
    remarks: row.text('remarks'),
  }
  if (row.problems.hasErrors || time === null || place === null || site === null) return null
  return { kind: 'equatorial', ...time, ...place, site, ...rest }
}

function readCorrelation(row: RowReader): number | null {
  const value = row.number('corr_ra_dec', rules.correlation)
  const hasBoth = row.isFilled('sigma_ra_cosdec_arcsec') && row.isFilled('sigma_dec_arcsec')
  if (value !== null && !hasBoth) row.complain('corr_ra_dec', VALUE_SENTENCES.correlationNeedsSigmas('sigma_ra_cosdec_arcsec', 'sigma_dec_arcsec'))
  return value
}
