/** SciPy beside the engine: the same systems, in the same run, by a small Python script. */
import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import type { RelativeMeasure } from '../../../fitting'

/** One system for SciPy: with `start` a refit in (ln P, e, T, A, B, F, G), with `shortest` a blind fit. */
export interface ScipyRequest {
  t: number[]
  north: number[]
  east: number[]
  sigma: number
  shortest?: number
  start?: number[]
}

export interface ScipyAnswer {
  chiSquare: number
  ms: number
}

/** Debian's own interpreter, which sees Debian's python3-scipy. */
const PYTHON = '/usr/bin/python3'
const HOW_TO_INSTALL = 'SciPy is not installed for /usr/bin/python3: apt-get install python3-scipy. Rows beside SciPy are left out.'
const ONE_THREAD = { OMP_NUM_THREADS: '1', OPENBLAS_NUM_THREADS: '1' }

/**
 * Is SciPy there?
 * @returns its version, or null after saying what to install.
 */
export function scipyVersion(): string | null {
  const { status, stdout } = spawnSync(PYTHON, ['-c', 'import scipy; print(scipy.__version__)'], { encoding: 'utf8' })
  if (status === 0) return stdout.trim()
  console.log(HOW_TO_INSTALL)
  return null
}

/** East and north of rectangular measures with one σ. */
export function scipyData(measures: readonly RelativeMeasure[]): Pick<ScipyRequest, 't' | 'north' | 'east' | 'sigma'> {
  const places = measures.map(({ position }) => {
    if (position.form !== 'rectangular') throw new Error('SciPy is given east and north only: draw the systems with form rectangular.')
    return position
  })
  return { t: measures.map((measure) => measure.epochYr), north: places.map((place) => place.northArcsec), east: places.map((place) => place.eastArcsec), sigma: places[0]!.sigmaEastArcsec! }
}

/**
 * Fits by SciPy.
 * @param requests systems.
 * @returns χ² and processor time of each, in the same order.
 * @throws Error with Python's own words where the script fails.
 */
export function fitByScipy(requests: readonly ScipyRequest[]): ScipyAnswer[] {
  const folder = mkdtempSync(join(tmpdir(), 'bench-fit-'))
  try {
    const file = join(folder, 'requests.json')
    writeFileSync(file, JSON.stringify(requests))
    const script = join(dirname(process.argv[1]!), 'fits/scipy_fits.py')
    const { status, stdout, stderr } = spawnSync(PYTHON, [script, file], { encoding: 'utf8', maxBuffer: 1 << 28, env: { ...process.env, ...ONE_THREAD } })
    if (status !== 0) throw new Error(`The Python script of the benchmark failed: ${stderr}`)
    return (JSON.parse(stdout) as { answers: ScipyAnswer[] }).answers
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}
