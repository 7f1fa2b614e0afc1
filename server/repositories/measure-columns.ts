import type { ParsedPlaneRow, ParsedRelativeRow, ParsedRow } from '../../shared/intake/parsed-row'
import type { MeasureRecord, NewMeasure } from './measure-repository'

type ValueColumns = Omit<NewMeasure, 'id' | 'lineage_id' | 'target_id' | 'batch_id' | 'batch_row_id' | 'duplicate_key' | 'original_cells' | 'author_id' | 'created_at'>

const NO_VALUES = {
  revision: 1, superseded_at: null, epoch_yr: null, time_utc: null, theta_deg: null, rho_arcsec: null, rho_limit_arcsec: null,
  sigma_theta_deg: null, sigma_rho_arcsec: null, east_arcsec: null, north_arcsec: null, sigma_east_arcsec: null,
  sigma_north_arcsec: null, ra_deg: null, dec_deg: null, sigma_ra_cosdec_arcsec: null, sigma_dec_arcsec: null, phi_deg: null,
  r: null, sigma_r: null, diameter_arcmin: null, sigma_diameter_arcmin: null, correlation: null, nights: null,
  theta_frame: null, quadrant: null, method: null, aperture_m: null, mag_a: null, mag_b: null, delta_mag: null, mag: null,
  band: null, components: null, station_id: null, station_text: null, instrument_id: null, source_id: null, source_text: null,
  remarks: null, reason: null,
} as const satisfies Omit<ValueColumns, 'kind'>

/** A row as it was read, as columns of the table of measures. */
export function measureColumns(row: ParsedRow): ValueColumns {
  return row.kind === 'relative' ? relativeColumns(row) : planeColumns(row)
}

function relativeColumns(row: ParsedRelativeRow): ValueColumns {
  return {
    ...NO_VALUES,
    kind: 'relative',
    epoch_yr: row.epochYr,
    theta_deg: row.thetaDeg,
    rho_arcsec: row.rhoArcsec,
    rho_limit_arcsec: row.rhoLimitArcsec,
    sigma_theta_deg: row.sigmaThetaDeg,
    sigma_rho_arcsec: row.sigmaRhoArcsec,
    east_arcsec: row.eastArcsec,
    north_arcsec: row.northArcsec,
    sigma_east_arcsec: row.sigmaEastArcsec,
    sigma_north_arcsec: row.sigmaNorthArcsec,
    correlation: row.correlation,
    nights: row.nights,
    theta_frame: row.thetaFrame,
    quadrant: row.quadrant,
    method: row.method,
    aperture_m: row.apertureM,
    mag_a: row.magA,
    mag_b: row.magB,
    delta_mag: row.deltaMag,
    band: row.band,
    components: row.components,
    station_text: row.stationText,
    source_text: row.sourceText,
    remarks: row.remarks,
  }
}

function planeColumns(row: ParsedPlaneRow): ValueColumns {
  return {
    ...NO_VALUES,
    kind: 'plane',
    epoch_yr: row.epochYr,
    time_utc: row.timeUtc,
    phi_deg: row.phiDeg,
    r: row.r,
    sigma_r: row.sigmaR,
    diameter_arcmin: row.diameterArcmin,
    sigma_diameter_arcmin: row.sigmaDiameterArcmin,
    remarks: row.remarks,
  }
}

/** A kept measure as it was read; throws for a kind that cannot have been read. */
export function parsedRowOf(measure: MeasureRecord): ParsedRow {
  const given = { targetName: null, observerName: measure.observer_name, remarks: measure.remarks }
  if (measure.kind === 'plane') {
    return {
      ...given,
      kind: 'plane',
      epochYr: measure.epoch_yr,
      timeUtc: measure.time_utc,
      phiDeg: measure.phi_deg!,
      r: measure.r,
      sigmaR: measure.sigma_r,
      diameterArcmin: measure.diameter_arcmin,
      sigmaDiameterArcmin: measure.sigma_diameter_arcmin,
    }
  }
  if (measure.kind === 'relative') return { ...given, ...relativeRow(measure) }
  throw new RangeError(`measure ${measure.id} is of the kind ${measure.kind}, which cannot be read yet`)
}

function relativeRow(measure: MeasureRecord): Omit<ParsedRelativeRow, 'targetName' | 'observerName' | 'remarks'> {
  return {
    kind: 'relative',
    epochYr: measure.epoch_yr!,
    thetaDeg: measure.theta_deg,
    rhoArcsec: measure.rho_arcsec,
    sigmaThetaDeg: measure.sigma_theta_deg,
    sigmaRhoArcsec: measure.sigma_rho_arcsec,
    eastArcsec: measure.east_arcsec,
    northArcsec: measure.north_arcsec,
    sigmaEastArcsec: measure.sigma_east_arcsec,
    sigmaNorthArcsec: measure.sigma_north_arcsec,
    rhoLimitArcsec: measure.rho_limit_arcsec,
    correlation: measure.correlation,
    nights: measure.nights,
    thetaFrame: measure.theta_frame,
    quadrant: measure.quadrant,
    components: measure.components,
    magA: measure.mag_a,
    magB: measure.mag_b,
    deltaMag: measure.delta_mag,
    band: measure.band,
    method: measure.method,
    apertureM: measure.aperture_m,
    stationText: measure.station_text,
    sourceText: measure.source_text,
  }
}
