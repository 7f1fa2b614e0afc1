import type { MeasureColumn } from './columns'
import * as rules from './number-rules'
import type { Complaint } from './problems'
import { DEGREES, HOURS, readSexagesimal, type SexagesimalForm } from './read-sexagesimal'
import type { NumberRule, RowReader } from './row-reader'
import { SKY_SENTENCES, VALUE_SENTENCES } from './sentences'

interface Coordinate {
  decimal: MeasureColumn
  sexagesimal: MeasureColumn
  rule: NumberRule
  form: SexagesimalForm
  missing: () => Complaint
}

const RIGHT_ASCENSION: Coordinate = { decimal: 'ra_deg', sexagesimal: 'ra_hms', rule: rules.direction, form: HOURS, missing: SKY_SENTENCES.raMissing }
const DECLINATION: Coordinate = { decimal: 'dec_deg', sexagesimal: 'dec_dms', rule: rules.declination, form: DEGREES, missing: SKY_SENTENCES.decMissing }

/** Tables that give both forms round them differently; an arcsecond apart they say different places. */
const SAME_PLACE_DEG = 1 / 3600

/** Right ascension and declination in degrees; null where either is missing or wrong and complained of. */
export function readSkyPlace(row: RowReader): { raDeg: number; decDeg: number } | null {
  const ra = readCoordinate(row, RIGHT_ASCENSION)
  const decDeg = readCoordinate(row, DECLINATION)
  if (ra === rules.FULL_TURN_DEG) row.note('ra_deg', VALUE_SENTENCES.angleFullTurn())
  return ra === null || decDeg === null ? null : { raDeg: ra === rules.FULL_TURN_DEG ? 0 : ra, decDeg }
}

/** Where both forms are given and agree, hours or degrees with minutes and seconds count: decimals were made from them. */
function readCoordinate(row: RowReader, { decimal, sexagesimal, rule, form, missing }: Coordinate): number | null {
  if (!row.isFilled(decimal) && !row.isFilled(sexagesimal)) row.problems.error(decimal, null, missing())
  const decimalDeg = row.number(decimal, rule)
  const sexagesimalDeg = readSexagesimal(row, sexagesimal, form)
  if (decimalDeg === null || sexagesimalDeg === null) return sexagesimalDeg ?? decimalDeg
  const apart = Math.abs(decimalDeg - sexagesimalDeg) % rules.FULL_TURN_DEG
  if (Math.min(apart, rules.FULL_TURN_DEG - apart) <= SAME_PLACE_DEG) return sexagesimalDeg
  row.complain(sexagesimal, SKY_SENTENCES.formsDiffer(decimal, sexagesimal))
  return null
}
