/**
 * npm run --silent fit -- FILE.csv [--kind relative|equatorial|plane] [--target NAME] [--settings FILE.json]
 *
 * Reads a file of measures as the upload page does and prints the fit as JSON on standard output. Exit codes: 0 fitted;
 * 2 the file could not be read as measures, or holds more than one target and none was chosen (problems as JSON on standard
 * error); 3 measures read, but no fit (the refusal as JSON on standard error). A row with an error is not passed over: it is mended first.
 */
import { fitOrbit } from '../fitting'
import { readArguments } from './fit/read-arguments'
import { readRequest } from './fit/read-request'

const UNREADABLE = 2
const NO_FIT = 3

function print(stream: NodeJS.WriteStream, content: unknown): void {
  stream.write(`${JSON.stringify(content, null, 2)}\n`)
}

function run(): number {
  const read = readArguments(process.argv.slice(2), process.env.INIT_CWD ?? process.cwd())
  const prepared = read.ok ? readRequest(read.fitArguments) : read
  if (!prepared.ok) {
    print(process.stderr, { problems: prepared.problems })
    return UNREADABLE
  }
  if (prepared.notes.length > 0) print(process.stderr, { notes: prepared.notes })
  const outcome = fitOrbit(prepared.request)
  if (!outcome.ok) {
    print(process.stderr, { refusal: outcome.refusal })
    return NO_FIT
  }
  print(process.stdout, outcome.result)
  return 0
}

process.exitCode = run()
