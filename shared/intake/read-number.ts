import { DELIMITERS, delimiterWord, type Delimiter } from './delimiter'
import type { Complaint } from './problems'
import { NUMBER_SENTENCES } from './sentences'

export interface NumberStyle {
  /** 62,41 is a number: true where commas do not separate the columns. */
  allowsDecimalComma: boolean
  /** How the file separates its columns; undefined where a single cell is read. */
  delimiter?: Delimiter
}

export type ReadNumber = { ok: true; value: number } | { ok: false; complaint: Complaint }

const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?$/i
const WITH_DECIMAL_COMMA = /^[+-]?\d*,\d+(?:e[+-]?\d+)?$/i
const COMMA_AND_DOT = /^[+-]?\d[\d.,]*$/
const NO_NUMBER = /^(?:[+-]?(?:nan|inf|infinity)|n\/?a|null|none|-+|\?+)$/i
/** No number that means anything is longer; looking for what was meant is worth it for short texts only. */
const LONGEST_NUMBER = 60
/** Beyond this the database refuses a value too. */
const LARGEST = 1e300

/** Reads the text of a cell as a number; the text is not empty. A comma among digits is a decimal comma only where the style says so. */
export function readNumber(text: string, style: NumberStyle): ReadNumber {
  const written = text.trim().replace(/[−–]/g, '-')
  if (written.length > LONGEST_NUMBER) return refuse(NUMBER_SENTENCES.notANumber())
  const dotted = WITH_DECIMAL_COMMA.test(written) ? written.replace(',', '.') : written
  if (dotted !== written && !style.allowsDecimalComma) return refuse(NUMBER_SENTENCES.decimalComma(dotted))
  if (!NUMBER.test(dotted)) return refuse(complaintAbout(dotted, style))
  const value = Number(dotted)
  if (!(Math.abs(value) <= LARGEST)) return refuse(NUMBER_SENTENCES.tooLarge())
  if (value === 0 && /[1-9]/.test(dotted.replace(/e.*$/i, ''))) return refuse(NUMBER_SENTENCES.tooSmall())
  return { ok: true, value: value === 0 ? 0 : value }
}

function refuse(complaint: Complaint): ReadNumber {
  return { ok: false, complaint }
}

function complaintAbout(written: string, style: NumberStyle): Complaint {
  if (NO_NUMBER.test(written)) return NUMBER_SENTENCES.missingValue()
  if (style.delimiter && Object.values(DELIMITERS).some(mark => mark !== ',' && written.includes(mark))) {
    return NUMBER_SENTENCES.foreignDelimiter(delimiterWord(style.delimiter))
  }
  if (COMMA_AND_DOT.test(written) && written.includes(',')) return NUMBER_SENTENCES.thousands()
  const guess = likelyNumber(written)
  return guess === null ? NUMBER_SENTENCES.notANumber() : NUMBER_SENTENCES.didYouMean(guess)
}

/** What was probably meant: letters that look like digits, spaces inside, a unit behind. */
function likelyNumber(written: string): string | null {
  const guess = written
    .replace(/\s*(?:°|deg|["″”]|''|arcsec|arcmin|['′]|yr|mas|m)$/i, '')
    .replace(/[oO]/g, '0')
    .replace(/[lI|]/g, '1')
    .replace(/\s+/g, '')
    .replace(/^[:~<>≈]/, '')
    .replace(/[:?*]$/, '')
    .replace(/^([+-]?\d*),(\d+)$/, '$1.$2')
  return guess !== written && NUMBER.test(guess) && Number.isFinite(Number(guess)) ? guess : null
}
