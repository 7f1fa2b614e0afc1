import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import Papa from 'papaparse'
import { fitOrbit } from '../../../fitting'
import type { RelativeMeasure } from '../../../fitting/types'
import { sha256Hex } from '../../../server/domain/canonical-json'
import { readMeasures } from '../../../shared/intake/read-measures'
import { toFitMeasure } from '../../../shared/intake/to-fit-measure'
import type { EditionSnapshot } from '../../../shared/schemas/editions'
import { mountServer } from '../../builders/mounted-server'
import type { MountedServer } from '../../builders/mounted-server'
import { acceptedPairFit, addPairHouse, sendPairMeasures } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { addTarget, publish, rule, runJobs } from '../../builders/work'

let house: TestHouse
let pair: PairHouse
let server: MountedServer
let place: string
beforeAll(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
  await publish(pair.coordinator.ctx, await acceptedPairFit(pair), 'The first orbit.')
  house.clock.advance(86_400_000)
  const second = await addTarget(pair.coordinator.ctx, { programmeId: pair.programmeId, kind: 'relative', name: 'Hazel 3 AB' })
  const fit = await sendPairMeasures({ ...pair, target: second }, { from: 1974, count: 18, seed: 31, observer: '=cmd|calc' })
  await publish(pair.coordinator.ctx, await rule(pair.coordinator.ctx, fit, 'accept', 'sound'))
  server = await mountServer(house)
  place = `/api/v1/orbits/${pair.target.id}/1`
})
afterAll(async () => {
  await server.close()
  await house.close()
})

const get = (path: string, headers: Record<string, string> = {}) => server.client().call('GET', path, { headers })
const table = (text: string) => Papa.parse<Record<string, string>>(text.trimEnd(), { header: true }).data
const snapshotNow = async () => (await get(`${place}/snapshot.json`)).json as EditionSnapshot

describe('the public list of orbits', () => {
  it('shows the newest first to a visitor, with a small drawing', async () => {
    const { status, json } = await get('/api/v1/orbits')
    expect(status).toBe(200)
    expect(json.items.map((item: { targetName: string }) => item.targetName)).toEqual(['Hazel 3 AB', 'Linden 12 AB'])
    expect(json.items[0].thumbnailSvg).toMatch(/^<svg[^>]*>.*<\/svg>$/)
    expect(json.nextCursor).toBeNull()
  })

  it('finds by part of a name or an alias, whatever the letter case, and by kind', async () => {
    const names = async (query: string) => ((await get(`/api/v1/orbits?${query}`)).json.items as { targetName: string }[]).map(item => item.targetName)
    expect(await names('q=linden')).toEqual(['Linden 12 AB'])
    expect(await names('q=LND')).toEqual(['Linden 12 AB'])
    expect(await names('q=%25')).toEqual([])
    expect(await names('kind=plane')).toEqual([])
    expect(await names('kind=relative')).toHaveLength(2)
  })

  it('goes on from its cursor without gap or repetition', async () => {
    const first = (await get('/api/v1/orbits?limit=1')).json
    const second = (await get(`/api/v1/orbits?limit=1&cursor=${first.nextCursor}`)).json
    expect([first, second].map(page => page.items[0].targetName)).toEqual(['Hazel 3 AB', 'Linden 12 AB'])
    expect(second.nextCursor).toBeNull()
    expect((await get('/api/v1/orbits?cursor=nonsense')).status).toBe(422)
  })
})

describe('the public page of an edition', () => {
  it('is open to a visitor, who may not withdraw it', async () => {
    const { status, json } = await get(place)
    expect(status).toBe(200)
    expect(json).toMatchObject({ number: 1, state: 'published', publishedBy: 'Mirelle Tasque', mayWithdraw: false, editions: [{ number: 1, state: 'published' }] })
    expect(json.snapshot.result.elements.period.value).toBeGreaterThan(50)
  })

  it('is not found under another number, another target or a number that is none', async () => {
    for (const path of [`/api/v1/orbits/${pair.target.id}/2`, `/api/v1/orbits/${pair.member.id}/1`, `/api/v1/orbits/${pair.target.id}/0`, `/api/v1/orbits/${pair.target.id}/x`]) {
      expect((await get(path)).status).toBe(404)
    }
  })
})

describe('the downloads of an edition', () => {
  it('give the snapshot byte for byte, with its hash as ETag, licence and citation as links, kept for good', async () => {
    const { text, headers } = await get(`${place}/snapshot.json`)
    expect(headers.get('etag')).toBe(`"${sha256Hex(text)}"`)
    expect(headers.get('cache-control')).toContain('immutable')
    expect(headers.get('content-type')).toContain('application/json')
    expect(headers.get('link')).toContain('rel="license"')
    expect(headers.get('link')).toContain(`/orbits/${pair.target.id}/1>; rel="cite-as"`)
    expect((await get(`${place}/snapshot.json`, { 'if-none-match': headers.get('etag')! })).status).toBe(304)
    expect((await get(`${place}/snapshot.json`, { 'if-none-match': '"other"' })).status).toBe(200)
  })

  it('give the measures so that the engine finds the same orbit in them', async () => {
    const { text, headers } = await get(`${place}/measures.csv`)
    expect(headers.get('content-disposition')).toBe('attachment; filename="linden-12-ab-edition-1-measures.csv"')
    const reading = readMeasures(text, { kind: 'relative' })
    expect(reading.fileProblems).toEqual([])
    expect(reading.rows.flatMap(row => row.problems)).toEqual([])
    const measures = reading.rows.map((row, k) => toFitMeasure(row.parsed!, `m${k}`, row.parsed!.observerName!)) as RelativeMeasure[]
    const outcome = fitOrbit({ kind: 'relative', measures })
    const published = (await snapshotNow()).result.elements
    expect(outcome.ok).toBe(true)
    for (const [name, element] of Object.entries(outcome.ok ? outcome.result.elements : {})) {
      expect(Math.abs(element.value - published[name]!.value)).toBeLessThan(1e-6 * Math.max(1, Math.abs(element.value)))
    }
  })

  it('keep a name that looks like a formula from being computed', async () => {
    const [hazel] = (await get('/api/v1/orbits?q=hazel')).json.items
    const { text } = await get(`/api/v1/orbits/${hazel.targetId}/1/measures.csv`)
    expect(table(text)[0]!.observer).toBe('\'=cmd|calc')
  })

  it('give predictions and elements with their errors as tables of plain numbers', async () => {
    const snapshot = await snapshotNow()
    const ephemeris = table((await get(`${place}/ephemeris.csv`)).text)
    expect(ephemeris.map(row => Number(row.julian_year))).toEqual(snapshot.predictions.map(prediction => prediction.at))
    expect(Number(ephemeris[3]!.rho_arcsec)).toBe(snapshot.predictions[3]!.values.rhoArcsec)
    expect(Number(ephemeris[3]!.sigma_theta_deg)).toBe(snapshot.predictions[3]!.sigmas.thetaDeg)
    const elements = table((await get(`${place}/elements.csv`)).text)
    expect(elements.find(row => row.element === 'semi_major_axis')).toMatchObject({ unit: 'arcsec', value: String(snapshot.result.elements.semiMajorAxis!.value) })
  })

  it('give what was set aside as a table of its own, here an empty one with its heading', async () => {
    const { text } = await get(`${place}/set-aside.csv`)
    expect(text.trimEnd().split('\r\n')).toHaveLength(1)
    expect(text).toContain('set_aside_reason')
  })
})

describe('stopping mail from the link of a letter', () => {
  const linkOf = async () => {
    await runJobs(house.ctx, house.mailTransport)
    return house.mail.find(mail => mail.to === pair.observer.email && mail.subject.startsWith('Linden 12 AB: edition'))!.unsubscribeUrl!.split('/').at(-1)!
  }

  it('names the target but no person, and takes the choice as JSON', async () => {
    const token = await linkOf()
    const { json, text } = await get(`/api/v1/unsubscribe/${token}`)
    expect(json).toMatchObject({ targetName: 'Linden 12 AB', isTargetStopped: false, isAllStopped: false })
    expect(text).not.toMatch(/Brandvik|@/)
    const stopped = await server.client().call('POST', `/api/v1/unsubscribe/${token}`, { json: { scope: 'all' } })
    expect(stopped).toMatchObject({ status: 200, json: { isAllStopped: true } })
    expect((await get(`/api/v1/unsubscribe/${'a'.repeat(52)}`)).status).toBe(404)
  })

  it('takes the one click of a mail program, which sends a form and no session', async () => {
    const token = await linkOf()
    const { status, json } = await server.client().call('POST', `/unsubscribe/${token}`, {
      body: 'List-Unsubscribe=One-Click', headers: { 'content-type': 'application/x-www-form-urlencoded' },
    })
    expect(status).toBe(200)
    expect(json).toMatchObject({ isTargetStopped: true })
  })
})
