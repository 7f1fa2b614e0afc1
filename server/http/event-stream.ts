import { randomBytes } from 'node:crypto'
import type { ServerResponse } from 'node:http'
import { getRequestHeader } from 'h3'
import type { H3Event } from 'h3'
import type { StreamEvent } from '#shared/schemas/events'
import type { NumberedEvent } from '../context/event-bus'
import { currentHouse } from './house'

/** A comment this often keeps proxies from closing a quiet stream; the session is looked up at the same time. */
const COMMENT_INTERVAL_MS = 15_000
/** What a reader who does not read may let pile up, bytes. */
const BACKLOG_CAP_BYTES = 1024 * 1024
/** Sequence numbers begin anew with each process, so an id names its process as well. */
const PROCESS_KEY = randomBytes(4).toString('hex')

const openStreams = new Set<ServerResponse>()

export interface StreamSource {
  /** What holds right now, for a page that may have missed a change. */
  current: readonly StreamEvent[]
  /** Remembered events after `seq` that belong on this stream. */
  since(seq: number): NumberedEvent[]
  /** Passes on what belongs on this stream; returns the function that ends it. */
  subscribe(listener: (event: NumberedEvent) => void): () => void
}

/** Answers with server-sent events until the reader leaves, the session ends or the server stops. */
export async function sendEventStream(event: H3Event, source: StreamSource): Promise<void> {
  const { res } = event.node
  res.writeHead(200, {
    'Content-Type': 'text/event-stream; charset=utf-8',
    'Cache-Control': 'no-store, no-transform',
    'X-Accel-Buffering': 'no',
  })
  openStreams.add(res)
  const unsubscribe = source.subscribe(numbered => write(res, messageOf(numbered.event, numbered.seq)))
  for (const missed of missedEvents(event, source)) write(res, messageOf(missed.event, missed.seq))
  for (const state of source.current) write(res, messageOf(state, null))
  write(res, ':\n\n')
  const timer = setInterval(() => void keepAlive(event), COMMENT_INTERVAL_MS)
  await new Promise<void>(resolve => res.once('close', resolve))
  clearInterval(timer)
  unsubscribe()
  openStreams.delete(res)
}

/** Ends every open stream, so that a stopping server need not wait for them; pages reconnect by themselves. */
export function endEventStreams(): void {
  for (const res of openStreams) res.end()
}

function missedEvents(event: H3Event, source: StreamSource): NumberedEvent[] {
  const [processKey, seq] = (getRequestHeader(event, 'last-event-id') ?? '').split('-')
  return processKey === PROCESS_KEY && /^\d{1,15}$/.test(seq ?? '') ? source.since(Number(seq)) : []
}

/** Data is JSON on one line, so nothing in it can end a message early. */
function messageOf(event: StreamEvent, seq: number | null): string {
  const id = seq === null ? '' : `id: ${PROCESS_KEY}-${seq}\n`
  return `${id}event: ${event.name}\ndata: ${JSON.stringify(event)}\n\n`
}

function write(res: ServerResponse, text: string): void {
  if (res.writableEnded || res.destroyed) return
  res.write(text)
  if (res.writableLength > BACKLOG_CAP_BYTES) res.destroy()
}

async function keepAlive(event: H3Event): Promise<void> {
  const { res } = event.node
  const house = currentHouse()
  const sessionId = event.context.sessionId as string | null
  try {
    const actor = house && sessionId ? await house.actorOfSession(house.context, sessionId) : null
    if (actor) write(res, ':\n\n')
    else res.end()
  }
  catch (error) {
    house?.context.log.error({ err: error }, 'the session of an event stream could not be looked up; the stream was ended')
    res.end()
  }
}
