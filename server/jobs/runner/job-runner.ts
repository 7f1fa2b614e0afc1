import { setTimeout as setTimeoutPromise } from 'node:timers/promises'
import type { AnyJobDefinition } from './job-definition'
import { runOneJob, ServerStopping } from './run-one-job'
import type { Workshop } from './run-one-job'

/** How long an idle slot waits before it looks again, where nobody wakes it. */
const POLL_MS = 500
/** How long an aborted handler has to end before it is left behind; its job is recovered at the next start. */
const ABORT_MS = 2_000

export interface JobRunner {
  start(): void
  /** Has idle slots look for work now. */
  wake(): void
  /** Takes no new job, lets running ones finish for `graceMs`, then aborts them; their jobs are given back. */
  stop(graceMs?: number): Promise<void>
}

/** Runs jobs beside each other: every definition has its own slots, so that mail does not wait for fits. */
export function createJobRunner({ ctx, definitions, tools }: Omit<Workshop, 'stopSignal'>): JobRunner {
  const aborting = new AbortController()
  const sleepers = new Set<() => void>()
  let isStopping = false
  let slots: Promise<void>[] = []

  const wake = () => {
    for (const rouse of [...sleepers]) rouse()
  }
  const sleep = () => new Promise<void>((resolve) => {
    const rouse = () => {
      clearTimeout(timer)
      sleepers.delete(rouse)
      resolve()
    }
    const timer = setTimeout(rouse, POLL_MS)
    sleepers.add(rouse)
  })
  const runSlot = async (definition: AnyJobDefinition) => {
    const workshop: Workshop = { ctx, definitions: [definition], tools, stopSignal: aborting.signal }
    while (!isStopping) {
      try {
        if (await runOneJob(workshop)) continue
      }
      catch (error) {
        ctx.log.error({ err: error, job: definition.name }, 'the job runner could not write an outcome; the lease will run out and the job be taken up again')
      }
      if (!isStopping) await sleep()
    }
  }
  return {
    start() {
      slots = definitions.flatMap(definition => Array.from({ length: definition.atOnce ?? 1 }, () => runSlot(definition)))
    },
    wake,
    async stop(graceMs = 5_000) {
      isStopping = true
      wake()
      const timer = setTimeout(() => aborting.abort(new ServerStopping()), graceMs)
      const limit = new AbortController()
      await Promise.race([Promise.all(slots), setTimeoutPromise(graceMs + ABORT_MS, undefined, { signal: limit.signal }).catch(() => {})])
      limit.abort()
      clearTimeout(timer)
    },
  }
}
