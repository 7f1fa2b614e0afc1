import { resolve } from 'node:path'
import { parseArgs } from 'node:util'
import { KINDS, type Kind } from '../../fitting/types'
import type { CellProblem } from '../../shared/schemas/batches'
import { argumentProblem } from './argument-problem'

export interface FitArguments {
  file: string
  kind: Kind | null
  target: string | null
  settingsFile: string | null
}

const USAGE = 'Use: npm run --silent fit -- FILE.csv [--kind relative|equatorial|plane] [--target NAME] [--settings FILE.json]'
const OPTIONS = { kind: { type: 'string' }, target: { type: 'string' }, settings: { type: 'string' } } as const

/** Reads the command line; files are taken from the folder in which the command was typed. */
export function readArguments(words: string[], folder: string): { ok: true, fitArguments: FitArguments } | { ok: false, problems: CellProblem[] } {
  const parsed = parse(words)
  if (typeof parsed === 'string') return { ok: false, problems: [argumentProblem(parsed, USAGE)] }
  const { values, positionals } = parsed
  const [file, ...more] = positionals
  if (file === undefined) return { ok: false, problems: [argumentProblem('No file was named.', USAGE)] }
  if (more.length > 0) return { ok: false, problems: [argumentProblem(`More than one file was named: ${positionals.join(', ')}.`, USAGE)] }
  if (values.kind !== undefined && !isKind(values.kind)) return { ok: false, problems: [argumentProblem(`"${values.kind}" is no kind of measure.`, USAGE)] }
  return {
    ok: true,
    fitArguments: {
      file: resolve(folder, file),
      kind: values.kind ?? null,
      target: values.target ?? null,
      settingsFile: values.settings === undefined ? null : resolve(folder, values.settings),
    },
  }
}

function parse(words: string[]) {
  try {
    return parseArgs({ args: words, options: OPTIONS, allowPositionals: true })
  } catch (error) {
    if (error instanceof TypeError) return error.message
    throw error
  }
}

function isKind(word: string): word is Kind {
  return (KINDS as readonly string[]).includes(word)
}
