import type { MeasureSite } from '../../fitting/types'
import type { MeasureColumn } from './columns'
import { KNOWN_STATION_CODES, knownStation } from './known-stations'
import * as rules from './number-rules'
import type { RowReader } from './row-reader'
import { SKY_SENTENCES } from './sentences'

const COORDINATES = ['lon_deg', 'lat_deg', 'height_m'] as const satisfies readonly MeasureColumn[]
const longitude = rules.within(-180, 360, 'deg')
const latitude = rules.within(-90, 90, 'deg')
const height = rules.within(-500, 9000, 'm')

/** What is kept of a place: 0.01° and 100 m, as it is published and fitted. Adding 0 makes −0 to 0. */
const KEPT_PER_DEG = 100
const KEPT_M = 100

/** Where the measure was made: by coordinates where the row gives them, else by the code of a known station. */
export function readSite(row: RowReader): MeasureSite | null {
  const missing = COORDINATES.filter(column => !row.isFilled(column))
  if (missing.length === COORDINATES.length) return readKnownStation(row)
  for (const column of missing) row.problems.error(column, null, SKY_SENTENCES.stationHalf(missing.join(' and ')))
  const longitudeEastDeg = row.number('lon_deg', longitude)
  const latitudeDeg = row.number('lat_deg', latitude)
  const heightM = row.number('height_m', height)
  if (longitudeEastDeg === null || latitudeDeg === null || heightM === null) return null
  const kept = { longitudeEastDeg: toHundredths(longitudeEastDeg), latitudeDeg: toHundredths(latitudeDeg), heightM: Math.round(heightM / KEPT_M) * KEPT_M + 0 }
  const isRounded = kept.longitudeEastDeg !== longitudeEastDeg || kept.latitudeDeg !== latitudeDeg || kept.heightM !== heightM
  if (isRounded) row.note('lon_deg', SKY_SENTENCES.stationRounded())
  return kept
}

function toHundredths(degrees: number): number {
  return Math.round(degrees * KEPT_PER_DEG) / KEPT_PER_DEG + 0
}

function readKnownStation(row: RowReader): MeasureSite | null {
  const code = row.written('station')
  const site = knownStation(code)
  if (site) return site
  if (code === '') row.problems.error('station', null, SKY_SENTENCES.stationMissing())
  else row.complain('station', SKY_SENTENCES.stationUnknown(KNOWN_STATION_CODES.join(', ')))
  return null
}
