import { canonicalHeading } from './columns'
import type { Complaint } from './problems'
import { FILE_SENTENCES } from './sentences'

export const DELIMITERS = { comma: ',', semicolon: ';', tab: '\t' } as const
export type Delimiter = keyof typeof DELIMITERS
const NAMES = Object.keys(DELIMITERS) as Delimiter[]
const WORDS: Record<Delimiter, string> = { comma: 'commas', semicolon: 'semicolons', tab: 'tabs' }

export function delimiterWord(delimiter: Delimiter): string {
  return WORDS[delimiter]
}

/** Text in quotation marks does not separate columns. */
const withoutQuoted = (line: string) => line.replace(/"[^"]*"/g, '""')

/** Which separators stand in a line outside quotation marks. */
export function delimitersIn(line: string): Delimiter[] {
  const bare = withoutQuoted(line)
  return NAMES.filter(name => bare.includes(DELIMITERS[name]))
}

/**
 * How the columns are separated, judged by the row of names: the one separator that stands there, or among several the one
 * that gives the most known names, unless splitting at all of them would give more.
 */
export function findDelimiter(headerLine: string, knownNames: ReadonlySet<string>): { ok: true; delimiter: Delimiter } | { ok: false; complaint: Complaint } {
  const present = delimitersIn(headerLine)
  if (present.length === 0) return { ok: false, complaint: FILE_SENTENCES.noDelimiter(headerLine.trim().slice(0, 80)) }
  if (present.length === 1) return { ok: true, delimiter: present[0]! }
  const known = (splitter: string | RegExp) => headerLine.split(splitter).filter(cell => knownNames.has(canonicalHeading(cell.replace(/"/g, '')))).length
  const ranked = present.map(name => ({ name, known: known(DELIMITERS[name]) })).sort((a, b) => b.known - a.known)
  if (known(/[,;\t]/) > ranked[0]!.known) {
    return { ok: false, complaint: FILE_SENTENCES.mixedDelimiters(`${present.map(delimiterWord).join(' and ')} in the first row`) }
  }
  return { ok: true, delimiter: ranked[0]!.name }
}
