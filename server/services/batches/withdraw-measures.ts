import type { Context, Tx } from '../../context/context'
import { listAcceptedMeasureIds } from '../../repositories/fit-content-repository'
import { listStandingMeasuresOfPart, markMeasuresSuperseded } from '../../repositories/measure-repository'

/**
 * Lets the measures that a batch brought to a target stand no longer, in the caller's transaction, but for those that an accepted
 * fit holds already. They are kept; the same measures may then be sent again. Answers the rows they came from.
 */
export async function withdrawMeasures(tx: Tx, ctx: Context, { batchId, targetId }: { batchId: string; targetId: string }): Promise<string[]> {
  const accepted = await listAcceptedMeasureIds(tx, targetId)
  const leaving = (await listStandingMeasuresOfPart(tx, batchId, targetId)).filter(measure => !accepted.has(measure.id))
  await markMeasuresSuperseded(tx, leaving.map(measure => measure.id), ctx.clock.now())
  return leaving.map(measure => measure.batch_row_id)
}
