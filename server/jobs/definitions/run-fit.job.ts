import { giveUpFit } from '../../services/fits/give-up-fit'
import { runFit } from '../../services/fits/run-fit'
import { runFitSchema } from '../contracts/run-fit'
import { FITS_AT_ONCE } from '../runner/fit-pool'
import { defineJob } from '../runner/job-definition'

/** Computes a queued fit in a worker and keeps its result or its refusal. */
export const runFitJob = defineJob({
  name: 'run-fit',
  schema: runFitSchema,
  atOnce: FITS_AT_ONCE,
  async handle(ctx, { fitId }, lease, { computeFit }) {
    await runFit(ctx, { fitId, lease, computeFit })
  },
  async onDead(tx, ctx, { fitId }) {
    await giveUpFit(tx, ctx, fitId)
  },
})
