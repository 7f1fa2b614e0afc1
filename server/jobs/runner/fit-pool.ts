import { availableParallelism } from 'node:os'
import { MessageChannel } from 'node:worker_threads'
import { Piscina } from 'piscina'
import type { FitOutcome, Progress, Refusal } from '../../../fitting/types'
import type { JobTools } from '../../services/jobs/job-tools'

/** A fit that takes longer than this is ended; the longest that is expected takes seconds. */
const TIME_LIMIT_MS = 10 * 60_000
const MEMORY_LIMIT_MB = 512

/** Fits beside each other: two at least, so that a long one never keeps the others waiting; else one core is left to answer requests. */
export const FITS_AT_ONCE = Math.max(2, Math.min(4, availableParallelism() - 1))

export interface FitPool {
  computeFit: JobTools['computeFit']
  close(): Promise<void>
}

export interface FitPoolOptions {
  /** File URL of the built worker, server/jobs/workers/fit.ts. */
  workerUrl: string
  timeLimitMs?: number
}

/** Threads that run the engine off the event loop. Running out of time or memory is an outcome, not a fault to try again. */
export function createFitPool({ workerUrl, timeLimitMs = TIME_LIMIT_MS }: FitPoolOptions): FitPool {
  const pool = new Piscina({
    filename: workerUrl,
    minThreads: 0,
    maxThreads: FITS_AT_ONCE,
    idleTimeout: 30_000,
    resourceLimits: { maxOldGenerationSizeMb: MEMORY_LIMIT_MB },
  })
  // A worker that breaks down outside of a task, such as while it loads, is told to the pool and to no task.
  const running = new Set<AbortController>()
  pool.on('error', (error: unknown) => {
    for (const breakdown of running) breakdown.abort(error)
  })
  return {
    async computeFit(request, { onProgress, signal }) {
      const breakdown = new AbortController()
      running.add(breakdown)
      const { port1, port2 } = new MessageChannel()
      const timeLimit = AbortSignal.timeout(timeLimitMs)
      port1.on('message', (step: Progress) => onProgress(step))
      try {
        return await pool.run({ request, port: port2 }, { transferList: [port2], signal: AbortSignal.any([signal, timeLimit, breakdown.signal]) }) as FitOutcome
      }
      catch (error) {
        if (signal.aborted) throw signal.reason
        if (breakdown.signal.aborted) throw breakdown.signal.reason
        if (timeLimit.aborted) return { ok: false, refusal: timeRefusal(timeLimitMs) }
        if (isOutOfMemory(error)) return { ok: false, refusal: MEMORY_REFUSAL }
        throw error
      }
      finally {
        running.delete(breakdown)
        port1.close()
      }
    },
    close: () => pool.destroy(),
  }
}

function isOutOfMemory(error: unknown): boolean {
  return error instanceof Error && 'code' in error && error.code === 'ERR_WORKER_OUT_OF_MEMORY'
}

function timeRefusal(timeLimitMs: number): Refusal {
  return {
    code: 'time-limit',
    sentence: `The fit was ended after ${Math.round(timeLimitMs / 60_000)} minutes without a result.`,
    remedy: 'Fit fewer measures at once, or set aside those that add nothing, and ask for the fit again.',
  }
}

const MEMORY_REFUSAL: Refusal = {
  code: 'memory-limit',
  sentence: `The fit was ended because it needed more than ${MEMORY_LIMIT_MB} MB of memory.`,
  remedy: 'Fit fewer measures at once, or set aside those that add nothing, and ask for the fit again.',
}
