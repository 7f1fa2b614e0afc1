import { hasDesk } from '#shared/policies/coordinating'
import { mayReadBatch, mayReadSentWork } from '#shared/policies/reading'
import type { StreamEvent } from '#shared/schemas/events'
import type { Context } from '../../context/context'
import type { NumberedEvent } from '../../context/event-bus'
import { notFound } from '../../errors/app-error'
import { listPartsOfBatch } from '../../repositories/batch-part-repository'
import { findBatch } from '../../repositories/batch-repository'
import { findFit } from '../../repositories/fit-repository'
import { findTarget } from '../../repositories/target-repository'
import { batchForReading } from '../batches/batch-view'
import { currentFitEvents } from './current-events'

export interface OpenTopics {
  current: StreamEvent[]
  since(seq: number): NumberedEvent[]
  subscribe(listener: (event: NumberedEvent) => void): () => void
}

/**
 * What changes under these topics (target:ID, fit:ID, batch:ID, desk), and how the fits among them stand now. Each topic is as
 * open as the thing it tells of; throws not-found where one is not.
 */
export async function openTopics(ctx: Context, topics: readonly string[]): Promise<OpenTopics> {
  for (const topic of topics) if (!await mayListen(ctx, topic)) throw notFound()
  const wanted = new Set(topics)
  const isWanted = ({ event }: NumberedEvent) => wanted.has(event.topic)
  const missed: NumberedEvent[] = []
  let deliver: (event: NumberedEvent) => void = event => void missed.push(event)
  // Subscribed before the present state is read, so that nothing falls between the two.
  const stop = ctx.events.subscribe(event => isWanted(event) && deliver(event))
  try {
    const current: StreamEvent[] = []
    for (const topic of topics) current.push(...await currentFitEvents(ctx.reads, topic))
    return {
      current,
      since: seq => ctx.events.since(seq).filter(isWanted).filter(({ seq }) => !missed.some(event => event.seq === seq)),
      subscribe(listener) {
        missed.forEach(listener)
        deliver = listener
        return stop
      },
    }
  }
  catch (error) {
    stop()
    throw error
  }
}

async function mayListen(ctx: Context, topic: string): Promise<boolean> {
  if (topic === 'desk') return hasDesk(ctx.actor)
  const [kind, id = ''] = topic.split(':')
  if (kind === 'target') return mayReadSentWork(ctx.actor) && await findTarget(ctx.reads, id) !== undefined
  if (kind === 'fit') return mayReadSentWork(ctx.actor) && await findFit(ctx.reads, id) !== undefined
  const batch = await findBatch(ctx.reads, id)
  return batch !== undefined && mayReadBatch(ctx.actor, batchForReading(batch, await listPartsOfBatch(ctx.reads, id)))
}
