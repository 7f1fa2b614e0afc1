import type { CellProblem } from '../schemas/batches'
import { knownBinary, firstControlCode, nulPattern } from './byte-patterns'
import { asNote, fileProblem } from './problems'
import { FILE_SENTENCES } from './sentences'

export type DecodedText =
  | { ok: true; text: string; encoding: string; note: CellProblem | null }
  | { ok: false; problem: CellProblem }

const BYTE_ORDER_MARKS = [
  { encoding: 'UTF-32', bytes: [0xFF, 0xFE, 0x00, 0x00] },
  { encoding: 'UTF-32', bytes: [0x00, 0x00, 0xFE, 0xFF] },
  { encoding: 'UTF-8', bytes: [0xEF, 0xBB, 0xBF] },
  { encoding: 'UTF-16LE', bytes: [0xFF, 0xFE] },
  { encoding: 'UTF-16BE', bytes: [0xFE, 0xFF] },
]

/**
 * Turns a file's bytes into text: by its byte order mark, else as strict UTF-8, else by the pattern of NUL bytes as UTF-16,
 * else as Windows-1252, which is an assumption and is said to be one. What is not text is refused by name.
 */
export function decodeText(bytes: Uint8Array): DecodedText {
  if (bytes.length === 0) return refuse(fileProblem(FILE_SENTENCES.empty()))
  const mark = BYTE_ORDER_MARKS.find(candidate => candidate.bytes.every((byte, i) => bytes[i] === byte))
  if (mark?.encoding === 'UTF-32') return refuse(fileProblem(FILE_SENTENCES.encodingUnreadable('UTF-32')))
  if (mark) return strictly(bytes.subarray(mark.bytes.length), mark.encoding)
  const format = knownBinary(bytes)
  if (format) return refuse(fileProblem(FILE_SENTENCES.binary(format)))
  const wide = nulPattern(bytes)
  if (wide) return strictly(bytes, wide)
  const utf8 = decodeStrictly(bytes, 'utf-8')
  if (utf8 !== null) return accept(utf8, 'UTF-8')
  const note = asNote(fileProblem(FILE_SENTENCES.encodingAssumed()))
  return accept(new TextDecoder('windows-1252').decode(bytes), 'Windows-1252', note)
}

function refuse(problem: CellProblem): DecodedText {
  return { ok: false, problem }
}

function strictly(bytes: Uint8Array, encoding: string): DecodedText {
  const text = decodeStrictly(bytes, encoding.toLowerCase())
  return text === null ? refuse(fileProblem(FILE_SENTENCES.encodingUnreadable(encoding))) : accept(text, encoding)
}

function decodeStrictly(bytes: Uint8Array, label: string): string | null {
  try {
    return new TextDecoder(label, { fatal: true, ignoreBOM: true }).decode(bytes)
  } catch (error) {
    if (error instanceof TypeError) return null
    throw error
  }
}

function accept(text: string, encoding: string, note: CellProblem | null = null): DecodedText {
  const control = firstControlCode(text)
  if (control !== null) return refuse(fileProblem(FILE_SENTENCES.binary(`a binary file (it holds the control character ${control})`)))
  if (text.trim() === '') return refuse(fileProblem(FILE_SENTENCES.empty()))
  return { ok: true, text, encoding, note }
}
