// npm run check: installs what is missing, then lint, types and every suite. Its last line is "N passed, N failed",
// the sums of the runners' own reports; a suite that did not run, or ran no test, counts as one failed.
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { ensureBuilt } from './setup/ensure-built.mjs'
import { ensureInstalled } from './setup/ensure-installed.mjs'
import { ensureSystemPackages } from './setup/ensure-system-packages.mjs'
import { CACHE, inRoot } from './setup/paths.mjs'
import { runCommand } from './setup/run-command.mjs'

const SUITES = ['unit', 'reference', 'architecture', 'integration', 'e2e']
const totals = { passed: 0, failed: 0 }
/** @type {string[]} */
const lines = []

/**
 * @param {string} name
 * @param {number} passed
 * @param {number} failed
 * @param {number} startedMs
 */
function count(name, passed, failed, startedMs) {
  totals.passed += passed
  totals.failed += failed
  lines.push(`${failed ? '✗' : '✓'} ${name.padEnd(14)} ${String(passed).padStart(5)} passed ${String(failed).padStart(4)} failed  ${Math.round((Date.now() - startedMs) / 1000)} s`)
}

/**
 * A tool without a count of its own: one failed where it fails, nothing where it passes.
 * @param {string} name
 * @param {string} script below node_modules
 * @param {string[]} args
 */
async function runTool(name, script, args) {
  const startedMs = Date.now()
  console.log(`\n— ${name}`)
  count(name, 0, await runCommand(process.execPath, [inRoot('node_modules', script), ...args]) === 0 ? 0 : 1, startedMs)
}

/** @param {string} name */
async function runSuite(name) {
  const startedMs = Date.now()
  console.log(`\n— ${name} tests`)
  const report = join(CACHE, `report-${name}.json`)
  rmSync(report, { force: true })
  const code = await runCommand(process.execPath, [inRoot('node_modules', 'vitest', 'vitest.mjs'), 'run', '--project', name, '--reporter=default', '--reporter=json', `--outputFile.json=${report}`])
  if (!existsSync(report)) return count(name, 0, 1, startedMs)
  const { numPassedTests, numFailedTests, numPendingTests, numTodoTests } = JSON.parse(readFileSync(report, 'utf8'))
  // A test that was skipped or is still to be written has not passed.
  let failed = numFailedTests + numPendingTests + numTodoTests
  if (failed === 0 && (code !== 0 || numPassedTests === 0)) failed = 1
  count(name, numPassedTests, failed, startedMs)
}

async function main() {
  await ensureSystemPackages()
  await ensureInstalled()
  mkdirSync(CACHE, { recursive: true })
  await runTool('lint', 'eslint/bin/eslint.js', ['.'])
  await runTool('types', 'vue-tsc/bin/vue-tsc.js', ['-b', '--noEmit'])
  for (const name of SUITES) {
    if (name === 'e2e') await ensureBuilt()
    await runSuite(name)
  }
}

/** @type {unknown} */
let broken = null
try {
  await main()
}
catch (error) {
  broken = error
  totals.failed += 1
}
console.log(`\n${lines.join('\n')}\n`)
if (broken) console.log(`${broken instanceof Error ? broken.message : broken}\n`)
console.log(`${totals.passed} passed, ${totals.failed} failed`)
process.exit(totals.failed ? 1 : 0)
