import { createHash } from 'node:crypto'
import type { Browser, BrowserContext, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { pairFile } from '../builders/measure-files'
import { simulatePair, unevenEpochs } from '../builders/simulated-measures'
import { DESK, PHONE, startBrowser } from './support/browser'
import { PASSWORD, fillHouse } from './support/house-before-start'
import { startMailCatcher } from './support/mail-catcher'
import type { MailCatcher } from './support/mail-catcher'
import { freshDataDir, startServer } from './support/running-server'
import type { RunningServer } from './support/running-server'

const TRUTH = { periodYr: 41.2, periastronTimeYr: 2001.3, eccentricity: 0.42, semiMajorAxisArcsec: 0.92, inclinationDeg: 52, nodeDeg: 118, argumentOfPeriastronDeg: 74 }
const NOISE = { sigmaThetaDeg: 0.6, sigmaRhoArcsec: 0.008 }

/** Twenty-four honest measures, one that is 0.3″ off, and a row whose separation is zero. */
function fileText(): string {
  const measures = simulatePair(TRUTH, unevenEpochs({ from: 1986, count: 24, stepYr: 1.6, seed: 11 }), { ...NOISE, seed: 12 })
  const wrong = { ...measures[12]!, epochYr: 2008.5, rhoArcsec: measures[12]!.rhoArcsec + 0.3 }
  return `${pairFile([...measures, wrong], NOISE)}2020.5,120.0,0,0.6,0.008\n`
}

describe.each([{ name: 'at a desk', size: DESK }, { name: 'on a phone', size: PHONE }])('from an uploaded file to a published orbit, $name', ({ size }) => {
  let browser: Browser
  let server: RunningServer
  let mail: MailCatcher
  let house: Awaited<ReturnType<typeof fillHouse>>
  const troubles: string[] = []

  beforeAll(async () => {
    const dataDir = freshDataDir()
    house = await fillHouse(dataDir)
    mail = await startMailCatcher()
    server = await startServer({ dataDir, env: { SEMILATUS_MAIL: 'smtp', SEMILATUS_SMTP_HOST: '127.0.0.1', SEMILATUS_SMTP_PORT: String(mail.port), SEMILATUS_SMTP_FROM: 'semilatus@example.org' } })
    browser = await startBrowser()
  })
  afterAll(async () => {
    await browser?.close()
    await server?.stop()
    await mail?.stop()
  })

  async function openAs(email: string | null): Promise<{ context: BrowserContext, page: Page }> {
    const context = await browser.newContext({ viewport: size, baseURL: server.origin, reducedMotion: 'reduce' })
    const page = await context.newPage()
    page.on('pageerror', error => troubles.push(error.message))
    page.on('console', (message) => {
      if (message.type() === 'error') troubles.push(`${message.text()} ${message.location().url} on ${page.url()}`)
    })
    if (email) {
      await page.goto('/sign-in')
      await page.getByLabel('E-mail address').fill(email)
      await page.getByLabel('Password').fill(PASSWORD)
      await page.getByRole('button', { name: 'Sign in' }).click()
      await page.waitForURL(url => url.pathname !== '/sign-in')
    }
    return { context, page }
  }

  it('takes the file of an observer, names the wrong cell and fits the rest while it is watched', async () => {
    const { context, page } = await openAs(house.signIns.observer)
    await page.goto(`/uploads?target=${house.targetId}`)
    await page.locator('input[type=file]').setInputFiles({ name: 'winter.csv', mimeType: 'text/csv', buffer: Buffer.from(fileText()) })
    await page.getByRole('button', { name: 'Read the measures' }).click()
    await page.waitForURL(/\/uploads\/[a-z2-7]{26}$/)
    await expect.poll(() => page.locator('main').innerText()).toContain('rho_limit_arcsec')
    await page.getByRole('button', { name: /^Send 25 new measures/ }).click()
    await page.getByRole('link', { name: /See the residuals/ }).click()
    await page.getByRole('heading', { name: 'Linden 12 AB', level: 1 }).waitFor()
    const wrong = page.getByRole('row').filter({ hasText: '2008.500' })
    await wrong.click()
    await page.getByRole('complementary', { name: 'Measure chosen and changes' }).waitFor()
    expect(await wrong.innerText()).toMatch(/[+−]\d/)
    expect(await page.getByRole('button', { name: /Set aside/ }).count()).toBe(0)
    await context.close()
  })

  it('adds nothing when the same file comes again, and puts that draft away', async () => {
    const { context, page } = await openAs(house.signIns.observer)
    await page.goto(`/uploads?target=${house.targetId}`)
    await page.locator('input[type=file]').setInputFiles({ name: 'winter again.csv', mimeType: 'text/csv', buffer: Buffer.from(fileText()) })
    await page.getByRole('button', { name: 'Read the measures' }).click()
    await page.waitForURL(/\/uploads\/[a-z2-7]{26}$/)
    await expect.poll(() => page.locator('main').innerText()).toMatch(/0 (good|new)[\s\S]*25 already here/)
    await page.getByRole('button', { name: 'Discard' }).click()
    await page.getByRole('dialog').getByRole('button', { name: 'Discard' }).click()
    await page.waitForURL(/\/uploads$/)
    await page.getByRole('heading', { name: 'Uploads', level: 1 }).waitFor()
    await expect.poll(() => page.getByText('winter again.csv').count()).toBe(0)
    await context.close()
  })

  it('lets the coordinator set the bad measure aside, refit, rule and publish', async () => {
    const { context, page } = await openAs(house.signIns.coordinator)
    await page.goto('/desk')
    await page.getByRole('link', { name: /Open/ }).first().click()
    await page.waitForURL(/\/targets\//)
    await page.getByRole('row').filter({ hasText: '2008.500' }).click()
    await expect.poll(() => new URL(page.url()).searchParams.get('measure')).toMatch(/^[a-z2-7]{26}$/)
    await page.getByRole('button', { name: 'Set aside…' }).click()
    await page.getByLabel('Why set it aside?').fill('0.3″ too wide: the wrong pair of stars was measured')
    await page.getByRole('button', { name: 'Set aside', exact: true }).click()
    await page.getByRole('button', { name: 'Refit' }).click()
    await page.getByRole('heading', { name: 'Rule on fit 2' }).waitFor()
    await page.getByRole('radio', { name: /^Accept/ }).check()
    await page.getByRole('textbox', { name: 'Reason' }).fill('Small residuals and nothing left over.')
    await page.getByRole('button', { name: 'Rule', exact: true }).click()
    await page.getByRole('heading', { name: 'Publish as edition 1' }).waitFor()
    await page.getByLabel('What changed, and why').fill('First orbit of the group.')
    await page.getByRole('button', { name: 'Publish edition 1' }).click()
    await page.waitForURL(/\/orbits\/[a-z2-7]{26}\/1$/)
    await context.close()
  })

  it('writes to the follower and to the observer, with a way to stop it', async () => {
    await expect.poll(() => mail.messages.filter(message => /Linden 12 AB/.test(message.raw) && /edition 1/i.test(message.raw)).flatMap(message => message.to).sort(), { timeout: 20_000 })
      .toEqual([house.signIns.follower, house.signIns.observer].sort())
    const letter = mail.messages.find(message => message.to.includes(house.signIns.follower) && /edition 1/i.test(message.raw))!
    expect(letter.raw).toMatch(/^List-Unsubscribe:\s+</m)
    const stop = /http:\/\/127\.0\.0\.1:\d+\/unsubscribe\/[\w-]+/.exec(letter.raw.replace(/=\r?\n/g, ''))![0]
    const { context, page } = await openAs(null)
    await page.goto(new URL(stop).pathname)
    await page.getByRole('button', { name: /Linden 12 AB/ }).click()
    await expect.poll(() => page.locator('main').innerText()).toMatch(/no (more|further) mail|stopped/i)
    await context.close()
  })

  it('shows the orbit to a visitor, who downloads exactly what was sealed', async () => {
    const { context, page } = await openAs(null)
    await page.goto('/orbits')
    await page.getByRole('link', { name: /Linden 12 AB/ }).first().click()
    await page.waitForURL(/\/orbits\/[a-z2-7]{26}\/1$/)
    expect(await page.locator('main').innerText()).toContain('CC BY 4.0')
    const address = await page.getByRole('link', { name: 'snapshot.json' }).getAttribute('href')
    const answer = await context.request.get(address!)
    const bytes = await answer.body()
    const snapshot = JSON.parse(bytes.toString('utf8')) as { measures: { role: string, reason: string | null }[], result: { elements: { period: { value: number, sigma: number } } } }
    expect(await page.locator('main').innerText()).toContain(createHash('sha256').update(bytes).digest('hex').slice(0, 16))
    const { value, sigma } = snapshot.result.elements.period
    expect(Math.abs(value - TRUTH.periodYr)).toBeLessThan(4 * sigma)
    expect(snapshot.measures.filter(measure => measure.role === 'set-aside').map(measure => measure.reason)).toEqual(['0.3″ too wide: the wrong pair of stars was measured'])
    await context.close()
  })

  it('gives the elements, the residuals and the drawing’s title without JavaScript', async () => {
    const context = await browser.newContext({ viewport: size, baseURL: server.origin, javaScriptEnabled: false })
    const page = await context.newPage()
    await page.goto('/orbits')
    await page.getByRole('link', { name: /Linden 12 AB/ }).first().click()
    const text = await page.locator('main').innerText()
    for (const word of ['period', 'eccentricity', 'semi-major axis', 'inclination']) expect(text).toContain(word)
    expect(await page.getByRole('row').filter({ hasText: '2008.500' }).count()).toBeGreaterThan(0)
    expect(await page.locator('svg title').first().textContent()).toContain('Linden 12 AB')
    await context.close()
  })

  it('never overflows the window sideways, and the browser has nothing to complain of', async () => {
    const { context, page } = await openAs(house.signIns.coordinator)
    for (const path of ['/', '/orbits', '/targets', `/targets/${house.targetId}`, '/uploads', '/desk', '/account', `/orbits/${house.targetId}/1`]) {
      await page.goto(path, { waitUntil: 'networkidle' })
      expect({ path, width: await page.evaluate(() => document.documentElement.scrollWidth) }).toEqual({ path, width: size.width })
    }
    await context.close()
    expect(troubles).toEqual([])
  })
})
