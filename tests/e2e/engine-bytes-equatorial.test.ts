import { fileURLToPath } from 'node:url'
import { build } from 'esbuild'
import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { fitOrbit, predict, type FitOutcome, type FitRequest, type Prediction } from '../../fitting'
import { ORBIT_CLASSES, simulatedSightings } from '../builders/simulated-sightings'
import { startBrowser } from './support/browser'

const ENGINE = fileURLToPath(new URL('../../fitting/index.ts', import.meta.url))
const AT_JD_TT = 2457000.5

interface Engine {
  fitOrbit: (request: FitRequest) => FitOutcome
  predict: (result: { kind: 'equatorial', state: never }, at: number[]) => Prediction[]
}

/** Requests are drawn here and handed over: drawing them uses functions that differ between engines. */
function drawnRequests(): FitRequest[] {
  return Array.from({ length: 40 }, (_, i): FitRequest => {
    const { measures } = simulatedSightings({ seed: 300 + i, orbitClass: ORBIT_CLASSES[i % ORBIT_CLASSES.length]!, count: [3, 6, 12, 20][i % 4]! })
    return { kind: 'equatorial', measures: i % 5 === 1 ? measures.map(measure => ({ ...measure, sigmaTimeS: 2 })) : measures, settings: i % 7 === 3 ? { conicClass: 'parabola' } : {} }
  })
}

describe('the engine in Chromium, for bodies about the Sun', () => {
  let browser: Browser

  beforeAll(async () => {
    browser = await startBrowser()
  })
  afterAll(() => browser.close())

  it('gives the same bytes as in Node, places ahead with them', async () => {
    const { outputFiles } = await build({ entryPoints: [ENGINE], bundle: true, write: false, format: 'iife', globalName: 'engine', target: 'es2022' })
    const requests = drawnRequests()
    const here = requests.map((request) => {
      const outcome = fitOrbit(request)
      return JSON.stringify(outcome.ok ? [outcome, predict(outcome.result, [AT_JD_TT])] : outcome)
    })
    const page = await browser.newPage()
    await page.addScriptTag({ content: outputFiles[0]!.text })
    const there = await page.evaluate(([all, at]) => {
      const { engine } = globalThis as unknown as { engine: Engine }
      return (JSON.parse(all) as FitRequest[]).map((request) => {
        const outcome = engine.fitOrbit(request)
        return JSON.stringify(outcome.ok ? [outcome, engine.predict(outcome.result as never, [at])] : outcome)
      })
    }, [JSON.stringify(requests), AT_JD_TT] as const)
    expect(there).toHaveLength(40)
    expect(there.map((text, i) => text === here[i] ? null : i).filter(i => i !== null)).toEqual([])
  })
})
