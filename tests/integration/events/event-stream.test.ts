import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { sendBatch } from '../../../server/services/batches/send-batch'
import { openTopics } from '../../../server/services/events/open-topics'
import { mountServer } from '../../builders/mounted-server'
import type { MountedServer } from '../../builders/mounted-server'
import { addPairHouse, sendPairMeasures } from '../../builders/published-pair'
import type { PairHouse } from '../../builders/published-pair'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'
import { uploadText } from '../../builders/uploads'
import { rule } from '../../builders/work'

let house: TestHouse
let pair: PairHouse
let server: MountedServer | null = null
beforeEach(async () => {
  house = await createTestHouse()
  pair = await addPairHouse(house)
})
afterEach(async () => {
  vi.useRealTimers()
  await server?.close()
  server = null
  await house.close()
})

const fitted = () => sendPairMeasures(pair, { from: 1974.2, count: 20, seed: 12 })

interface Message { id: string | null; name: string; data: Record<string, unknown> }

/** Reads a stream until `count` messages have come, and leaves it. */
async function readStream(topics: string, count: number, { sessionId = pair.coordinator.sessionId, headers = {}, onOpen = async () => {} }: { sessionId?: string; headers?: Record<string, string>; onOpen?: () => Promise<void> } = {}): Promise<Message[]> {
  server ??= await mountServer(house)
  const leaving = new AbortController()
  const response = await fetch(`${server.baseUrl}/api/v1/events?topics=${topics}`, { headers: { ...server.cookieOf(sessionId), ...headers }, signal: leaving.signal })
  expect(response.status).toBe(200)
  expect(response.headers.get('content-type')).toMatch(/^text\/event-stream/)
  let text = ''
  let isOpened = false
  const decoder = new TextDecoder()
  for await (const chunk of response.body as unknown as AsyncIterable<Uint8Array>) {
    text += decoder.decode(chunk, { stream: true })
    if (!isOpened && text.includes(':\n\n')) {
      isOpened = true
      await onOpen()
    }
    if (isOpened && messagesOf(text).length >= count) break
  }
  leaving.abort()
  return messagesOf(text)
}

function messagesOf(text: string): Message[] {
  return text.split('\n\n').slice(0, -1).filter(block => block.includes('data: ')).map((block) => {
    const field = (name: string) => block.split('\n').find(line => line.startsWith(`${name}: `))?.slice(name.length + 2) ?? null
    return { id: field('id'), name: field('event')!, data: (JSON.parse(field('data')!) as { data: Record<string, unknown> }).data }
  })
}

describe('the event stream', () => {
  it('says at once how the fit of a topic stands, then tells what changes, with rising ids', async () => {
    const fit = await fitted()
    const messages = await readStream(`fit:${fit.id}`, 2, { onOpen: async () => void await rule(pair.coordinator.ctx, fit, 'accept', 'Nothing stands out.') })
    expect(messages).toMatchObject([
      { id: null, name: 'fit.changed', data: { fitId: fit.id, state: 'done' } },
      { id: expect.stringMatching(/^[0-9a-f]{8}-\d+$/) as string, name: 'fit.changed', data: { fitId: fit.id, state: 'accepted' } },
    ])
  })

  it('gives a page that reconnects what it missed, and only that', async () => {
    const fit = await fitted()
    const topics = `fit:${fit.id},desk`
    const first = await readStream(topics, 2, { onOpen: async () => house.ctx.events.publish({ topic: 'desk', name: 'desk.changed', data: { fitId: 'first' } }) })
    house.ctx.events.publish({ topic: 'desk', name: 'desk.changed', data: { fitId: 'missed' } })
    house.ctx.events.publish({ topic: 'batch:none', name: 'batch.changed', data: {} })
    const again = await readStream(topics, 2, { headers: { 'last-event-id': first.at(-1)!.id! } })
    expect(again.map(message => message.data.fitId)).toEqual(['missed', fit.id])
    const strange = await readStream(topics, 1, { headers: { 'last-event-id': '00000000-1' } })
    expect(strange.map(message => message.data.fitId)).toEqual([fit.id])
  })

  it('answers progress from the job row to a page that comes while the fit runs', async () => {
    const { fits: [queued] } = await sendBatch(pair.observer.ctx, (await uploadText(pair.observer.ctx, { text: 'epoch,theta_deg,rho_arcsec\n2020.1,40,1.2\n', targetId: pair.target.id })).id)
    await house.database.db.updateTable('fit').set({ state: 'running' }).where('id', '=', queued!.fitId).execute()
    await house.database.db.updateTable('job').set({ state: 'running', progress_fraction: 0.4, progress_stage: 'searching' }).where('name', '=', 'run-fit').execute()
    const { current } = await openTopics(pair.member.ctx, [`target:${pair.target.id}`])
    expect(current.map(event => event.data)).toMatchObject([{ state: 'running' }, { fraction: 0.4, stage: 'searching' }])
  })

  it('loses nothing that happens while the present state is read', async () => {
    const opening = openTopics(pair.coordinator.ctx, ['desk'])
    await Promise.resolve()
    const told: unknown[] = []
    const opened = await opening.then((topics) => {
      house.ctx.events.publish({ topic: 'desk', name: 'desk.changed', data: { fitId: 'between' } })
      return topics
    })
    opened.subscribe(({ event }) => told.push(event.data.fitId))
    house.ctx.events.publish({ topic: 'desk', name: 'desk.changed', data: { fitId: 'after' } })
    expect(told).toEqual(['between', 'after'])
  })

  it('sends a comment every fifteen seconds, and ends with the session', async () => {
    server = await mountServer(house)
    vi.useFakeTimers({ toFake: ['setInterval'] })
    const response = await fetch(`${server.baseUrl}/api/v1/events?topics=desk`, { headers: server.cookieOf(pair.coordinator.sessionId) })
    const reader = (response.body as ReadableStream<Uint8Array>).getReader()
    const next = async () => Buffer.from((await reader.read()).value ?? []).toString()
    expect(await next()).toBe(':\n\n')
    vi.advanceTimersByTime(15_000)
    expect(await next()).toBe(':\n\n')
    await house.database.db.updateTable('session').set({ revoked_at: house.clock.now() }).where('person_id', '=', pair.coordinator.id).execute()
    vi.advanceTimersByTime(15_000)
    expect(await reader.read()).toEqual({ done: true, value: undefined })
  })

  it('is as open as the things it tells of', async () => {
    const draft = await uploadText(pair.observer.ctx, { text: 'epoch,theta_deg,rho_arcsec\n2020.1,40,1.2\n', targetId: pair.target.id })
    const open = (ctx: typeof house.ctx, topic: string) => openTopics(ctx, [topic])
    await expect(open(pair.member.ctx, 'desk')).rejects.toMatchObject({ code: 'not-found' })
    await expect(open(pair.member.ctx, `batch:${draft.id}`)).rejects.toMatchObject({ code: 'not-found' })
    await expect(open(pair.member.ctx, `fit:${'a'.repeat(26)}`)).rejects.toMatchObject({ code: 'not-found' })
    await expect(open(house.ctx, `target:${pair.target.id}`)).rejects.toMatchObject({ code: 'not-found' })
    await open(pair.observer.ctx, `batch:${draft.id}`)
    await open(pair.member.ctx, `target:${pair.target.id}`)
    server = await mountServer(house)
    const call = (topics: string, headers: Record<string, string>) => server!.client().call('GET', `/api/v1/events?topics=${topics}`, { headers })
    expect(await call('desk', {})).toMatchObject({ status: 401 })
    expect(await call('desk,weather', server.cookieOf(pair.coordinator.sessionId))).toMatchObject({ status: 422, json: { code: 'input-invalid' } })
  })
})
