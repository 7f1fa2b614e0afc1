import type { MeasureSite } from '../../fitting/types'

/**
 * One row of a file as it was understood: degrees and arcseconds as written, the epoch turned into a Julian year (TT).
 * Plain JSON, so that it can lie beside the original cells. A value that was not given is null.
 */
interface ParsedRowBase {
  targetName: string | null
  observerName: string | null
  remarks: string | null
}

export interface ParsedRelativeRow extends ParsedRowBase {
  kind: 'relative'
  /** Julian year, TT, 1600 to 2500. */
  epochYr: number
  /** Position angle from north through east, degrees, 0 ≤ θ < 360. */
  thetaDeg: number | null
  rhoArcsec: number | null
  sigmaThetaDeg: number | null
  sigmaRhoArcsec: number | null
  eastArcsec: number | null
  northArcsec: number | null
  sigmaEastArcsec: number | null
  sigmaNorthArcsec: number | null
  /** Not resolved: the separation would have been seen above this limit, arcsec. */
  rhoLimitArcsec: number | null
  /** Of θ and ρ, or of east and north, whichever were given; in (−1, 1). */
  correlation: number | null
  nights: number | null
  /** of_date, ICRS, J2000, B1950 or the year of an equinox; null where the file does not say. */
  thetaFrame: string | null
  quadrant: 'stated' | 'ambiguous' | null
  components: string | null
  magA: number | null
  magB: number | null
  deltaMag: number | null
  band: string | null
  method: string | null
  apertureM: number | null
  stationText: string | null
  sourceText: string | null
}

export interface ParsedPlaneRow extends ParsedRowBase {
  kind: 'plane'
  /** Julian year, TT, where a time was given. */
  epochYr: number | null
  /** ISO 8601 with milliseconds and Z, where a time was given. */
  timeUtc: string | null
  /** Direction in the plane of the orbit, degrees, 0 ≤ φ < 360. */
  phiDeg: number
  /** Distance in the target's own unit; exactly one of r and diameterArcmin is given. */
  r: number | null
  sigmaR: number | null
  diameterArcmin: number | null
  sigmaDiameterArcmin: number | null
}

export interface ParsedEquatorialRow extends ParsedRowBase {
  kind: 'equatorial'
  /** Middle of the exposure, ISO 8601 in UTC with milliseconds and Z. */
  timeUtc: string
  /** The same as a Julian year (TT). */
  epochYr: number
  /** On the axes of the ICRS; 0 ≤ α < 360, −90 ≤ δ ≤ 90. */
  raDeg: number
  decDeg: number
  site: MeasureSite
  /** Code or name of the station as written. */
  stationText: string | null
  sigmaRaCosDecArcsec: number | null
  sigmaDecArcsec: number | null
  correlation: number | null
  sigmaTimeS: number | null
  starCatalogue: string | null
  tracklet: string | null
  mag: number | null
  band: string | null
}

export type ParsedRow = ParsedRelativeRow | ParsedEquatorialRow | ParsedPlaneRow

/** The text of a row by canonical column name; a column that the file does not have is not there. */
export type RowCells = Record<string, string>
