import type { MeasureColumn } from './columns'
import type { Complaint } from './problems'
import type { RowReader } from './row-reader'
import { SKY_SENTENCES } from './sentences'

export interface SexagesimalForm {
  /** Degrees in one of the leading units: 15 for hours, 1 for degrees. */
  unitDeg: number
  /** The leading unit runs from 0 to this; the last value itself only with nothing behind it where `includesLast`. */
  last: number
  includesLast: boolean
  isSigned: boolean
  outOfRange: () => Complaint
  singleNumber: () => Complaint
  example: string
}

export const HOURS: SexagesimalForm = {
  unitDeg: 15, last: 24, includesLast: false, isSigned: false,
  outOfRange: SKY_SENTENCES.hoursRange, singleNumber: SKY_SENTENCES.degreesInHms, example: '02 46 50.07',
}
export const DEGREES: SexagesimalForm = {
  unitDeg: 1, last: 90, includesLast: true, isSigned: true,
  outOfRange: SKY_SENTENCES.decRange, singleNumber: SKY_SENTENCES.degreesInDms, example: '+15 12 57.5',
}

/** Blanks, colons, or the letters and signs of the units stand between the numbers. */
const PARTS = /^([+-]?)\s*(\d{1,3})\s*[\s:hd°]\s*(\d{1,2})\s*[\s:m'′]\s*(\d{1,2}(?:[.,]\d{0,10})?)\s*(?:s|"|″|'')?$/i
const SINGLE = /^[+-]?\d+(?:[.,]\d*)?$/

/** An angle of three numbers, in degrees; the sign counts for −00 as well. Null where the cell is empty, or wrong and complained of. */
export function readSexagesimal(row: RowReader, column: MeasureColumn, form: SexagesimalForm): number | null {
  const written = row.written(column)
  if (written === '') return null
  const angle = angleOf(written.replace(/[−–]/g, '-'), form)
  if (typeof angle === 'number') return angle
  row.complain(column, angle)
  return null
}

function angleOf(text: string, form: SexagesimalForm): number | Complaint {
  const match = PARTS.exec(text)
  if (!match) return SINGLE.test(text) ? form.singleNumber() : SKY_SENTENCES.notSexagesimal(form.example)
  const [, sign, leading, minutes, seconds] = match
  const [units, sixtieths, rest] = [Number(leading), Number(minutes), Number(seconds!.replace(',', '.'))]
  if (sign === '-' && !form.isSigned) return form.outOfRange()
  if (sixtieths >= 60 || rest >= 60) return SKY_SENTENCES.minutesRange()
  const size = units + (sixtieths * 60 + rest) / 3600
  if (form.includesLast ? size > form.last : size >= form.last) return form.outOfRange()
  const angleDeg = size * form.unitDeg
  return sign === '-' && angleDeg > 0 ? -angleDeg : angleDeg
}
