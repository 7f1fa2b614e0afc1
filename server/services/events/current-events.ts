import type { StreamEvent } from '#shared/schemas/events'
import type { Reads } from '../../context/context'
import { findFit, listLatestFits } from '../../repositories/fit-repository'
import type { FitLine } from '../../repositories/fit-repository'
import { findLatestJobByKey } from '../../repositories/job-repository'
import { jobKeyOf } from '../fits/job-key'

/** How the fit that a topic tells of stands now: its state, and its progress by the job row while it runs. */
export async function currentFitEvents(reads: Reads, topic: string): Promise<StreamEvent[]> {
  const fit = await fitOfTopic(reads, topic)
  if (!fit) return []
  const about = { fitId: fit.id, targetId: fit.target_id }
  const state: StreamEvent = { topic, name: 'fit.changed', data: { ...about, state: fit.state } }
  if (fit.state !== 'running') return [state]
  const job = await findLatestJobByKey(reads, jobKeyOf({ targetId: fit.target_id, inputHash: fit.input_hash, engineVersion: fit.engine_version }))
  if (!job?.progress_stage) return [state]
  return [state, { topic, name: 'fit.progress', data: { ...about, fraction: job.progress_fraction, stage: job.progress_stage } }]
}

async function fitOfTopic(reads: Reads, topic: string): Promise<FitLine | undefined> {
  const [kind, id = ''] = topic.split(':')
  if (kind === 'fit') return findFit(reads, id)
  if (kind === 'target') return (await listLatestFits(reads, [id]))[0]
  return undefined
}
