import type { MeasureSite } from '../../fitting/types'
import type { ParsedEquatorialRow, ParsedPlaneRow, ParsedRelativeRow, ParsedRow } from '../../shared/intake/parsed-row'
import type { MeasureRecord, NewMeasure } from './measure-repository'

type ValueColumns = Omit<NewMeasure, 'id' | 'lineage_id' | 'target_id' | 'batch_id' | 'batch_row_id' | 'duplicate_key' | 'original_cells' | 'author_id' | 'created_at'>

const NO_VALUES = {
  revision: 1, superseded_at: null, epoch_yr: null, time_utc: null, theta_deg: null, rho_arcsec: null, rho_limit_arcsec: null,
  sigma_theta_deg: null, sigma_rho_arcsec: null, east_arcsec: null, north_arcsec: null, sigma_east_arcsec: null,
  sigma_north_arcsec: null, ra_deg: null, dec_deg: null, sigma_ra_cosdec_arcsec: null, sigma_dec_arcsec: null, sigma_time_s: null,
  longitude_east_deg: null, latitude_deg: null, height_m: null, rho_cos_phi: null, rho_sin_phi: null, star_catalogue: null,
  tracklet: null, phi_deg: null, r: null, sigma_r: null, diameter_arcmin: null, sigma_diameter_arcmin: null, correlation: null, nights: null,
  theta_frame: null, quadrant: null, method: null, aperture_m: null, mag_a: null, mag_b: null, delta_mag: null, mag: null,
  band: null, components: null, station_id: null, station_text: null, instrument_id: null, source_id: null, source_text: null,
  remarks: null, reason: null,
} as const satisfies Omit<ValueColumns, 'kind'>

/** A row as it was read, as columns of the table of measures. */
export function measureColumns(row: ParsedRow): ValueColumns {
  if (row.kind === 'relative') return relativeColumns(row)
  return row.kind === 'plane' ? planeColumns(row) : equatorialColumns(row)
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

function equatorialColumns(row: ParsedEquatorialRow): ValueColumns {
  return {
    ...NO_VALUES,
    kind: 'equatorial',
    epoch_yr: row.epochYr,
    time_utc: row.timeUtc,
    ra_deg: row.raDeg,
    dec_deg: row.decDeg,
    sigma_ra_cosdec_arcsec: row.sigmaRaCosDecArcsec,
    sigma_dec_arcsec: row.sigmaDecArcsec,
    correlation: row.correlation,
    sigma_time_s: row.sigmaTimeS,
    longitude_east_deg: row.site.longitudeEastDeg,
    ...('latitudeDeg' in row.site
      ? { latitude_deg: row.site.latitudeDeg, height_m: row.site.heightM }
      : { rho_cos_phi: row.site.rhoCosPhi, rho_sin_phi: row.site.rhoSinPhi }),
    star_catalogue: row.starCatalogue,
    tracklet: row.tracklet,
    mag: row.mag,
    band: row.band,
    station_text: row.stationText,
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

/** A kept measure as it was read. */
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
  return measure.kind === 'relative' ? { ...given, ...relativeRow(measure) } : { ...given, ...equatorialRow(measure) }
}

function equatorialRow(measure: MeasureRecord): Omit<ParsedEquatorialRow, 'targetName' | 'observerName' | 'remarks'> {
  return {
    kind: 'equatorial',
    timeUtc: measure.time_utc!,
    epochYr: measure.epoch_yr!,
    raDeg: measure.ra_deg!,
    decDeg: measure.dec_deg!,
    site: siteOf(measure),
    sigmaRaCosDecArcsec: measure.sigma_ra_cosdec_arcsec,
    sigmaDecArcsec: measure.sigma_dec_arcsec,
    correlation: measure.correlation,
    sigmaTimeS: measure.sigma_time_s,
    starCatalogue: measure.star_catalogue,
    tracklet: measure.tracklet,
    mag: measure.mag,
    band: measure.band,
    stationText: measure.station_text,
  }
}

/** Where an equatorial measure was made. */
export function siteOf(measure: MeasureRecord): MeasureSite {
  const longitudeEastDeg = measure.longitude_east_deg!
  return measure.latitude_deg === null
    ? { longitudeEastDeg, rhoCosPhi: measure.rho_cos_phi!, rhoSinPhi: measure.rho_sin_phi! }
    : { longitudeEastDeg, latitudeDeg: measure.latitude_deg, heightM: measure.height_m! }
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
