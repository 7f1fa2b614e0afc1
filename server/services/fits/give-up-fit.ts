import type { Context, Tx } from '../../context/context'
import { findFit } from '../../repositories/fit-repository'
import { settleComputed } from './keep-outcome'

/** Makes a fit failed whose job is dead, in the transaction that buries the job, so that nobody waits for it for ever. Records 'fit.failed'. */
export async function giveUpFit(tx: Tx, ctx: Context, fitId: string): Promise<void> {
  const fit = await findFit(tx, fitId)
  if (!fit || (fit.state !== 'queued' && fit.state !== 'running')) return
  await settleComputed(tx, ctx, fit, {
    ok: false,
    refusal: {
      code: 'worker-failed',
      sentence: 'The program that computes fits broke down at this one on every try.',
      remedy: 'Tell the administrator, who finds the reason in the log; your measures are kept and can be fitted again.',
    },
  })
}
