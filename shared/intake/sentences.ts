import type { Complaint } from './problems'

/** Every sentence that reading a file can say, in one place: first what is wrong and why, then what to do. */

export const FILE_SENTENCES = {
  empty: () => complain('The file is empty.', 'Choose the file that holds your measures: one row of column names, then one row a measure.'),
  binary: (what: string) => complain(`This is ${what}, not a text table.`, 'Save or export the table as CSV (plain text, comma separated) and send that file.'),
  encodingUnreadable: (encoding: string) => complain(`The text cannot be read as ${encoding}: some bytes have no meaning there.`, 'Save the file as UTF-8 and send it again.'),
  encodingAssumed: () => complain('The text is not UTF-8; it was read as Windows-1252, which is an assumption.', 'Look whether names with accents are right; if not, save the file as UTF-8.'),
  noDelimiter: (heading: string) => complain(`The first row, "${heading}", is a single column: no comma, semicolon or tab was found in it.`, 'Separate the columns by commas, semicolons or tabs.'),
  mixedDelimiters: (found: string) => complain(`The columns are separated in different ways: ${found}.`, 'Separate all columns of the file by the same character.'),
  quoteProblem: (row: number) => complain(`A quotation mark in row ${row} has no partner, or text follows its end.`, 'Close the quotation mark, or write it twice where it belongs to the text.'),
  headerMissing: () => complain('The first row holds numbers, not column names.', 'Put a row of column names on top, such as epoch,theta_deg,rho_arcsec.'),
  headerOnly: () => complain('There are column names, but no row below them.', 'Add one row a measure below the names.'),
  duplicateHeading: (name: string) => complain(`The column ${name} stands twice in the first row.`, 'Remove or rename one of the two; which to use cannot be guessed.'),
  columnMissing: (what: string, found: string) => complain(`No column says ${what}. Found: ${found}.`, `Name the column by one of the known names; ${what} is needed in every file.`),
  tooManyColumns: (columns: number, cap: number) => complain(`The first row has ${columns} columns; ${cap} are read at most.`, 'Leave out the columns that hold nothing of the measures.'),
  tooManyRows: (rows: number, cap: number) => complain(`The file has ${rows} rows of measures; ${cap} are read at once.`, 'Split it into several files.'),
  inManyRows: (note: Complaint, rows: number) => complain(`In ${rows} rows: ${note.reason}`, note.remedy),
  columnNotUsed: (nearest: string | null) => complain('This column is not used.', nearest ? `Did you mean ${nearest}? Rename the column if so.` : 'Nothing needs doing if that is right.'),
  columnOfOtherKind: (kind: string) => complain(`This column is not used: it belongs to measures of another kind, "${kind}".`, 'Choose that kind if it is what the file holds.'),
  fileOfOtherKind: (other: string, kind: string) => complain(`The columns are those of the kind "${other}", and the file was read as "${kind}".`, `Send the file again as "${other}".`),
} as const

export const ROW_SENTENCES = {
  tooManyCells: (cells: number, headings: number) => complain(`The row has ${cells} cells, the first row has ${headings} names.`, 'Put text that contains the separator in quotation marks, or remove what is too much.'),
  tooFewCells: (cells: number, headings: number) => complain(`The row ends after ${cells} of ${headings} cells; the others were taken as empty.`, 'Complete the row if something was lost.'),
  otherDelimiter: (used: string, expected: string) => complain(`This row is separated by ${used}, the first row by ${expected}.`, `Separate the row by ${expected}, as the first row is.`),
  duplicateOfRow: (row: number) => complain(`The same measure stands in row ${row} already.`, 'Remove one of the two; it will be counted once.'),
  textTooLong: (limit: number) => complain(`The text is longer than ${limit} characters.`, 'Shorten it.'),
} as const

export const NUMBER_SENTENCES = {
  notANumber: () => complain('not a number', 'Write digits with a dot, such as 0.94, or leave the cell empty.'),
  didYouMean: (guess: string) => complain('not a number', `Did you mean ${guess}?`),
  missingValue: () => complain('stands for no number', 'Leave the cell empty where nothing was measured.'),
  tooLarge: () => complain('too large for a number', 'Check the exponent.'),
  tooSmall: () => complain('too small to be told from zero', 'Check the exponent.'),
  decimalComma: (dotted: string) => complain('a comma inside a number, in a file separated by commas', `Write a dot, ${dotted}, or separate the columns by semicolons.`),
  thousands: () => complain('both comma and dot in one number', 'Write one dot for the decimals and nothing for the thousands.'),
  foreignDelimiter: (expected: string) => complain('a separator inside a number', `Separate the columns by ${expected}, as the first row is.`),
} as const

export const VALUE_SENTENCES = {
  angleRange: (wrapped: string) => complain('outside 0 to 360 degrees', `A direction runs from 0 up to 360. Did you mean ${wrapped}?`),
  angleFullTurn: () => complain('360 degrees is the same direction as 0; it was read as 0.', 'Nothing needs doing.'),
  separationZero: () => complain('a separation of zero', 'Not resolved? Leave theta_deg and rho_arcsec empty and give rho_limit_arcsec, the separation you would have seen.'),
  separationNegative: () => complain('a negative separation', 'A separation is above zero; turn θ by 180 degrees if the pair was exchanged.'),
  sigmaNotPositive: () => complain('a standard error is above zero', 'Give the standard error, or leave the cell empty where it is not known.'),
  correlationRange: () => complain('a correlation lies between −1 and 1, both excluded', 'Give the correlation, or leave the cell empty.'),
  correlationNeedsSigmas: (first: string, second: string) => complain('a correlation without both standard errors', `Give ${first} and ${second} as well, or leave the correlation empty.`),
  notPositive: () => complain('must be above zero', 'Check the value and its unit.'),
  nightsBelowOne: () => complain('fewer nights than one', 'Give the number of nights in the mean, 1 or more.'),
  outOfRange: (low: number, high: number, unit: string) => complain(`outside ${low} to ${high} ${unit}`, 'Check the value and its unit.'),
  unknownWord: (words: readonly string[]) => complain('not one of the known words', `Write ${words.slice(0, -1).join(', ')} or ${words.at(-1)}, or leave the cell empty.`),
  unknownFrame: () => complain('not a frame that is known', 'Write of_date, ICRS, J2000, B1950 or a year such as 1975, or leave the cell empty.'),
  sigmaWithoutValue: (value: string) => complain(`a standard error without ${value}; it is not used`, `Give ${value} as well if it was measured.`),
} as const

export const EPOCH_SENTENCES = {
  missing: () => complain('no time of the measure', 'Give one of epoch, jd, mjd or date.'),
  twice: (columns: string) => complain(`the time is given more than once: ${columns}`, 'Keep one of them in this row and leave the others empty.'),
  notAnEpoch: () => complain('not a year', 'Write a year with decimals, such as 2026.72, or with a prefix, B1950.0 or J2000.0.'),
  maybeMjd: () => complain('not a year from 1600 to 2500', 'A year? Write it with four digits before the dot. A modified Julian date goes in the column mjd.'),
  maybeJd: () => complain('not a year from 1600 to 2500', 'A Julian date goes in the column jd.'),
  maybeDate: () => complain('a date, not a year', 'A date goes in the column date.'),
  yearRange: () => complain('not a year from 1600 to 2500', 'Check the digits of the year.'),
  yearInDayColumn: () => complain('looks like a year', 'A year goes in the column epoch.'),
  jdRange: () => complain('not a Julian date of the years 1600 to 2500', 'Check the digits; a modified Julian date goes in the column mjd.'),
  mjdRange: () => complain('not a modified Julian date of the years 1600 to 2500', 'Check the digits; a Julian date goes in the column jd.'),
  notADate: () => complain('not a date in ISO 8601', 'Write year-month-day, 2026-11-28, with a time in UTC if you have it, 2026-11-28T21:30Z.'),
  noSuchDay: (month: string, days: number) => complain(`${month} has ${days} days`, 'Check the day.'),
  noSuchMonth: () => complain('there are twelve months', 'Write year-month-day, such as 2026-11-28.'),
  noSuchTime: () => complain('not a time of day', 'Hours run to 23, minutes and seconds to 59.'),
  inFuture: () => complain('later than today', 'Check the year; it may be mistyped.'),
} as const

export const POSITION_SENTENCES = {
  nothing: () => complain('nothing measured in this row', 'Give theta_deg and rho_arcsec, or east_arcsec and north_arcsec, or rho_limit_arcsec where the pair was not resolved.'),
  limitAndPosition: () => complain('both a position and a limit', 'Keep the position, or leave it empty and keep rho_limit_arcsec where the pair was not resolved.'),
  polarAndRectangular: () => complain('θ, ρ and east, north say different positions', 'Keep one of the two and leave the other empty.'),
  polarRepeats: () => complain('θ, ρ and east, north say the same position; east and north are used.', 'Nothing needs doing.'),
  halfRectangular: (given: string, missing: string) => complain(`${given} without ${missing}`, `Give ${missing} as well.`),
  planeDirection: () => complain('no direction in the plane of the orbit', 'Give phi_deg.'),
  planeNothing: () => complain('no distance', 'Give r or diameter_arcmin.'),
  planeBoth: () => complain('both r and diameter_arcmin', 'Keep one of the two and leave the other empty.'),
} as const

export const SKY_SENTENCES = {
  timeMissing: () => complain('no time of the measure', 'Give time_utc, the middle of the exposure.'),
  notATime: () => complain('not a time in ISO 8601', 'Write 2026-03-14T12:17:46.2Z, or the date with a fraction of the day, 2026-03-14.51234.'),
  timeOfDayMissing: () => complain('a date without a time of day', 'Give the middle of the exposure in UTC, such as 2026-03-14T12:17:46Z or 2026-03-14.51234: a body that moves has a place only at a time.'),
  yearRange: (first: number, last: number) => complain(`not a year from ${first} to ${last}`, 'Check the digits of the year.'),
  raMissing: () => complain('no right ascension', 'Give ra_deg in degrees, or ra_hms in hours, minutes and seconds.'),
  decMissing: () => complain('no declination', 'Give dec_deg in degrees, or dec_dms in degrees, minutes and seconds.'),
  decRange: () => complain('outside −90 to 90 degrees', 'A declination runs from −90 at the south pole of the sky to 90 at the north pole. Check the sign and the digits.'),
  hoursRange: () => complain('outside 0 to 24 hours', 'Hours of right ascension run from 0 to 23; 24 h is 00 h.'),
  minutesRange: () => complain('minutes or seconds of 60 or more', 'Minutes and seconds run from 0 to 59; check the digits.'),
  notSexagesimal: (example: string) => complain('not written as three numbers', `Write it as ${example}, with blanks or colons between.`),
  degreesInHms: () => complain('a single number, not hours, minutes and seconds', 'Write 02 46 50.07. Degrees with decimals go in the column ra_deg.'),
  degreesInDms: () => complain('a single number, not degrees, minutes and seconds', 'Write +15 12 57.5. Degrees with decimals go in the column dec_deg.'),
  formsDiffer: (first: string, second: string) => complain(`${first} and ${second} say different places`, 'Keep one of the two and leave the other empty.'),
  stationMissing: () => complain('no station', 'Give the code of a known station in the column station, or lon_deg, lat_deg and height_m.'),
  stationUnknown: (known: string) => complain('not a station whose place is known here', `Give lon_deg (east positive), lat_deg and height_m as well. Known by code: ${known}.`),
  stationHalf: (missing: string) => complain('the place of the station is not complete', `Give ${missing} as well.`),
  stationRounded: () => complain('The place of the station is kept to 0.01° and 100 m, so that nobody reads from it where somebody lives. The error of that stays below 0.002″ beyond 1 au.', 'Nothing needs doing.'),
} as const

function complain(reason: string, remedy: string): Complaint {
  return { reason, remedy }
}
