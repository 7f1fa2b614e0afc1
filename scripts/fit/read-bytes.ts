import { readFileSync, statSync } from 'node:fs'
import { UPLOAD_CAP_BYTES, type CellProblem } from '../../shared/schemas/batches'
import { argumentProblem } from './argument-problem'

const REMEDY = 'Check the name; it is looked up in the folder in which the command was typed.'

/** The bytes of a file, or why they cannot be had. The cap is that of the upload page. */
export function readBytes(file: string): { ok: true, bytes: Uint8Array } | { ok: false, problems: CellProblem[] } {
  const refuse = (reason: string, remedy: string) => ({ ok: false as const, problems: [argumentProblem(reason, remedy)] })
  const stats = statSync(file, { throwIfNoEntry: false })
  if (!stats) return refuse(`There is no file ${file}.`, REMEDY)
  if (!stats.isFile()) return refuse(`${file} is not a file.`, REMEDY)
  if (stats.size > UPLOAD_CAP_BYTES) return refuse(`${file} has ${stats.size} bytes; ${UPLOAD_CAP_BYTES} are read at once.`, 'Split it into several files.')
  try {
    return { ok: true, bytes: readFileSync(file) }
  } catch (error) {
    return refuse(`${file} cannot be opened: ${(error as Error).message}.`, 'Check whether you may read it.')
  }
}
