import type { FitMeasureView } from '#shared/schemas/fits'
import type { MeasureView, SkyPlaceView } from '#shared/schemas/targets'
import type { FitMeasureRecord } from '../../repositories/fit-content-repository'
import { siteOf } from '../../repositories/measure-columns'
import type { MeasureRecord } from '../../repositories/measure-repository'

/** A measure as pages and downloads show it. */
export function measureView(measure: MeasureRecord): MeasureView {
  return {
    id: measure.id,
    observer: measure.observer_name,
    batchNumber: measure.batch_number,
    epochYr: measure.epoch_yr,
    timeUtc: measure.time_utc,
    thetaDeg: measure.theta_deg,
    rhoArcsec: measure.rho_arcsec,
    rhoLimitArcsec: measure.rho_limit_arcsec,
    sigmaThetaDeg: measure.sigma_theta_deg,
    sigmaRhoArcsec: measure.sigma_rho_arcsec,
    eastArcsec: measure.east_arcsec,
    northArcsec: measure.north_arcsec,
    sigmaEastArcsec: measure.sigma_east_arcsec,
    sigmaNorthArcsec: measure.sigma_north_arcsec,
    phiDeg: measure.phi_deg,
    r: measure.r,
    sigmaR: measure.sigma_r,
    diameterArcmin: measure.diameter_arcmin,
    sigmaDiameterArcmin: measure.sigma_diameter_arcmin,
    nights: measure.nights,
    method: measure.method,
    remarks: measure.remarks,
    ...(measure.kind === 'equatorial' ? { sky: skyPlaceView(measure) } : {}),
  }
}

function skyPlaceView(measure: MeasureRecord): SkyPlaceView {
  return {
    raDeg: measure.ra_deg!,
    decDeg: measure.dec_deg!,
    sigmaRaCosDecArcsec: measure.sigma_ra_cosdec_arcsec,
    sigmaDecArcsec: measure.sigma_dec_arcsec,
    correlation: measure.correlation,
    sigmaTimeS: measure.sigma_time_s,
    station: measure.station_text,
    site: siteOf(measure),
    starCatalogue: measure.star_catalogue,
    tracklet: measure.tracklet,
    mag: measure.mag,
    band: measure.band,
  }
}

/** A measure with the part it plays in a fit. */
export function fitMeasureView(measure: MeasureRecord, part: FitMeasureRecord): FitMeasureView {
  return {
    ...measureView(measure),
    role: part.role,
    reason: part.reason,
    decidedBy: part.decided_by_name,
    isNew: part.is_new === 1,
  }
}
