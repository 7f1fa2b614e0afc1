import type { Progress } from '../../../fitting/types'
import type { Context } from '../../context/context'
import type { Lease } from '../../jobs/contracts/lease'

/** Least time between two steps that are passed on, milliseconds. */
const PROGRESS_INTERVAL_MS = 250

export interface ProgressReporter {
  report(step: Progress): void
  /** Ends when every step passed on is written; throws what writing one threw. */
  settled(): Promise<void>
}

/** Passes the engine's progress on to the job row and to the open pages: the first step at once, then one a quarter of a second. */
export function makeProgressReporter(ctx: Context, fit: { id: string; target_id: string }, lease: Lease): ProgressReporter {
  let lastMs: number | null = null
  let writing: Promise<void> = Promise.resolve()
  let failure: { error: unknown } | null = null
  return {
    report({ fraction, stage }) {
      const nowMs = ctx.clock.nowMs()
      if (lastMs !== null && nowMs - lastMs < PROGRESS_INTERVAL_MS) return
      lastMs = nowMs
      const data = { fitId: fit.id, targetId: fit.target_id, fraction, stage }
      ctx.events.publish({ topic: `fit:${fit.id}`, name: 'fit.progress', data })
      ctx.events.publish({ topic: `target:${fit.target_id}`, name: 'fit.progress', data })
      writing = writing.then(() => lease.reportProgress(fraction, stage)).catch((error: unknown) => {
        failure ??= { error }
      })
    },
    async settled() {
      await writing
      if (failure) throw failure.error
    },
  }
}
