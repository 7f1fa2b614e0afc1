import { fitOrbit } from '../../fitting'
import type { Kind } from '../../fitting/types'
import type { Context } from '../../server/context/context'
import { runFitJob } from '../../server/jobs/definitions/run-fit.job'
import { sendMailJob } from '../../server/jobs/definitions/send-mail.job'
import { runJobsUntilIdle } from '../../server/jobs/runner/run-until-idle'
import type { MailTransport } from '../../server/mail/outbox/mail-transport'
import { sendBatch } from '../../server/services/batches/send-batch'
import { ruleOnFit } from '../../server/services/desk/rule-on-fit'
import { publishEdition } from '../../server/services/editions/publish-edition'
import { readFit } from '../../server/services/fits/read-fit'
import { requestFit } from '../../server/services/fits/request-fit'
import { createTarget } from '../../server/services/targets/create-target'
import { readTarget } from '../../server/services/targets/read-target'
import type { BatchView, SendOutcome } from '../../shared/schemas/batches'
import type { EditionSummary } from '../../shared/schemas/editions'
import type { Decision, FitView } from '../../shared/schemas/fits'
import { createTargetSchema } from '../../shared/schemas/targets'
import type { TargetView } from '../../shared/schemas/targets'
import { uploadText } from './uploads'

/** Steps of the group's work, each through the service that a page would call. `ctx` is the person who does it. */

export async function addTarget(ctx: Context, target: { programmeId: string, kind: Kind, name: string } & Record<string, unknown>): Promise<TargetView> {
  return await createTarget(ctx, createTargetSchema.parse(target))
}

export async function upload(ctx: Context, { text, fileName, target }: { text: string, fileName: string, target: { id: string, kind: Kind } }): Promise<BatchView> {
  return await uploadText(ctx, { text, fileName, kind: target.kind, targetId: target.id })
}

export async function uploadAndSend(ctx: Context, file: Parameters<typeof upload>[1]): Promise<SendOutcome & { batchId: string }> {
  const batch = await upload(ctx, file)
  return { ...await sendBatch(ctx, batch.id), batchId: batch.id }
}

/** Computes what is queued, in this thread. Letters are sent too where a transport is given; else they wait in the outbox. */
export async function runJobs(ctx: Context, mailTransport?: MailTransport): Promise<number> {
  return await runJobsUntilIdle({ ...ctx, actor: null }, {
    definitions: mailTransport ? [runFitJob, sendMailJob] : [runFitJob],
    tools: {
      mailTransport: mailTransport ?? null,
      computeFit: async (request, { onProgress }) => fitOrbit(request, onProgress),
    },
  })
}

/** The newest fit of a target. */
export async function latestFit(ctx: Context, targetId: string): Promise<FitView> {
  const { fit } = await readTarget(ctx, targetId, null)
  if (!fit) throw new Error('The target has no fit yet: send measures and run the jobs first.')
  return fit
}

/** Sets these measures aside beside those that are, and computes the fit that follows. */
export async function setAside(ctx: Context, fit: FitView, more: readonly { measureId: string, reason: string }[]): Promise<FitView> {
  const earlier = fit.measures.filter(measure => measure.role === 'set-aside').map(measure => ({ measureId: measure.id, reason: measure.reason ?? '' }))
  const asked = await requestFit(ctx, fit.targetId, { baseFitId: fit.id, setAside: [...earlier, ...more] })
  await runJobs(ctx)
  return await readFit(ctx, asked.fit.id)
}

export async function rule(ctx: Context, fit: Pick<FitView, 'id' | 'version'>, decision: Decision, reason: string): Promise<FitView> {
  return await ruleOnFit(ctx, { fitId: fit.id, decision, reason, seenVersion: fit.version })
}

export async function publish(ctx: Context, fit: Pick<FitView, 'id' | 'version'>, whatChanged = ''): Promise<EditionSummary> {
  return await publishEdition(ctx, { fitId: fit.id, whatChanged, seenVersion: fit.version })
}
