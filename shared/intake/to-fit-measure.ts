import type { EquatorialMeasure, FitRequest, FitSettings, Kind, PlaneMeasure, RelativeMeasure } from '../../fitting/types'
import type { ParsedEquatorialRow, ParsedPlaneRow, ParsedRelativeRow, ParsedRow } from './parsed-row'
import { julianEpochFromBesselian } from '../../fitting/time'
import { julianDateOfIso } from './read-time'

const RAD_A_DEG = Math.PI / 180

interface Credit {
  id: string
  observer: string
}

export type FitMeasure = FitRequest['measures'][number]

/** A row as the engine takes it: degrees become radians, what was not given is left out. */
export function toFitMeasure(row: ParsedRelativeRow, id: string, observer: string): RelativeMeasure
export function toFitMeasure(row: ParsedEquatorialRow, id: string, observer: string): EquatorialMeasure
export function toFitMeasure(row: ParsedPlaneRow, id: string, observer: string): PlaneMeasure
export function toFitMeasure(row: ParsedRow, id: string, observer: string): FitMeasure
export function toFitMeasure(row: ParsedRow, id: string, observer: string): FitMeasure {
  if (row.kind === 'relative') return relativeMeasure(row, { id, observer })
  return row.kind === 'plane' ? planeMeasure(row, { id, observer }) : equatorialMeasure(row, { id, observer })
}

/** The engine's request; the measures are those of rows of this kind. */
export function fitRequestOf(kind: Kind, measures: readonly FitMeasure[], settings: FitSettings): FitRequest {
  return { kind, measures, settings } as FitRequest
}

function relativeMeasure(row: ParsedRelativeRow, credit: Credit): RelativeMeasure {
  return given({
    ...credit,
    station: row.stationText,
    epochYr: row.epochYr,
    nights: row.nights,
    method: row.method,
    thetaEquinoxYr: row.thetaFrame === null ? null : equinoxYrOf(row.thetaFrame, row.epochYr),
    position: positionOf(row),
  })
}

/** The equinox that a stated frame of θ means, Julian year; ICRS axes are those of J2000.0 within 0.02″. */
function equinoxYrOf(thetaFrame: string, epochYr: number): number {
  if (thetaFrame === 'of_date') return epochYr
  if (thetaFrame === 'ICRS' || thetaFrame === 'J2000') return 2000
  if (thetaFrame === 'B1950') return julianEpochFromBesselian(1950)
  return Number(thetaFrame)
}

function positionOf(row: ParsedRelativeRow): RelativeMeasure['position'] {
  if (row.rhoLimitArcsec !== null) return { form: 'limit', rhoLimitArcsec: row.rhoLimitArcsec }
  if (row.eastArcsec !== null && row.northArcsec !== null) {
    return given({
      form: 'rectangular' as const,
      eastArcsec: row.eastArcsec,
      northArcsec: row.northArcsec,
      sigmaEastArcsec: row.sigmaEastArcsec,
      sigmaNorthArcsec: row.sigmaNorthArcsec,
      correlation: row.correlation,
    })
  }
  return given({
    form: 'polar' as const,
    thetaRad: radians(row.thetaDeg),
    rhoArcsec: row.rhoArcsec,
    sigmaThetaRad: radians(row.sigmaThetaDeg),
    sigmaRhoArcsec: row.sigmaRhoArcsec,
    correlation: row.correlation,
    quadrant: row.quadrant,
  })
}

function equatorialMeasure(row: ParsedEquatorialRow, credit: Credit): EquatorialMeasure {
  return given({
    ...credit,
    station: row.stationText,
    jdUtc: julianDateOfIso(row.timeUtc),
    raRad: row.raDeg * RAD_A_DEG,
    decRad: row.decDeg * RAD_A_DEG,
    site: row.site,
    sigmaRaCosDecArcsec: row.sigmaRaCosDecArcsec,
    sigmaDecArcsec: row.sigmaDecArcsec,
    correlation: row.correlation,
    sigmaTimeS: row.sigmaTimeS,
    magnitude: row.mag,
    band: row.band,
    starCatalogue: row.starCatalogue,
    tracklet: row.tracklet,
  })
}

function planeMeasure(row: ParsedPlaneRow, credit: Credit): PlaneMeasure {
  return given({
    ...credit,
    epochYr: row.epochYr,
    phiRad: row.phiDeg * RAD_A_DEG,
    r: row.r,
    sigmaR: row.sigmaR,
    diameterArcmin: row.diameterArcmin,
    sigmaDiameterArcmin: row.sigmaDiameterArcmin,
  })
}

function radians(degrees: number | null): number | null {
  return degrees === null ? null : degrees * RAD_A_DEG
}

type Given<Fields> = { [Name in keyof Fields as null extends Fields[Name] ? never : Name]: Fields[Name] }
  & { [Name in keyof Fields as null extends Fields[Name] ? Name : never]?: Exclude<Fields[Name], null> }

/** The same object without the fields that are null, as the engine's types ask. */
function given<Fields extends object>(fields: Fields): Given<Fields> {
  return Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== null)) as Given<Fields>
}
