import type { FitOutcome, FitRequest, Progress } from '../../../fitting/types'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { isWaiting } from '../../domain/fit-state'
import type { Lease } from '../../jobs/contracts/lease'
import { findFit, updateFitIn } from '../../repositories/fit-repository'
import type { FitRecord } from '../../repositories/fit-repository'
import type { JobTools } from '../jobs/job-tools'
import { announceFit } from './announce-fit'
import { keepOutcome } from './keep-outcome'
import { makeProgressReporter } from './report-progress'

export interface FitRun {
  fitId: string
  lease: Lease
  computeFit: JobTools['computeFit']
}

/**
 * Computes a queued fit and keeps its outcome. Called by the job alone; safe to call again after a crash at any point, since a
 * fit that has an outcome or was superseded meanwhile is left as it is. Records 'fit.done' or 'fit.failed' once; throws
 * LeaseLostError where another worker has taken over.
 */
export async function runFit(ctx: Context, { fitId, lease, computeFit }: FitRun): Promise<void> {
  const fit = await startFit(ctx, fitId, lease)
  if (!fit) return
  const progress = makeProgressReporter(ctx, fit, lease)
  const outcome: FitOutcome = await computeFit(JSON.parse(fit.request) as FitRequest, {
    onProgress: (step: Progress) => progress.report(step),
    signal: lease.signal,
  })
  await progress.settled()
  await keepOutcome(ctx, { fitId, lease, outcome })
}

/** The fit, now running; null where there is nothing left to compute. */
async function startFit(ctx: Context, fitId: string, lease: Lease): Promise<FitRecord | null> {
  return withTransaction(ctx, async (tx) => {
    await lease.assertHeld(tx)
    const fit = await findFit(tx, fitId)
    if (!fit || !isWaiting(fit.state) || fit.state === 'done' || fit.state === 'failed') return null
    if (fit.state === 'queued') {
      await updateFitIn(tx, fitId, 'queued', { state: 'running' })
      announceFit(ctx, { fitId, targetId: fit.target_id, state: 'running' })
    }
    return fit
  })
}
