import { fileURLToPath } from 'node:url'
import { build } from 'esbuild'
import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { goldenTexts } from '../builders/engine-golden'
import { goldenHashes } from '../builders/golden-hashes'
import { startBrowser } from './support/browser'

const GOLDEN = fileURLToPath(new URL('../builders/engine-golden.ts', import.meta.url))

describe('the engine in Chromium', () => {
  let browser: Browser

  beforeAll(async () => {
    browser = await startBrowser()
  })
  afterAll(() => browser.close())

  it('gives the same bytes as in Node for two hundred requests', async () => {
    const { outputFiles } = await build({ entryPoints: [GOLDEN], bundle: true, write: false, format: 'iife', globalName: 'golden', target: 'es2022' })
    const page = await browser.newPage()
    await page.addScriptTag({ content: outputFiles[0]!.text })
    const inChromium = await page.evaluate(() => (globalThis as unknown as { golden: { goldenTexts(): string[] } }).golden.goldenTexts())
    const [here, there] = [goldenHashes(goldenTexts()), goldenHashes(inChromium)]
    expect(there.each).toHaveLength(200)
    expect(there.each.map((hash, i) => hash === here.each[i] ? null : i).filter(i => i !== null)).toEqual([])
    expect(there.whole).toBe(here.whole)
  })
})
