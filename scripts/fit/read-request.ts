import type { FitRequest, FitSettings, Kind } from '../../fitting/types'
import { guessKind } from '../../shared/intake/columns'
import { decodeText } from '../../shared/intake/decode-text'
import { readMeasures, type MeasureRow } from '../../shared/intake/read-measures'
import { readTable } from '../../shared/intake/read-table'
import { fitRequestOf, toFitMeasure } from '../../shared/intake/to-fit-measure'
import { fileProblem } from '../../shared/intake/problems'
import { isAvailableKind, KIND_COMING } from '../../shared/schemas/available-kinds'
import type { CellProblem } from '../../shared/schemas/batches'
import { runAtOnce } from '../../shared/turns/turns'
import { argumentProblem } from './argument-problem'
import { chooseTarget } from './choose-target'
import type { FitArguments } from './read-arguments'
import { readBytes } from './read-bytes'

export type PreparedRequest = { ok: true, request: FitRequest, notes: CellProblem[] } | { ok: false, problems: CellProblem[] }

/** Who measured where the file does not say. */
const UNNAMED_OBSERVER = 'unnamed'

/** Reads the files named on the command line into what the engine is asked. */
export function readRequest({ file, kind, target, settingsFile }: FitArguments): PreparedRequest {
  const settings = settingsFile === null ? { ok: true as const, settings: {} } : readSettings(settingsFile)
  if (!settings.ok) return settings
  const read = readBytes(file)
  if (!read.ok) return read
  const ofKind = kind ?? kindOf(read.bytes)
  if (!isAvailableKind(ofKind)) return { ok: false, problems: [fileProblem(KIND_COMING)] }
  const { fileProblems, rows } = readMeasures(read.bytes, { kind: ofKind })
  if (rows.length === 0) return { ok: false, problems: fileProblems }
  const chosen = chooseTarget(rows, target)
  if (!chosen.ok) return chosen

  const problems = chosen.rows.flatMap(row => row.problems)
  if (problems.some(isError)) return { ok: false, problems: [...fileProblems, ...problems] }
  return { ok: true, request: toRequest(ofKind, chosen.rows, settings.settings), notes: [...fileProblems, ...problems] }
}

const isError = (problem: CellProblem) => problem.severity === 'error'

function kindOf(bytes: Uint8Array): Kind {
  const decoded = decodeText(bytes)
  const read = decoded.ok ? runAtOnce(readTable(decoded.text)) : null
  return read?.ok ? guessKind(read.table.headings) : 'relative'
}

/** A repeated measure counts once; its row has a note that says so. */
function toRequest(kind: Kind, rows: MeasureRow[], settings: FitSettings): FitRequest {
  const measures = rows.flatMap(({ parsed, rowNumber, duplicateOfRow }) =>
    parsed && duplicateOfRow === null ? [toFitMeasure(parsed, `row-${rowNumber}`, parsed.observerName ?? UNNAMED_OBSERVER)] : [])
  return fitRequestOf(kind, measures, settings)
}

function readSettings(file: string): { ok: true, settings: FitSettings } | { ok: false, problems: CellProblem[] } {
  const read = readBytes(file)
  if (!read.ok) return read
  const refuse = (why: string) => ({ ok: false as const, problems: [argumentProblem(`The settings in ${file} cannot be used: ${why}.`, 'Write a JSON object, such as {"loss": "huber"}.')] })
  try {
    const settings: unknown = JSON.parse(new TextDecoder().decode(read.bytes))
    const isObject = typeof settings === 'object' && settings !== null && !Array.isArray(settings)
    return isObject ? { ok: true, settings: settings as FitSettings } : refuse('not an object')
  } catch (error) {
    return refuse((error as Error).message)
  }
}
