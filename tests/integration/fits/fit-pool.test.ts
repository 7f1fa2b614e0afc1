import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { build } from 'esbuild'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { fitOrbit } from '../../../fitting'
import type { FitRequest, Progress } from '../../../fitting/types'
import { createFitPool } from '../../../server/jobs/runner/fit-pool'
import type { FitPool } from '../../../server/jobs/runner/fit-pool'
import { TRUE_PAIR } from '../../builders/published-pair'
import { simulatePair } from '../../builders/simulated-measures'

let folder: string
let workerUrl: string
let pool: FitPool
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'semilatus-worker-'))
  const outfile = join(folder, 'fit.mjs')
  await build({ entryPoints: [fileURLToPath(new URL('../../../server/jobs/workers/fit.ts', import.meta.url))], outfile, bundle: true, platform: 'node', format: 'esm' })
  workerUrl = pathToFileURL(outfile).href
  pool = createFitPool({ workerUrl })
})
afterAll(async () => {
  await pool.close()
  await rm(folder, { recursive: true, force: true })
})

function requestOf(count: number): FitRequest {
  const noise = { sigmaThetaDeg: 0.8, sigmaRhoArcsec: 0.012, seed: 3 }
  const measures = simulatePair(TRUE_PAIR, Array.from({ length: count }, (_, k) => 1974.2 + 50 * k / count + 0.2 * Math.sin(k)), noise)
  return {
    kind: 'relative',
    measures: measures.map(({ epochYr, thetaDeg, rhoArcsec }, k) => ({
      id: `m${k}`, observer: 'T. Orrowin', epochYr, position: { form: 'polar', thetaRad: thetaDeg * Math.PI / 180, rhoArcsec, sigmaThetaRad: 0.014, sigmaRhoArcsec: 0.012 },
    })),
  }
}
const never = () => new AbortController().signal

describe('the pool of fits', () => {
  it('gives the same result to the last bit as the engine in this thread, and its progress, which never falls', async () => {
    const steps: Progress[] = []
    const outcome = await pool.computeFit(requestOf(24), { onProgress: step => steps.push(step), signal: never() })
    expect(JSON.stringify(outcome)).toBe(JSON.stringify(fitOrbit(requestOf(24))))
    expect(steps[0]!.stage).toBe('reading')
    expect(steps.map(step => step.fraction)).toEqual([...steps.map(step => step.fraction)].sort((a, b) => a - b))
  })

  it('passes a refusal on', async () => {
    const refused = await pool.computeFit(requestOf(2), { onProgress: () => {}, signal: never() })
    expect(refused).toMatchObject({ ok: false, refusal: { code: 'too-few-measures' } })
  })

  it('ends a fit in the middle when it is told to, and takes the next one', async () => {
    const stopping = new AbortController()
    const running = pool.computeFit(requestOf(4000), { onProgress: () => stopping.abort(new Error('enough')), signal: stopping.signal })
    await expect(running).rejects.toThrow('enough')
    expect(await pool.computeFit(requestOf(24), { onProgress: () => {}, signal: never() })).toMatchObject({ ok: true })
  })

  it('makes a fit that runs out of time a refusal with its reason', async () => {
    const hasty = createFitPool({ workerUrl, timeLimitMs: 1 })
    expect(await hasty.computeFit(requestOf(4000), { onProgress: () => {}, signal: never() })).toMatchObject({ ok: false, refusal: { code: 'time-limit' } })
    await hasty.close()
  })

  it('rejects where the worker itself breaks down, so that the job is tried again', async () => {
    const broken = createFitPool({ workerUrl: pathToFileURL(join(folder, 'nowhere.mjs')).href })
    await expect(broken.computeFit(requestOf(24), { onProgress: () => {}, signal: never() })).rejects.toThrow()
    await broken.close()
  })
})
