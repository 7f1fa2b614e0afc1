import type { PlaneMeasure, RelativeMeasure } from '../../fitting/types'
import type { ParsedPlaneRow, ParsedRelativeRow, ParsedRow } from './parsed-row'

const RAD_A_DEG = Math.PI / 180

interface Credit {
  id: string
  observer: string
}

/** A row as the engine takes it: degrees become radians, what was not given is left out. */
export function toFitMeasure(row: ParsedRelativeRow, id: string, observer: string): RelativeMeasure
export function toFitMeasure(row: ParsedPlaneRow, id: string, observer: string): PlaneMeasure
export function toFitMeasure(row: ParsedRow, id: string, observer: string): RelativeMeasure | PlaneMeasure
export function toFitMeasure(row: ParsedRow, id: string, observer: string): RelativeMeasure | PlaneMeasure {
  return row.kind === 'relative' ? relativeMeasure(row, { id, observer }) : planeMeasure(row, { id, observer })
}

function relativeMeasure(row: ParsedRelativeRow, credit: Credit): RelativeMeasure {
  return given({ ...credit, station: row.stationText, epochYr: row.epochYr, nights: row.nights, position: positionOf(row) })
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
