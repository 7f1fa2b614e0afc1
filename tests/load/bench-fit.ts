/**
 * The engine's figures beside those to reach, and beside SciPy on the same measures in the same run:
 *   npm run bench:fit -- [SECTION …] [--systems 300] [--seed 1]
 * Without a section all run. Times are processor time of one process, which other work on the machine disturbs less than the clock.
 */
import { parseArgs } from 'node:util'
import { bytes, kepler } from './fits/engine-sections'
import { equatorial, planets } from './fits/equatorial-sections'
import { coverage } from './fits/coverage-section'
import { merging, robust, straight } from './fits/judgement-sections'
import { plane } from './fits/plane-sections'
import { blind, degenerate, refit, shortPeriods } from './fits/relative-sections'
import { scipyVersion } from './fits/scipy'
import { print, type Section } from './fits/table'

const SECTIONS: Record<string, Section> = {
  blind, 'short-periods': shortPeriods, refit, degenerate, robust, straight, coverage, equatorial, planets, plane, kepler, merging, bytes,
}

const { values, positionals } = parseArgs({ allowPositionals: true, options: { systems: { type: 'string', default: '300' }, seed: { type: 'string', default: '1' } } })
const [systems, seed] = [Number(values.systems), Number(values.seed)]
const unknown = positionals.filter((name) => !Object.hasOwn(SECTIONS, name))
if (unknown.length > 0 || !(systems >= 1) || !Number.isInteger(seed)) {
  console.error(`Use: npm run bench:fit -- [${Object.keys(SECTIONS).join(' | ')}] … [--systems 300] [--seed 1]${unknown.length > 0 ? `; there is no section ${unknown.join(', ')}` : ''}`)
  process.exit(64)
}
const scipy = scipyVersion()
console.log(`Seed ${seed}, ${systems} systems where a row names no other number${scipy === null ? '' : `, beside SciPy ${scipy}`}; medians of processor time`)
for (const [name, section] of Object.entries(SECTIONS)) {
  if (positionals.length > 0 && !positionals.includes(name)) continue
  console.log(`\n${name}`)
  print(section({ systems, seed, hasScipy: scipy !== null }))
}
